import { type FormEvent, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { Button } from '#client/components/button.tsx';
import { Actions, Dialog } from '#client/components/dialog.tsx';
import { Field, inputClass, TextField } from '#client/components/field.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { paths } from '#client/lib/paths.ts';
import { commonText } from '#client/text/common.ts';
import { netFileText as text } from '#client/text/net-files.ts';
import { MAX_NET_FILE_BYTES } from '#shared/contract/limits.ts';
import type { NetFileQuestion } from '#shared/contract/net-files.ts';
import { type NetFileTarget, openQuestions, useTakeNetFile } from '../api/net-file-mutations.ts';
import { nameInFile } from './name-in-file.ts';

const EMPTY = { name: '', sectionName: '', text: '' };
type Typed = typeof EMPTY;

interface NetFileDialogProps {
  title: string;
  lead: string;
  target: NetFileTarget;
  onClose: () => void;
}

/** Takes a net file: says what is wrong with it, asks what differs, and opens the net it became. */
export function NetFileDialog({ title, lead, target, onClose }: NetFileDialogProps) {
  const [typed, setTyped] = useState<Typed>(EMPTY);
  const [faults, setFaults] = useState<Partial<Typed>>({});
  const take = useTakeNetFile(target);
  const navigate = useNavigate();
  const notice = useNotice();
  const questions = openQuestions(take.error);
  const isBlank = 'damId' in target;
  const change = (changes: Partial<Typed>) => {
    setTyped((before) => ({ ...before, ...changes }));
    setFaults({});
    take.reset();
  };
  const chooseFile = async (file: File | undefined) => {
    const { content, fault } = await contentOf(file);
    change({ text: content, name: typed.name || nameInFile(content) });
    if (fault) setFaults({ text: fault });
  };
  const send = (accepted: readonly NetFileQuestion[]) =>
    take.mutate(
      { ...typed, accepted },
      {
        onSuccess: ({ net, told }) => {
          notice([text.made, ...told].join(' '));
          void navigate(paths.net(net.id));
        },
      },
    );
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (take.isPending) return;
    const found = faultsOf(typed, isBlank);
    setFaults(found);
    if (Object.keys(found).length === 0) send(questions.map(({ code }) => code));
  };
  return (
    <Dialog title={title} onClose={onClose}>
      <form onSubmit={submit} className="flex flex-col gap-3" noValidate>
        <p className="m-0 text-ink-2">{lead}</p>
        {questions.length > 0 ? <Questions questions={questions} /> : <ProblemNote error={take.error} />}
        <FileField error={faults.text} onFile={(file) => void chooseFile(file)} />
        {isBlank ? (
          <TextField
            label={text.section}
            hint={text.sectionHint}
            maxLength={200}
            value={typed.sectionName}
            error={faults.sectionName}
            onChange={(event) => change({ sectionName: event.target.value })}
          />
        ) : null}
        <TextField
          label={text.name}
          hint={text.nameHint}
          maxLength={200}
          value={typed.name}
          error={faults.name}
          onChange={(event) => change({ name: event.target.value })}
        />
        <Actions>
          <Button type="submit" look="main" busy={take.isPending} busyLabel={commonText.saving}>
            {questions.length > 0 ? text.makeAllTheSame : text.make}
          </Button>
          <Button look="quiet" onClick={onClose}>
            {commonText.cancel}
          </Button>
        </Actions>
      </form>
    </Dialog>
  );
}

function FileField({
  error,
  onFile,
}: {
  error: string | undefined;
  onFile: (file: File | undefined) => void;
}) {
  return (
    <Field label={text.file} error={error}>
      {(wiring) => (
        <input
          type="file"
          accept=".json,application/json"
          className={inputClass(error !== undefined)}
          onChange={(event) => onFile(event.target.files?.[0])}
          {...wiring}
        />
      )}
    </Field>
  );
}

function Questions({ questions }: { questions: ReturnType<typeof openQuestions> }) {
  return (
    <ul role="alert" className="m-0 flex list-none flex-col gap-2 bg-doubt p-2">
      {questions.map((question) => (
        <li key={question.code}>
          <b className="font-semibold text-attention">{text.accept[question.code]}.</b> {question.text}
        </li>
      ))}
    </ul>
  );
}

async function contentOf(file: File | undefined): Promise<{ content: string; fault: string | null }> {
  if (!file) return { content: '', fault: null };
  if (file.size > MAX_NET_FILE_BYTES) return { content: '', fault: text.tooLarge };
  try {
    return { content: await file.text(), fault: null };
  } catch {
    return { content: '', fault: text.unreadable };
  }
}

function faultsOf(typed: Typed, isBlank: boolean): Partial<Typed> {
  return {
    ...(typed.text === '' ? { text: text.fileNeeded } : {}),
    ...(typed.name.trim() === '' ? { name: text.nameNeeded } : {}),
    ...(isBlank && typed.sectionName.trim() === '' ? { sectionName: text.sectionNeeded } : {}),
  };
}
