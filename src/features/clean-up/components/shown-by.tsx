import { Button } from '#client/components/button.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { cleanUpText as text } from '#client/text/clean-up.ts';
import { useShowRendition } from '../api/rendition-queries.ts';

/** Says that a sheet is shown by a cleaned-up picture; whoever may choose has the scan back at a press. */
export function ShownBy({ sheetId, canChange }: { sheetId: string; canChange: boolean }) {
  const show = useShowRendition(sheetId);
  const notice = useNotice();
  return (
    <div className="flex flex-wrap items-center gap-x-3 gap-y-1.5 border-b border-rule px-3.5 py-2">
      <span className="min-w-0 grow text-ink-2">{text.shownBy}</span>
      {canChange ? (
        <Button
          look="quiet"
          busy={show.isPending}
          onClick={() => show.mutate(null, { onSuccess: () => notice(text.nowShown) })}
        >
          {text.showOriginal}
        </Button>
      ) : null}
      <ProblemNote error={show.error} />
    </div>
  );
}
