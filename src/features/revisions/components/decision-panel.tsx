import { useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { TextArea } from '#client/components/field.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { formatMoment } from '#client/lib/dates.ts';
import { commonText } from '#client/text/common.ts';
import { checkText as text } from '#client/text/revisions.ts';
import { MAX_NOTE_LENGTH } from '#shared/contract/limits.ts';
import type { RevisionDto } from '#shared/contract/revisions.ts';
import { useDecide } from '../api/revision-mutations.ts';

/** The reviewer's decision, or the sentence why this reader may not decide. */
export function DecisionPanel({ revision }: { revision: RevisionDto }) {
  const { decision, reviewer } = revision.summary;
  return (
    <section aria-labelledby="decision" className="px-3 py-2">
      <h2 id="decision" className="m-0 text-base font-bold">
        {text.decisionTitle}
      </h2>
      {decision ? <Decided decision={decision} /> : null}
      {decision || revision.decideRefusal === null ? null : (
        <>
          <p className="m-0 text-attention">{text.waiting(reviewer.name)}</p>
          <p className="m-0 text-ink-2">{revision.decideRefusal}</p>
        </>
      )}
      {!decision && revision.decideRefusal === null ? (
        <DecisionForm revisionId={revision.summary.id} />
      ) : null}
    </section>
  );
}

function Decided({ decision }: { decision: NonNullable<RevisionDto['summary']['decision']> }) {
  const accepted = decision.decision === 'accepted';
  const sentence = accepted ? text.accepted : text.returned;
  return (
    <>
      <p className={`m-0 font-semibold ${accepted ? 'text-good' : 'text-wrong'}`}>
        {sentence(decision.decidedBy.name, formatMoment(decision.decidedAt))}
      </p>
      {decision.note ? <p className="m-0 break-words whitespace-pre-line">{decision.note}</p> : null}
    </>
  );
}

function DecisionForm({ revisionId }: { revisionId: string }) {
  const [note, setNote] = useState('');
  const [fault, setFault] = useState<string | null>(null);
  const decide = useDecide(revisionId);
  const choose = (decision: 'accepted' | 'returned') => {
    if (decide.isPending) return;
    if (decision === 'returned' && note.trim() === '') setFault(text.noteNeeded);
    else decide.mutate({ decision, note });
  };
  return (
    <div className="flex flex-col gap-2">
      <p className="m-0 text-ink-2">{text.acceptLead}</p>
      <TextArea
        label={text.note}
        hint={text.noteForReturn}
        error={fault}
        maxLength={MAX_NOTE_LENGTH}
        value={note}
        onChange={(event) => {
          setNote(event.target.value);
          setFault(null);
        }}
      />
      <ProblemNote error={decide.error} />
      <div className="flex flex-wrap gap-2">
        <Button
          look="main"
          busy={decide.isPending}
          busyLabel={commonText.sending}
          onClick={() => choose('accepted')}
        >
          {text.accept}
        </Button>
        <Button busy={decide.isPending} onClick={() => choose('returned')}>
          {text.return}
        </Button>
      </div>
    </div>
  );
}
