import { type FormEvent, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { NumberField, TextArea } from '#client/components/field.tsx';
import { numberFault } from '#client/lib/number-fault.ts';
import { parseTypedNumber } from '#client/lib/parse-number.ts';
import { profileText as text } from '#client/text/profiles.ts';
import { typedNumberText } from '#client/text/schedule.ts';
import { MAX_FIGURE } from '#shared/contract/limits.ts';
import { type PasteError, pastePoints } from '#shared/text/paste-points.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import { addProfile } from '../model/profile-edits.ts';
import type { DeskFormProps } from './desk-form.ts';
import { FormPane } from './form-pane.tsx';

type ProfileFormProps = DeskFormProps & { newId: () => string; onMade: (id: string) => void };

/** So many wrong lines are named; whoever has more has copied the wrong columns. */
const NAMED_FAULTS = 5;

/** Makes a profile of places pasted from a spreadsheet; a line that cannot be read is named, and nothing is taken. */
export function PasteProfileForm({ document, reading, run, onClose, newId, onMade }: ProfileFormProps) {
  const [pasted, setPasted] = useState('');
  const [faults, setFaults] = useState<readonly PasteError[]>([]);
  const submit = (event: FormEvent) => {
    event.preventDefault();
    const found = pastePoints(pasted);
    if (!found.ok) return setFaults(found.errors);
    const large = found.points.flatMap((point, i) =>
      point.some((figure) => Math.abs(figure) > MAX_FIGURE)
        ? [{ line: i + 1, text: typedNumberText.tooLarge }]
        : [],
    );
    if (large.length > 0) return setFaults(large);
    const id = newId();
    const points = found.points.map(([offset, elevation]): [number, number] => [offset, elevation]);
    const edit = addProfile(id, document, { on: 'section', points });
    run(edit.label, edit.ops);
    onMade(id);
  };
  const { length } = unitNames(document.unitSystem);
  const more = faults.length - NAMED_FAULTS;
  return (
    <FormPane title={text.pasteForm.title} onClose={onClose}>
      <p className="m-0 text-ink-2">{text.pasteForm.lead}</p>
      {reading?.setOut.state === 'fitted' ? null : <p className="m-0 text-attention">{text.needsSetOut}</p>}
      <form onSubmit={submit} noValidate className="flex flex-col gap-3">
        <TextArea
          label={text.pasteForm.places(length, elevationUnit(document.unitSystem, document.datum))}
          rows={12}
          spellCheck={false}
          value={pasted}
          error={
            faults.length === 0 ? null : (
              <span role="alert" className="block">
                {faults.slice(0, NAMED_FAULTS).map((fault) => (
                  <span key={fault.line} className="block">
                    {text.pasteForm.line(fault.line, fault.text)}
                  </span>
                ))}
                {more > 0 ? <span className="block">{text.pasteForm.more(more)}</span> : null}
              </span>
            )
          }
          onChange={(event) => {
            setPasted(event.target.value);
            setFaults([]);
          }}
        />
        <div>
          <Button type="submit">{text.pasteForm.add}</Button>
        </div>
      </form>
    </FormPane>
  );
}

const FIELDS = ['offset1', 'elevation1', 'offset2', 'elevation2'] as const;
type GridField = (typeof FIELDS)[number];
const EMPTY: Record<GridField, string> = { offset1: '', elevation1: '', offset2: '', elevation2: '' };

/** Makes a grid of two opposite corners. */
export function GridProfileForm({ document, reading, run, onClose, newId, onMade }: ProfileFormProps) {
  const [typed, setTyped] = useState(EMPTY);
  const [faults, setFaults] = useState<Partial<Record<GridField, string>>>({});
  const submit = (event: FormEvent) => {
    event.preventDefault();
    const found = gridFaults(typed);
    setFaults(found);
    const [x1, z1, x2, z2] = FIELDS.map((field) => parseTypedNumber(typed[field]));
    if (Object.keys(found).length > 0 || x1 == null || z1 == null || x2 == null || z2 == null) return;
    const id = newId();
    const edit = addProfile(id, document, {
      on: 'grid',
      corners: [
        [x1, z1],
        [x2, z2],
      ],
    });
    run(edit.label, edit.ops);
    onMade(id);
  };
  const field = (name: GridField, label: string) => (
    <NumberField
      label={label}
      value={typed[name]}
      error={faults[name] ?? null}
      onChange={(event) => setTyped({ ...typed, [name]: event.target.value })}
    />
  );
  const { gridForm } = text;
  const { length } = unitNames(document.unitSystem);
  const level = elevationUnit(document.unitSystem, document.datum);
  return (
    <FormPane title={gridForm.title} onClose={onClose}>
      <p className="m-0 text-ink-2">{gridForm.lead}</p>
      {reading?.setOut.state === 'fitted' ? null : <p className="m-0 text-attention">{text.needsSetOut}</p>}
      <form onSubmit={submit} noValidate className="flex flex-col gap-3">
        {([1, 2] as const).map((corner) => (
          <fieldset key={corner} className="m-0 grid grid-cols-2 items-start gap-2 border-0 p-0">
            <legend className="mb-1 p-0 text-sm font-semibold">{gridForm.corners[corner - 1]}</legend>
            {field(`offset${corner}`, gridForm.offset(length))}
            {field(`elevation${corner}`, gridForm.elevation(level))}
          </fieldset>
        ))}
        <div>
          <Button type="submit">{gridForm.add}</Button>
        </div>
      </form>
    </FormPane>
  );
}

function gridFaults(typed: Record<GridField, string>): Partial<Record<GridField, string>> {
  const faults: Partial<Record<GridField, string>> = {};
  for (const field of FIELDS) {
    const parsed = parseTypedNumber(typed[field]);
    if (typed[field].trim() === '') faults[field] = typedNumberText.needed;
    else if (parsed === null) faults[field] = numberFault(typed[field]);
    else if (Math.abs(parsed) > MAX_FIGURE) faults[field] = typedNumberText.tooLarge;
  }
  const same = (a: GridField, b: GridField) => parseTypedNumber(typed[a]) === parseTypedNumber(typed[b]);
  if (Object.keys(faults).length === 0 && same('offset1', 'offset2') && same('elevation1', 'elevation2')) {
    faults.offset2 = text.gridForm.flat;
  }
  return faults;
}
