import { waterText as text } from '#client/text/desk-forms.ts';
import type { EntityOf, FlowNetDocument } from '#shared/contract/document.ts';
import { unitNames } from '#shared/text/unit-text.ts';
import { Figure } from './form-fields.tsx';

type WaterLevels = EntityOf<'waterLevels'>;
const FIELDS = ['headwaterPlusMinus', 'tailwaterPlusMinus', 'gammaWPlusMinus', 'datumPlusMinus'] as const;

/** How well the levels, the unit weight of water and the datum are known. */
export function LevelDoubtFields({
  levels,
  unitSystem,
  disabled,
  change,
}: {
  levels: WaterLevels;
  unitSystem: FlowNetDocument['unitSystem'];
  disabled: boolean;
  change: (changes: Partial<WaterLevels>) => void;
}) {
  const units = unitNames(unitSystem);
  return (
    <fieldset className="m-0 border-0 border-t border-rule p-0 pt-2">
      <legend className="float-left mb-1 w-full text-sm font-semibold">{text.doubtTitle}</legend>
      <p className="m-0 mb-2 clear-both text-sm text-ink-2">{text.doubtLead}</p>
      <div className="grid grid-cols-2 items-end gap-2">
        {FIELDS.map((name) => (
          <Figure
            key={name}
            label={text.doubts[name](name === 'gammaWPlusMinus' ? units.unitWeight : units.length)}
            value={levels[name]}
            optional
            atLeast={{ least: 0, fault: text.doubtTooSmall }}
            disabled={disabled}
            onCommit={(value) => change({ [name]: value })}
          />
        ))}
      </div>
    </fieldset>
  );
}
