import { Button } from '#client/components/button.tsx';
import { soilText as text } from '#client/text/desk-forms.ts';
import type { EntityOf } from '#shared/contract/document.ts';
import type { DeskFormProps } from './desk-form.ts';
import { Words } from './form-fields.tsx';
import { FormFindings, FormPane } from './form-pane.tsx';
import { removeSoil } from './soil-edits.ts';
import { SoilFields } from './soil-fields.tsx';
import { SoilPlaces } from './soil-places.tsx';

interface SoilFormProps extends DeskFormProps {
  soilId: string;
  /** Takes up the tool that marks places of this soil. */
  onPlace: () => void;
}

/** A soil of its own: its name, where it lies, and what is known of it. */
export function SoilForm({ soilId, onPlace, ...form }: SoilFormProps) {
  const { document, reading, disabled, run, onClose } = form;
  const value = document.entities[soilId]?.value;
  if (value?.kind !== 'soil') return null;
  const change = (changes: Partial<EntityOf<'soil'>>) =>
    run(text.labels.changed(value.name), [{ op: 'put', entityId: soilId, value: { ...value, ...changes } }]);
  const remove = () => {
    const edit = removeSoil(soilId, document);
    if (edit) run(edit.label, edit.ops);
    onClose();
  };
  const findings = (reading?.findings ?? []).filter((found) => found.entityIds.includes(soilId));
  return (
    <FormPane title={value.name || text.unnamed} onClose={onClose}>
      <FormFindings findings={findings} />
      <Words
        label={text.name}
        value={value.name}
        maxLength={120}
        disabled={disabled}
        onCommit={(name) => change({ name })}
      />
      <SoilPlaces soilId={soilId} soil={value} onPlace={onPlace} {...form} />
      <SoilFields soil={value} unitSystem={document.unitSystem} disabled={disabled} change={change} />
      {disabled ? null : (
        <div className="border-t border-rule pt-3">
          <Button look="wrong" onClick={remove}>
            {text.remove}
          </Button>
        </div>
      )}
    </FormPane>
  );
}
