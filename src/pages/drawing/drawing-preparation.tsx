import { Button } from '#client/components/button.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { usePrepareAgain } from '#client/features/drawings/api/drawing-mutations.ts';
import { isUnderWay } from '#client/features/drawings/api/drawing-queries.ts';
import { JobProgress } from '#client/features/drawings/components/drawing-entry.tsx';
import { drawingsText as text } from '#client/text/drawings.ts';
import type { DrawingDto } from '#shared/contract/drawings.ts';

/** How the preparing of a drawing stands; an engineer may ask for what is missing once more. Nothing when all is well. */
export function DrawingPreparation({ drawing, canEdit }: { drawing: DrawingDto; canEdit: boolean }) {
  if (drawing.job.state === 'done' && drawing.job.message === '') return null;
  return (
    <div className="mb-4 border border-rule bg-film px-3.5 pt-1 pb-3">
      <JobProgress drawing={drawing} />
      {canEdit && !isUnderWay(drawing) ? <PrepareAgain drawingId={drawing.id} /> : null}
    </div>
  );
}

function PrepareAgain({ drawingId }: { drawingId: string }) {
  const prepare = usePrepareAgain(drawingId);
  const notice = useNotice();
  return (
    <>
      <ProblemNote error={prepare.error} />
      <div className="flex flex-wrap items-baseline gap-x-3 gap-y-1">
        <Button
          look="quiet"
          busy={prepare.isPending}
          onClick={() => prepare.mutate(undefined, { onSuccess: () => notice(text.preparingAgain) })}
        >
          {text.prepareAgain}
        </Button>
        <span className="text-sm text-ink-2">{text.prepareAgainHint}</span>
      </div>
    </>
  );
}
