import { type FormEvent, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { NumberField, SelectField, TextField } from '#client/components/field.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { fieldMessage } from '#client/lib/api-problem.ts';
import { enteredText } from '#client/lib/figures.ts';
import { numberFault } from '#client/lib/number-fault.ts';
import { parseTypedNumber } from '#client/lib/parse-number.ts';
import { commonText } from '#client/text/common.ts';
import { damSettingsText as settings } from '#client/text/dam-settings.ts';
import { damsText as text } from '#client/text/dams.ts';
import type { DamDto } from '#shared/contract/dams.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import type { DamInput } from '../api/dam-mutations.ts';
import { gammaUnit } from './dam-facts.tsx';

/** Usual unit weight of water in the system's own unit. */
const USUAL_GAMMA: Record<UnitSystem, number> = { SI: 9.81, US: 62.4 };

interface Typed {
  name: string;
  unitSystem: UnitSystem;
  datum: string;
  fullSupplyLevel: string;
  gammaW: string;
}

const typedFrom = (dam: DamDto | undefined): Typed => ({
  name: dam?.name ?? '',
  unitSystem: dam?.unitSystem ?? 'SI',
  datum: dam?.datum ?? '',
  fullSupplyLevel: enteredText(dam?.fullSupplyLevel ?? null),
  gammaW: enteredText(dam?.gammaW ?? USUAL_GAMMA.SI),
});

/** The input, or the message of the field that cannot be read. */
function readTyped(typed: Typed): { input: DamInput } | { field: keyof Typed; message: string } {
  const level = typed.fullSupplyLevel.trim() === '' ? null : parseTypedNumber(typed.fullSupplyLevel);
  if (level === null && typed.fullSupplyLevel.trim() !== '')
    return { field: 'fullSupplyLevel', message: numberFault(typed.fullSupplyLevel) };
  const gammaW = parseTypedNumber(typed.gammaW);
  if (gammaW === null) return { field: 'gammaW', message: numberFault(typed.gammaW) };
  if (gammaW <= 0) return { field: 'gammaW', message: settings.gammaPositive };
  const { name, unitSystem, datum } = typed;
  return { input: { name, unitSystem, datum, fullSupplyLevel: level, gammaW } };
}

interface DamFormProps {
  dam?: DamDto;
  error: unknown;
  busy: boolean;
  submitLabel: string;
  /** The main button only where the form is the page's main work. */
  isMain?: boolean;
  onSubmit: (input: DamInput) => void;
}

/** What a dam is: name, units, datum, full supply level, unit weight of water. */
export function DamForm({ dam, error, busy, submitLabel, isMain = false, onSubmit }: DamFormProps) {
  const [typed, setTyped] = useState(() => typedFrom(dam));
  const [wrong, setWrong] = useState<{ field: keyof Typed; message: string } | null>(null);
  const set = (change: Partial<Typed>) => setTyped({ ...typed, ...change });
  const errorOf = (field: keyof Typed) =>
    wrong?.field === field ? wrong.message : fieldMessage(error, field);
  const lengthUnit = typed.unitSystem === 'SI' ? 'm' : 'ft';
  const submit = (event: FormEvent) => {
    event.preventDefault();
    const read = readTyped(typed);
    setWrong('field' in read ? read : null);
    if ('input' in read && !busy) onSubmit(read.input);
  };
  const changeSystem = (unitSystem: UnitSystem) => {
    const untouched = typed.gammaW === enteredText(USUAL_GAMMA[typed.unitSystem]);
    set(untouched ? { unitSystem, gammaW: enteredText(USUAL_GAMMA[unitSystem]) } : { unitSystem });
  };
  return (
    <form onSubmit={submit} className="flex flex-col gap-3">
      <ProblemNote error={error} />
      <TextField
        label={settings.name}
        required
        maxLength={200}
        error={errorOf('name')}
        value={typed.name}
        onChange={(event) => set({ name: event.target.value })}
      />
      <SelectField
        label={settings.unitSystem}
        hint={dam ? settings.unitsFixed : null}
        value={typed.unitSystem}
        onChange={(event) => changeSystem(event.target.value === 'US' ? 'US' : 'SI')}
      >
        <option value="SI">{settings.si}</option>
        <option value="US">{settings.us}</option>
      </SelectField>
      <TextField
        label={settings.datum}
        hint={settings.datumHint}
        maxLength={80}
        error={errorOf('datum')}
        value={typed.datum}
        onChange={(event) => set({ datum: event.target.value })}
      />
      <NumberField
        label={text.fullSupply}
        hint={settings.fullSupplyHint}
        unit={`${lengthUnit} ${typed.datum}`.trim()}
        error={errorOf('fullSupplyLevel')}
        value={typed.fullSupplyLevel}
        onChange={(event) => set({ fullSupplyLevel: event.target.value })}
      />
      <NumberField
        label={settings.gammaW}
        hint={settings.gammaWHint}
        unit={gammaUnit(typed)}
        error={errorOf('gammaW')}
        value={typed.gammaW}
        onChange={(event) => set({ gammaW: event.target.value })}
      />
      <div>
        <Button type="submit" look={isMain ? 'main' : 'plain'} busy={busy} busyLabel={commonText.saving}>
          {submitLabel}
        </Button>
      </div>
    </form>
  );
}
