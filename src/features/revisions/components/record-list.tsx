import { formatMoment } from '#client/lib/dates.ts';
import { checkText as text } from '#client/text/revisions.ts';
import type { DecisionDto } from '#shared/contract/revisions.ts';

const COLOURS: Record<DecisionDto['decision'], string> = {
  accepted: 'text-good',
  acceptedWithNotes: 'text-good',
  returned: 'text-wrong',
  acceptanceWithdrawn: 'text-wrong',
  sendingWithdrawn: 'text-attention',
};

/** The records of a revision, oldest first, each with its signature and note. */
export function RecordList({ decisions }: { decisions: readonly DecisionDto[] }) {
  if (decisions.length === 0) return null;
  return (
    <ol className="m-0 flex list-none flex-col gap-1.5 p-0">
      {decisions.map((record) => (
        <li key={`${record.decision} ${record.decidedAt} ${record.decidedBy.id}`}>
          <span className={`block font-semibold ${COLOURS[record.decision]}`}>
            {text.records[record.decision](
              record.signedName || record.decidedBy.name,
              formatMoment(record.decidedAt),
            )}
          </span>
          {record.capacity ? (
            <span className="block text-ink-2">{text.signedAs(record.capacity)}</span>
          ) : null}
          {record.note ? <span className="block break-words whitespace-pre-line">{record.note}</span> : null}
        </li>
      ))}
    </ol>
  );
}
