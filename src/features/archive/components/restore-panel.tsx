import { type FormEvent, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { Field, inputClass } from '#client/components/field.tsx';
import { Panel } from '#client/components/panel.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { archivesText as text } from '#client/text/archives.ts';
import type { RestoredDto } from '#shared/contract/archives.ts';
import { useRestoreDam } from '../api/restore-mutation.ts';

/** Brings a dam back from an archive that was taken here or elsewhere. */
export function RestorePanel({ onRestored }: { onRestored: (restored: RestoredDto) => void }) {
  const [file, setFile] = useState<File>();
  const [fault, setFault] = useState<string>();
  const restore = useRestoreDam();
  const choose = (chosen: File | undefined) => {
    setFile(chosen);
    setFault(undefined);
    restore.reset();
  };
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (restore.isPending) return;
    if (file === undefined) setFault(text.fileNeeded);
    else restore.mutate(file, { onSuccess: onRestored });
  };
  return (
    <Panel title={text.restoreTitle} look="register">
      <form onSubmit={submit} className="flex flex-col items-start gap-3 p-3.5">
        <p className="m-0">{text.restoreLead}</p>
        <ProblemNote error={restore.error} />
        <Field label={text.file} error={fault}>
          {(wiring) => (
            <input
              type="file"
              accept=".zip,application/zip"
              disabled={restore.isPending}
              className={inputClass(fault !== undefined)}
              onChange={(event) => choose(event.target.files?.[0])}
              {...wiring}
            />
          )}
        </Field>
        <Button type="submit" busy={restore.isPending}>
          {text.restore}
        </Button>
        {restore.isPending ? (
          <p role="status" className="m-0 text-sm text-ink-2">
            {text.checking}
          </p>
        ) : null}
      </form>
    </Panel>
  );
}
