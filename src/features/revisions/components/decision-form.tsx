import { useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { TextArea } from '#client/components/field.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { commonText } from '#client/text/common.ts';
import { checkText as text } from '#client/text/revisions.ts';
import { MAX_NOTE_LENGTH } from '#shared/contract/limits.ts';
import type { DecisionKind } from '#shared/contract/revisions.ts';
import { useDecide } from '../api/revision-mutations.ts';
import { isSigned, SignatureFields, UNSIGNED } from './signature-fields.tsx';

type Choice = Extract<DecisionKind, 'accepted' | 'acceptedWithNotes' | 'returned'>;

/** The reviewer's decision, signed. */
export function DecisionForm({ revisionId }: { revisionId: string }) {
  const [note, setNote] = useState('');
  const [signature, setSignature] = useState(UNSIGNED);
  const [tried, setTried] = useState<Choice | null>(null);
  const decide = useDecide(revisionId);
  const noteMissing = tried !== null && tried !== 'accepted' && note.trim() === '';
  const choose = (decision: Choice) => {
    if (decide.isPending) return;
    setTried(decision);
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
