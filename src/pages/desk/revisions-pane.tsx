import { useQuery } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { Button } from '#client/components/button.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { FormPane } from '#client/features/desk/components/form-pane.tsx';
import { revisionListQuery } from '#client/features/revisions/api/revision-queries.ts';
import { RevisionHistory } from '#client/features/revisions/components/revision-history.tsx';
import { CalculationSheetPanel } from '#client/features/sheets/components/calculation-sheet-panel.tsx';
import { paths } from '#client/lib/paths.ts';
import { compareText } from '#client/text/compare.ts';
import { checkText } from '#client/text/revisions.ts';

/** The revisions of the net in the margin. */
export function RevisionsPane({
  netId,
  damId,
  flush,
  onClose,
}: {
  netId: string;
  damId: string;
  flush: () => Promise<void>;
  onClose: () => void;
}) {
  const now = { kind: 'net', id: netId } as const;
  const navigate = useNavigate();
  // What stands beside the other net is what the server holds.
  const compare = async () => {
    await flush();
    navigate(paths.compare(damId, now));
  };
  const revisions = useQuery(revisionListQuery(netId));
  return (
    <FormPane title={checkText.historyTitle} onClose={onClose}>
      <ProblemNote error={revisions.error} />
      {revisions.data ? (
        <RevisionHistory
          revisions={revisions.data}
          presentId={null}
          compareWith={(id) => paths.compare(damId, { kind: 'revision', id }, now)}
        />
      ) : null}
      <div>
        <Button look="quiet" onClick={compare}>
          {compareText.compareThis}
        </Button>
      </div>
      <CalculationSheetPanel netId={netId} revisionId={null} before={flush} />
    </FormPane>
  );
}
