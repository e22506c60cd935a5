import { useQuery } from '@tanstack/react-query';
import { type FormEvent, useState } from 'react';
import { v7 as uuidv7 } from 'uuid';
import { Button } from '#client/components/button.tsx';
import { Actions, Dialog } from '#client/components/dialog.tsx';
import { CheckField, TextArea, TextField } from '#client/components/field.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { commonText } from '#client/text/common.ts';
import { sendingText as text } from '#client/text/revisions.ts';
import { MAX_NOTE_LENGTH } from '#shared/contract/limits.ts';
import type { RevisionSummary, SendingDto } from '#shared/contract/revisions.ts';
import { useSendForChecking } from '../api/revision-mutations.ts';
import { sendingQuery } from '../api/revision-queries.ts';
import { ReviewerChoice } from './reviewer-choice.tsx';
import { type Reasons, StillOpen, withoutReason } from './still-open.tsx';

interface SendDialogProps {
  netId: string;
  /** Newest change of the server's that the sender has on the sheet. */
  changeNumber: number;
  onClose: () => void;
  onSent: (revision: RevisionSummary) => void;
}

/** Freezes the net as a revision and mails its link to a reviewer, after saying what is still open on it. */
export function SendDialog(props: SendDialogProps) {
  const sending = useQuery(sendingQuery(props.netId));
  const title = sending.data ? text.title(sending.data.nextLabel) : text.button;
  return (
    <Dialog title={title} onClose={props.onClose} wide>
      {sending.data ? <SendForm {...props} sending={sending.data} /> : null}
      {sending.isPending ? <p className="shown-late m-0 text-ink-2">{text.loading}</p> : null}
      <ProblemNote error={sending.error} />
      {sending.data ? null : (
        <Actions>
          <Button onClick={props.onClose}>{commonText.cancel}</Button>
        </Actions>
      )}
    </Dialog>
  );
}

function SendForm({
  netId,
  changeNumber,
  onClose,
  onSent,
  sending,
}: SendDialogProps & { sending: SendingDto }) {
  const free = sending.reviewers.filter((reviewer) => !reviewer.drew);
  const [reviewerIds, setReviewerIds] = useState(
    free.length === 1 ? free.map(({ person }) => person.id) : [],
  );
  const [dueOn, setDueOn] = useState('');
  const [blindFirst, setBlindFirst] = useState(false);
  const [message, setMessage] = useState('');
  const [fault, setFault] = useState<string | null>(null);
  const [reasons, setReasons] = useState<Reasons>({});
  const [asked, setAsked] = useState(false);
  const missing = withoutReason(sending.open, reasons).length;
  const [id] = useState(() => uuidv7());
  const send = useSendForChecking(netId);
  const input = () => ({
    id,
    reviewerIds,
    dueOn: dueOn || null,
    message,
    blindFirst,
    changeNumber,
    reasons: sending.open.map(({ key }) => ({ key, reason: reasons[key] ?? '' })),
  });
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (send.isPending) return;
    setAsked(true);
    if (reviewerIds.length === 0) setFault(text.chooseReviewer);
    else if (missing === 0) send.mutate(input(), { onSuccess: onSent });
  };
  const refused = sending.refusal !== null || free.length === 0;
  return (
    <form onSubmit={submit} className="flex flex-col gap-3">
      <p className="m-0 text-ink-2">{text.lead}</p>
      {sending.refusal ? (
        <p className="m-0 border-l-[3px] border-wrong pl-3 text-wrong">{sending.refusal}</p>
      ) : null}
      <StillOpen sending={sending} reasons={reasons} asked={asked} onReasons={setReasons} />
      <ReviewerChoice
        reviewers={sending.reviewers}
        chosen={reviewerIds}
        fault={fault}
        onChoose={(next) => {
          setReviewerIds(next);
          setFault(null);
        }}
      />
      <TextField
        label={text.dueOn}
        hint={text.dueOnHint}
        type="date"
        className="max-w-[13.75rem]"
        value={dueOn}
        onChange={(event) => setDueOn(event.target.value)}
      />
      <CheckField
        label={text.blindFirst}
        hint={text.blindFirstHint}
        checked={blindFirst}
        onChange={(event) => setBlindFirst(event.target.checked)}
      />
      <TextArea
        label={text.message}
        hint={text.messageHint}
        maxLength={MAX_NOTE_LENGTH}
        value={message}
        onChange={(event) => setMessage(event.target.value)}
      />
      <ProblemNote error={send.error} />
      {asked && missing > 0 ? (
        <p role="alert" className="m-0 text-sm text-wrong">
          {text.reasonsNeeded(missing)}
        </p>
      ) : null}
      <Actions>
        <Button
          type="submit"
          look="main"
          disabled={refused}
          busy={send.isPending}
          busyLabel={commonText.sending}
        >
          {text.send}
        </Button>
        <Button onClick={onClose}>{commonText.cancel}</Button>
      </Actions>
    </form>
  );
}
