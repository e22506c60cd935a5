import { type FormEvent, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { NumberField, TextField } from '#client/components/field.tsx';
import { numberFault } from '#client/lib/number-fault.ts';
import { parseTypedNumber } from '#client/lib/parse-number.ts';
import { pointFormText as text } from '#client/text/desk-forms.ts';
import { scheduleText, typedNumberText } from '#client/text/schedule.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import type { DeskFormProps } from './desk-form.ts';
import { FormPane } from './form-pane.tsx';
import { addTypedPoint } from './schedule-edits.ts';

const EMPTY = { name: '', offset: '', elevation: '' };
type Typed = typeof EMPTY;

/** A reading point typed by its coordinates, such as the tip of an instrument from its record. */
export function PointForm({
  document,
  reading,
  run,
  onClose,
  newId,
}: DeskFormProps & { newId: () => string }) {
  const [typed, setTyped] = useState<Typed>(EMPTY);
  const [faults, setFaults] = useState<Partial<Typed>>({});
  const fitted = reading?.setOut.state === 'fitted';
  const submit = (event: FormEvent) => {
    event.preventDefault();
    const found = faultsOf(typed);
    setFaults(found);
    const offset = parseTypedNumber(typed.offset);
    const elevation = parseTypedNumber(typed.elevation);
    if (Object.keys(found).length > 0 || offset === null || elevation === null) return;
    const edit = addTypedPoint(
      newId(),
      { name: typed.name.trim(), offset, elevation },
      reading?.points ?? [],
    );
    run(edit.label, edit.ops);
    setTyped(EMPTY);
  };
  const field = (name: keyof Typed) => ({
    value: typed[name],
    error: faults[name] ?? null,
    onChange: (event: { target: { value: string } }) => setTyped({ ...typed, [name]: event.target.value }),
  });
  return (
    <FormPane title={text.title} onClose={onClose}>
      {fitted ? null : <p className="m-0 text-attention">{scheduleText.needsSetOut}</p>}
      <form onSubmit={submit} noValidate className="flex flex-col gap-3">
        <TextField
          label={text.name}
          hint={text.nameHint}
          maxLength={120}
          autoComplete="off"
          {...field('name')}
        />
        <NumberField label={text.offset(unitNames(document.unitSystem).length)} {...field('offset')} />
        <NumberField
          label={text.elevation(elevationUnit(document.unitSystem, document.datum))}
          {...field('elevation')}
        />
        <div>
          <Button type="submit">{text.add}</Button>
        </div>
      </form>
    </FormPane>
  );
}

function faultsOf(typed: Typed): Partial<Typed> {
  const faults: Partial<Typed> = {};
  if (typed.name.trim() === '') faults.name = text.nameNeeded;
  for (const name of ['offset', 'elevation'] as const) {
    if (typed[name].trim() === '') faults[name] = typedNumberText.needed;
    else if (parseTypedNumber(typed[name]) === null) faults[name] = numberFault(typed[name]);
  }
  return faults;
}
