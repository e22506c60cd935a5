import { type FormEvent, type ReactNode, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { Actions, Dialog } from '#client/components/dialog.tsx';
import { TextArea } from '#client/components/field.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { commonText } from '#client/text/common.ts';
import { checkText as text } from '#client/text/revisions.ts';
import { MAX_NOTE_LENGTH } from '#shared/contract/limits.ts';
import { useWithdrawAcceptance, useWithdrawSending } from '../api/revision-mutations.ts';
import { isSigned, SignatureFields, UNSIGNED } from './signature-fields.tsx';

/** Corrects a wrong acceptance by a signed record with its reason. */
export function AcceptanceWithdrawal({ revisionId }: { revisionId: string }) {
  const [open, setOpen] = useState(false);
  const [signature, setSignature] = useState(UNSIGNED);
  const [tried, setTried] = useState(false);
  const withdraw = useWithdrawAcceptance(revisionId);
  return (
    <Opened name={text.withdrawAcceptance} open={open} onOpen={setOpen}>
      <ReasonForm
        lead={text.withdrawAcceptanceLead}
        verb={text.withdrawAcceptance}
        busy={withdraw.isPending}
        error={withdraw.error}
        onClose={() => setOpen(false)}
        onSubmit={(reason) => {
          setTried(true);
          if (reason === '' || !isSigned(signature)) return;
          withdraw.mutate({ reason, ...signature }, { onSuccess: () => setOpen(false) });
        }}
      >
        <SignatureFields signature={signature} asked={tried} error={withdraw.error} onChange={setSignature} />
      </ReasonForm>
    </Opened>
  );
}

/** Takes the revision back from checking, before anybody has decided. */
export function SendingWithdrawal({ revisionId }: { revisionId: string }) {
  const [open, setOpen] = useState(false);
  const withdraw = useWithdrawSending(revisionId);
  return (
    <Opened name={text.withdrawSending} open={open} onOpen={setOpen}>
      <ReasonForm
        lead={text.withdrawSendingLead}
        verb={text.withdrawSending}
        busy={withdraw.isPending}
        error={withdraw.error}
        onClose={() => setOpen(false)}
        onSubmit={(reason) => {
          if (reason !== '') withdraw.mutate({ reason }, { onSuccess: () => setOpen(false) });
        }}
      />
    </Opened>
  );
}

interface OpenedProps {
  name: string;
  open: boolean;
  onOpen: (open: boolean) => void;
  children: ReactNode;
}

function Opened({ name, open, onOpen, children }: OpenedProps) {
  return (
    <div>
      <Button look="quiet" onClick={() => onOpen(true)}>
        {name}
      </Button>
      {open ? (
        <Dialog title={name} onClose={() => onOpen(false)}>
          {children}
        </Dialog>
      ) : null}
    </div>
  );
}

interface ReasonFormProps {
  lead: string;
  verb: string;
  busy: boolean;
  error: unknown;
  children?: ReactNode;
  onSubmit: (reason: string) => void;
  onClose: () => void;
}

function ReasonForm({ lead, verb, busy, error, children, onSubmit, onClose }: ReasonFormProps) {
  const [reason, setReason] = useState('');
  const [tried, setTried] = useState(false);
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (busy) return;
    setTried(true);
    onSubmit(reason.trim());
  };
  return (
    <form onSubmit={submit} className="flex flex-col gap-3">
      <p className="m-0 text-ink-2">{lead}</p>
      <TextArea
        label={text.reason}
        error={tried && reason.trim() === '' ? text.reasonNeeded : null}
        maxLength={MAX_NOTE_LENGTH}
        value={reason}
        onChange={(event) => setReason(event.target.value)}
      />
      {children}
      <ProblemNote error={error} />
      <Actions>
        <Button type="submit" look="wrong" busy={busy} busyLabel={commonText.sending}>
          {verb}
        </Button>
        <Button onClick={onClose}>{commonText.cancel}</Button>
      </Actions>
    </form>
  );
}
