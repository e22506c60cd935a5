import { useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { TextArea } from '#client/components/field.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { checkWorkText } from '#client/text/check-work.ts';
import { commonText } from '#client/text/common.ts';
import { checkText as text } from '#client/text/revisions.ts';
import { MAX_NOTE_LENGTH } from '#shared/contract/limits.ts';
import type { DecisionKind, RevisionDto } from '#shared/contract/revisions.ts';
import { useDecide } from '../api/revision-mutations.ts';
import { gapsOf } from './check-list.tsx';
import { isSigned, SignatureFields, UNSIGNED } from './signature-fields.tsx';

type Choice = Extract<DecisionKind, 'accepted' | 'acceptedWithNotes' | 'returned'>;

/** The reviewer's decision, signed. */
export function DecisionForm({ revision: { summary, checking } }: { revision: RevisionDto }) {
  const [note, setNote] = useState('');
  const [signature, setSignature] = useState(UNSIGNED);
  const [tried, setTried] = useState<Choice | null>(null);
  const decide = useDecide(summary.id);
  const noteMissing = tried !== null && tried !== 'accepted' && note.trim() === '';
  const gapText = checking ? gapWords(gapsOf(checking.checkList, checking.draft.answers)) : null;
  const choose = (decision: Choice) => {
    if (decide.isPending) return;
    setTried(decision);
    if (decision !== 'returned' && gapText !== null) return;
    if (!isSigned(signature) || (decision !== 'accepted' && note.trim() === '')) return;
    decide.mutate({ decision, note, ...signature });
  };
  return (
    <div className="flex flex-col gap-2">
      <p className="m-0 text-ink-2">{text.acceptLead}</p>
      <TextArea
        label={text.note}
        hint={text.noteForReturn}
        error={noteMissing ? text.noteNeeded : null}
        maxLength={MAX_NOTE_LENGTH}
        value={note}
        onChange={(event) => setNote(event.target.value)}
      />
      <SignatureFields
        signature={signature}
        asked={tried !== null}
        error={decide.error}
        onChange={setSignature}
      />
      {gapText !== null && tried !== null && tried !== 'returned' ? (
        <p role="alert" className="m-0 text-wrong">
          {gapText}
        </p>
      ) : null}
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
        <Button busy={decide.isPending} onClick={() => choose('acceptedWithNotes')}>
          {text.acceptWithNotes}
        </Button>
        <Button busy={decide.isPending} onClick={() => choose('returned')}>
          {text.return}
        </Button>
      </div>
    </div>
  );
}

/** What an acceptance still lacks of the check list; null when it lacks nothing. */
function gapWords({ unanswered, bare }: ReturnType<typeof gapsOf>): string | null {
  if (unanswered > 0) return checkWorkText.unanswered(unanswered);
  return bare > 0 ? checkWorkText.bare : null;
}
