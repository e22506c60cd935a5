import { useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { Actions, Dialog } from '#client/components/dialog.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { blindText as text } from '#client/text/check-work.ts';
import { commonText } from '#client/text/common.ts';
import { useOpenFigures } from '../api/blind-queries.ts';

/** Opens the figures without reading blind, after saying that there is no way back. */
export function OpenFigures({ revisionId }: { revisionId: string }) {
  const [isAsking, setAsking] = useState(false);
  const open = useOpenFigures(revisionId);
  return (
    <>
      <Button onClick={() => setAsking(true)}>{text.decline}</Button>
      {isAsking ? (
        <Dialog title={text.declineTitle} onClose={() => setAsking(false)}>
          <p className="m-0">{text.declineLead}</p>
          <ProblemNote error={open.error} />
          <Actions>
            <Button
              look="main"
              busy={open.isPending}
              busyLabel={commonText.sending}
              onClick={() => open.mutate()}
            >
              {text.declineDo}
            </Button>
            <Button onClick={() => setAsking(false)}>{commonText.cancel}</Button>
          </Actions>
        </Dialog>
      ) : null}
    </>
  );
}
