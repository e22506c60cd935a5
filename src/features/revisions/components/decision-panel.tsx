import { checkText as text } from '#client/text/revisions.ts';
import type { RevisionDto } from '#shared/contract/revisions.ts';
import { namesText } from '#shared/text/names-text.ts';
import { DecisionForm } from './decision-form.tsx';
import { RecordList } from './record-list.tsx';
import { AcceptanceWithdrawal, SendingWithdrawal } from './withdrawals.tsx';

/** What was decided so far, and what the reader may sign, or the sentence why not. */
export function DecisionPanel({ revision }: { revision: RevisionDto }) {
  const { summary, decideRefusal, canWithdrawAcceptance, canWithdrawSending } = revision;
  const { id, state, reviewers, decisions, supersededBy } = summary;
  const asked = reviewers.filter((person) => decisions.every((each) => each.decidedBy.id !== person.id));
  return (
    <section aria-labelledby="decision" className="flex flex-col gap-2 border-t border-rule px-3 py-2">
      <h2 id="decision" className="m-0 text-base font-bold">
        {text.decisionTitle}
      </h2>
      <RecordList decisions={decisions} />
      {supersededBy ? (
        <p className="m-0 font-semibold text-attention">{text.superseded(supersededBy)}</p>
      ) : null}
      {state === 'waiting' && decideRefusal !== null ? (
        <div>
          <p className="m-0 text-attention">{text.waiting(namesText(asked))}</p>
          <p className="m-0 text-ink-2">{decideRefusal}</p>
        </div>
      ) : null}
      {state === 'waiting' && decideRefusal === null ? <DecisionForm revision={revision} /> : null}
      {canWithdrawAcceptance ? <AcceptanceWithdrawal revisionId={id} /> : null}
      {canWithdrawSending ? <SendingWithdrawal revisionId={id} /> : null}
    </section>
  );
}
