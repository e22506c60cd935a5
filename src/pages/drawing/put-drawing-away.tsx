import { Button } from '#client/components/button.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { useArchive } from '#client/features/drawings/api/drawing-mutations.ts';
import { drawingsText as text } from '#client/text/drawings.ts';
import type { DrawingDto } from '#shared/contract/drawings.ts';

export function PutDrawingAway({ drawing, name }: { drawing: DrawingDto; name: string }) {
  const archive = useArchive('drawings', drawing.id);
  const notice = useNotice();
  const isAway = drawing.archivedAt !== null;
  return (
    <>
      <ProblemNote error={archive.error} />
      <Button
        look="quiet"
        aria-label={isAway ? text.bringBackOf(name) : text.putAwayOf(name)}
        busy={archive.isPending}
        onClick={() =>
          archive.mutate(!isAway, {
            onSuccess: () => notice(isAway ? text.broughtBack(name) : text.putAwayDone(name)),
          })
        }
      >
        {isAway ? text.bringBack : text.putAway}
      </Button>
    </>
  );
}
