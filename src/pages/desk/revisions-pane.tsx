import { useQuery } from '@tanstack/react-query';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { FormPane } from '#client/features/desk/components/form-pane.tsx';
import { revisionListQuery } from '#client/features/revisions/api/revision-queries.ts';
import { RevisionHistory } from '#client/features/revisions/components/revision-history.tsx';
import { CalculationSheetPanel } from '#client/features/sheets/components/calculation-sheet-panel.tsx';
import { checkText } from '#client/text/revisions.ts';

/** The revisions of the net in the margin. */
export function RevisionsPane({
  netId,
  flush,
  onClose,
}: {
  netId: string;
  flush: () => Promise<void>;
  onClose: () => void;
}) {
  const revisions = useQuery(revisionListQuery(netId));
  return (
    <FormPane title={checkText.historyTitle} onClose={onClose}>
      <ProblemNote error={revisions.error} />
      {revisions.data ? <RevisionHistory revisions={revisions.data} presentId={null} /> : null}
      <CalculationSheetPanel netId={netId} revisionId={null} before={flush} />
    </FormPane>
  );
}
