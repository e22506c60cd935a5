import { formText, permeabilityText as text } from '#client/text/desk-forms.ts';
import { type EntityOf, singleOf } from '#shared/contract/document.ts';
import { MAX_PERMEABILITY } from '#shared/contract/limits.ts';
import type { DeskFormProps } from './desk-form.ts';
import { Choice, Figure, Words } from './form-fields.tsx';
import { FormFindings, FormPane, findingsFor } from './form-pane.tsx';

/** Permeability with its unit, the factor within which it is known, and where it comes from. */
export function PermeabilityForm({ document, reading, disabled, run, onClose }: DeskFormProps) {
  const held = singleOf(document, 'permeability');
  if (!held) return null;
  const { k, unit, factor, source } = held.value;
  const change = (changes: Partial<EntityOf<'permeability'>>) =>
    run(text.label, [{ op: 'put', entityId: held.id, value: { ...held.value, ...changes } }]);
  return (
    <FormPane title={text.title} onClose={onClose}>
      <p className="m-0 text-ink-2">{text.lead}</p>
      <FormFindings findings={findingsFor(reading?.findings, 'permeability', 'seepage')} />
      <div className="grid grid-cols-[3fr_2fr] items-start gap-2">
        <Figure
          label={text.k}
          hint={text.kHint}
          value={k}
          optional
          positive
          most={MAX_PERMEABILITY}
          disabled={disabled}
          onCommit={(next) => change({ k: next })}
        />
        <Choice
          label={text.unit}
          value={unit}
          names={text.units}
          disabled={disabled}
          onCommit={(next) => change({ unit: next })}
        />
      </div>
      <Figure
        label={text.factor}
        hint={text.factorHint}
        value={factor}
        optional
        atLeast={{ least: 1, fault: text.factorTooSmall }}
        disabled={disabled}
        onCommit={(next) => change({ factor: next })}
      />
      <Words
        label={formText.source}
        hint={formText.sourceHint}
        value={source}
        maxLength={500}
        disabled={disabled}
        onCommit={(next) => change({ source: next })}
      />
    </FormPane>
  );
}
