import { Link } from 'react-router-dom';
import { formatFullDay } from '#client/lib/dates.ts';
import { shortName } from '#client/lib/initials.ts';
import { paths } from '#client/lib/paths.ts';
import { compareText } from '#client/text/compare.ts';
import { checkText as text } from '#client/text/revisions.ts';
import type { RevisionSummary } from '#shared/contract/revisions.ts';

const STATE_COLOURS: Record<RevisionSummary['state'], string> = {
  waiting: 'text-attention',
  accepted: 'text-good',
  acceptedWithNotes: 'text-good',
  returned: 'text-wrong',
  acceptanceWithdrawn: 'text-wrong',
  withdrawn: 'text-ink-2',
};

/** The revisions of a net, newest first, each with its state. */
export function RevisionHistory({
  revisions,
  presentId,
  compareWith,
}: {
  revisions: readonly RevisionSummary[];
  /** The one shown on this page, which is not a link. */
  presentId: string | null;
  /** Where a revision stands beside what is shown. */
  compareWith: (revisionId: string) => string;
}) {
  if (revisions.length === 0) return <p className="m-0 text-ink-2">{text.historyEmpty}</p>;
  const newestFirst = [...revisions].sort((a, b) => (a.sentAt < b.sentAt ? 1 : -1));
  return (
    <ul className="m-0 list-none p-0">
      {newestFirst.map((revision) => (
        <li key={revision.id} className="border-b border-rule-2 py-1.5 last:border-b-0">
          <Title revision={revision} present={revision.id === presentId} />
          <span className="block text-ink-2">
            {text.sentBy(shortName(revision.sentBy.name), formatFullDay(revision.sentAt))},{' '}
            {text.to(revision.reviewers.map(({ name }) => shortName(name)).join(', '))}
          </span>
          {revision.decision?.note ? (
            <span className="block break-words whitespace-pre-line">{revision.decision.note}</span>
          ) : null}
          {revision.id === presentId ? null : (
            <Link
              to={compareWith(revision.id)}
              className="touch text-sm"
              aria-label={compareText.compareRevision(revision.label)}
            >
              {compareText.compare}
            </Link>
          )}
        </li>
      ))}
    </ul>
  );
}

function Title({ revision, present }: { revision: RevisionSummary; present: boolean }) {
  const { state, supersededBy } = revision;
  const heading = text.heading(revision.label);
  return (
    <span className="flex flex-wrap gap-x-2">
      {present ? (
        <b className="font-semibold">
          {heading}, {text.present}
        </b>
      ) : (
        <Link to={paths.revision(revision.id)} className="font-semibold">
          {heading}
        </Link>
      )}
      <span className={STATE_COLOURS[state]}>
        {text.state[state]}
        {supersededBy ? `, ${text.supersededShort(supersededBy)}` : ''}
      </span>
    </span>
  );
}
