import { permeabilityText as text } from '#client/text/desk-forms.ts';
import { singleOf } from '#shared/contract/document.ts';
import type { DeskFormProps } from './desk-form.ts';
import { FormFindings, FormPane, findingsFor } from './form-pane.tsx';
import { SoilFields, type SoilProperties } from './soil-fields.tsx';
import { SoilList } from './soil-list.tsx';

interface PermeabilityFormProps extends DeskFormProps {
  newId: () => string;
  onOpenSoil: (soilId: string) => void;
}

/** Permeability and weights of the section's soil, and the soils that lie in regions of their own. */
export function PermeabilityForm({ newId, onOpenSoil, ...form }: PermeabilityFormProps) {
  const { document, reading, disabled, run } = form;
  const held = singleOf(document, 'permeability');
  if (!held) return null;
  const change = (changes: Partial<SoilProperties>) =>
    run(text.label, [{ op: 'put', entityId: held.id, value: { ...held.value, ...changes } }]);
  return (
    <FormPane title={text.title} onClose={form.onClose}>
      <p className="m-0 text-ink-2">{text.lead}</p>
      <FormFindings findings={findingsFor(reading?.findings, 'permeability', 'seepage')} />
      <SoilFields soil={held.value} unitSystem={document.unitSystem} disabled={disabled} change={change} />
      <SoilList document={document} disabled={disabled} run={run} newId={newId} onOpenSoil={onOpenSoil} />
    </FormPane>
  );
}
