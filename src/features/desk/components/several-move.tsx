import { type FormEvent, useMemo, useState } from 'react';
import { useStore } from 'zustand';
import { Button } from '#client/components/button.tsx';
import { NumberField } from '#client/components/field.tsx';
import { numberFault } from '#client/lib/number-fault.ts';
import { parseTypedNumber } from '#client/lib/parse-number.ts';
import { editingText } from '#client/text/editing-lines.ts';
import { stepOnSheet } from '#shared/compute/geometry/edit-lines/shift.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { Choice } from './form-fields.tsx';
import type { VertexUnits } from './vertex-rows.ts';

const text = editingText.form;

/** Moves or copies what is chosen by typed figures: offset and elevation of the section, or pixels of the sheet. */
export function SeveralMove({ store }: { store: DeskStore }) {
  const document = useStore(store, (state) => state.document);
  const map = useMemo(() => readSetOut(document).map, [document]);
  const [wanted, setWanted] = useState<VertexUnits>('section');
  const [typed, setTyped] = useState({ first: '', second: '' });
  const [faults, setFaults] = useState<{ first?: string; second?: string }>({});
  const units = map === null ? 'sheet' : wanted;
  const names =
    units === 'sheet'
      ? { first: text.right, second: text.down }
      : {
          first: text.offset(unitNames(document.unitSystem).length),
          second: text.elevation(elevationUnit(document.unitSystem, document.datum)),
        };
  const go = (asCopy: boolean) => {
    const figures = { first: figureOf(typed.first), second: figureOf(typed.second) };
    const found = faultsOf(typed, figures);
    setFaults(found);
    if (Object.keys(found).length > 0) return;
    const by = [figures.first ?? 0, figures.second ?? 0] as [number, number];
    store.requestEdit({
      type: 'moveBy',
      by: units === 'sheet' || map === null ? by : stepOnSheet(map, by),
      asCopy,
    });
  };
  const field = (name: 'first' | 'second') => ({
    label: names[name],
    value: typed[name],
    error: faults[name] ?? null,
    onChange: (event: { target: { value: string } }) => setTyped({ ...typed, [name]: event.target.value }),
  });
  return (
    <form
      noValidate
      aria-label={text.move}
      className="flex flex-col gap-2 border-t border-rule pt-3"
      onSubmit={(event: FormEvent) => {
        event.preventDefault();
        go(false);
      }}
    >
      <h3 className="m-0 text-sm font-semibold">{text.move}</h3>
      {map === null ? null : (
        <Choice
          label={editingText.units.label}
          value={units}
          names={editingText.units.names}
          disabled={false}
          onCommit={setWanted}
        />
      )}
      <div className="grid grid-cols-2 gap-2">
        <NumberField {...field('first')} />
        <NumberField {...field('second')} />
      </div>
      <div className="flex gap-2">
        <Button type="submit" look="quiet">
          {text.moveNow}
        </Button>
        <Button look="quiet" onClick={() => go(true)}>
          {text.copyNow}
        </Button>
      </div>
    </form>
  );
}

const figureOf = (entered: string) => (entered.trim() === '' ? null : parseTypedNumber(entered));

/** An empty field is no move in that direction; both empty, or both zero, is none at all. */
function faultsOf(
  typed: { first: string; second: string },
  figures: { first: number | null; second: number | null },
): { first?: string; second?: string } {
  const faults: { first?: string; second?: string } = {};
  for (const name of ['first', 'second'] as const) {
    if (typed[name].trim() !== '' && figures[name] === null) faults[name] = numberFault(typed[name]);
  }
  const nothing = !figures.first && !figures.second;
  return Object.keys(faults).length === 0 && nothing ? { first: text.needed } : faults;
}
