import { formText, permeabilityText as text } from '#client/text/desk-forms.ts';
import type { EntityOf, UnitSystem } from '#shared/contract/document.ts';
import { MAX_PERMEABILITY } from '#shared/contract/limits.ts';
import { unitNames } from '#shared/text/unit-text.ts';
import { Choice, Figure, NeededFigure, Words } from './form-fields.tsx';

/** What the soil of the section and a soil of its own have in common. */
export type SoilProperties = Omit<EntityOf<'permeability'>, 'kind'>;

interface SoilFieldsProps {
  soil: SoilProperties;
  unitSystem: UnitSystem;
  disabled: boolean;
  change: (changes: Partial<SoilProperties>) => void;
}

/** Permeability with its unit, along the bedding and across it, how well it is known, and the weights of the soil. */
export function SoilFields(props: SoilFieldsProps) {
  const { soil, disabled, change } = props;
  return (
    <>
      <div className="grid grid-cols-[3fr_2fr] items-start gap-2">
        <Figure
          label={text.k}
          hint={text.kHint}
          value={soil.k}
          optional
          positive
          most={MAX_PERMEABILITY}
          disabled={disabled}
          onCommit={(k) => change({ k })}
        />
        <Choice
          label={text.unit}
          value={soil.unit}
          names={text.units}
          disabled={disabled}
          onCommit={(unit) => change({ unit })}
        />
      </div>
      <AnisotropyFields {...props} />
      <Figure
        label={text.factor}
        hint={text.factorHint}
        value={soil.factor}
        optional
        atLeast={{ least: 1, fault: text.factorTooSmall }}
        disabled={disabled}
        onCommit={(factor) => change({ factor })}
      />
      <WeightFields {...props} />
      <Words
        label={formText.source}
        hint={formText.sourceHint}
        value={soil.source}
        maxLength={500}
        disabled={disabled}
        onCommit={(source) => change({ source })}
      />
    </>
  );
}

function AnisotropyFields({ soil, disabled, change }: SoilFieldsProps) {
  return (
    <>
      <Figure
        label={text.kv(soil.unit)}
        hint={text.kvHint}
        value={soil.kv}
        optional
        positive
        most={MAX_PERMEABILITY}
        disabled={disabled}
        onCommit={(kv) => change({ kv })}
      />
      {soil.kv === null && soil.dipDeg === 0 ? null : (
        <NeededFigure
          label={text.dip}
          hint={text.dipHint}
          value={soil.dipDeg}
          within={{ least: -90, greatest: 90, fault: text.dipFault }}
          disabled={disabled}
          onCommit={(dipDeg) => change({ dipDeg })}
        />
      )}
    </>
  );
}

const PROPERTIES = ['specificGravity', 'voidRatio'] as const;
const WEIGHTS = ['saturatedUnitWeight', 'moistUnitWeight'] as const;

function WeightFields({ soil, unitSystem, disabled, change }: SoilFieldsProps) {
  const { unitWeight } = unitNames(unitSystem);
  const field = (name: (typeof WEIGHTS)[number] | (typeof PROPERTIES)[number]) => (
    <Figure
      key={name}
      label={text.weights[name](unitWeight)}
      value={soil[name]}
      optional
      positive
      disabled={disabled}
      onCommit={(value) => change({ [name]: value })}
    />
  );
  return (
    <fieldset className="m-0 border-0 border-t border-rule p-0 pt-2">
      <legend className="float-left mb-1 w-full text-sm font-semibold">{text.weightsTitle}</legend>
      <p className="m-0 mb-2 clear-both text-sm text-ink-2">{text.weightsLead}</p>
      <div className="grid grid-cols-2 items-end gap-2">
        {WEIGHTS.map(field)}
        {PROPERTIES.map(field)}
      </div>
    </fieldset>
  );
}
