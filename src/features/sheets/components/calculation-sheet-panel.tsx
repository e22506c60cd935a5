import { useQuery } from '@tanstack/react-query';
import { type FormEvent, useState } from 'react';
import { v7 as uuidv7 } from 'uuid';
import { Button } from '#client/components/button.tsx';
import { Field, inputClass, TextField } from '#client/components/field.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { formatMoment } from '#client/lib/dates.ts';
import { calculationSheetText as text } from '#client/text/calculation-sheet.ts';
import type { CalculationSheetDto, SheetPaper } from '#shared/contract/calculation-sheets.ts';
import { calculationSheetsQuery, sheetFileUrl, useAskForSheet } from '../api/calculation-sheets.ts';

interface PanelProps {
  netId: string;
  /** The revision whose sheet is asked for; null for the net as it stands. */
  revisionId: string | null;
  /** What has to be done first, such as saving what is not saved yet. */
  before?: () => Promise<void>;
}

/** Asks for the calculation sheet and offers those that were made. */
export function CalculationSheetPanel({ netId, revisionId, before }: PanelProps) {
  const sheets = useQuery(calculationSheetsQuery(netId));
  const ask = useAskForSheet(netId);
  const [paper, setPaper] = useState<SheetPaper>('A4');
  const [jobNumber, setJobNumber] = useState('');
  const submit = async (event: FormEvent) => {
    event.preventDefault();
    await before?.();
    ask.mutate({ id: uuidv7(), revisionId, paper, jobNumber });
  };
  const shown = sheets.data?.filter((sheet) => sheet.revisionId === revisionId) ?? [];
  return (
    <section aria-labelledby="calculation-sheet" className="border-t border-rule px-3 py-2">
      <h2 id="calculation-sheet" className="m-0 text-base font-bold">
        {text.title}
      </h2>
      <p className="m-0 text-ink-2">{revisionId === null ? text.leadDraft : text.leadRevision}</p>
      <form className="mt-2 flex flex-col gap-2" onSubmit={(event) => void submit(event)}>
        <Field label={text.paper}>
          {(wiring) => (
            <select
              className={inputClass(false)}
              value={paper}
              onChange={(event) => setPaper(event.target.value === 'A3' ? 'A3' : 'A4')}
              {...wiring}
            >
              <option value="A4">A4</option>
              <option value="A3">A3</option>
            </select>
          )}
        </Field>
        <TextField
          label={text.jobNumber}
          hint={text.jobNumberHint}
          maxLength={60}
          value={jobNumber}
          onChange={(event) => setJobNumber(event.target.value)}
        />
        <Button type="submit" busy={ask.isPending} busyLabel={text.making}>
          {text.make}
        </Button>
      </form>
      <ProblemNote error={ask.error ?? sheets.error} />
      <ul className="m-0 mt-2 list-none p-0" aria-live="polite">
        {shown.map((sheet) => (
          <SheetRow key={sheet.id} netId={netId} sheet={sheet} />
        ))}
      </ul>
    </section>
  );
}

function SheetRow({ netId, sheet }: { netId: string; sheet: CalculationSheetDto }) {
  const { state, paper, jobNumber, askedAt, byteSize, message } = sheet;
  return (
    <li className="border-b border-rule-2 py-1.5 last:border-b-0">
      <span className="block text-ink-2">
        {[paper, jobNumber, formatMoment(askedAt)].filter(Boolean).join(', ')}
      </span>
      {state === 'done' ? (
        <a href={sheetFileUrl(netId, sheet.id)} download className="font-semibold">
          {text.download}
          {byteSize === null ? '' : `, ${text.size(byteSize)}`}
        </a>
      ) : (
        <span className={state === 'failed' ? 'text-wrong' : 'text-ink-2'}>
          {state === 'failed' ? message : text.waiting}
        </span>
      )}
    </li>
  );
}
