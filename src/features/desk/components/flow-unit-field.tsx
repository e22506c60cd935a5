import { useStore } from 'zustand';
import { SelectField } from '#client/components/field.tsx';
import { exitsText } from '#client/text/exits.ts';
import { FLOW_UNITS, type FlowUnit } from '#shared/compute/quantities/seepage-volume.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import { chooseFlowUnit, flowUnitChoice, ownFlowUnit } from '../model/flow-unit.ts';

/** In which unit seepages are shown, here and in the title block. */
export function FlowUnitField({ unitSystem }: { unitSystem: UnitSystem }) {
  const chosen = useStore(flowUnitChoice, (state) => state.unit);
  return (
    <SelectField
      label={exitsText.seepage.unit}
      hint={exitsText.seepage.unitHint}
      value={chosen ?? ownFlowUnit(unitSystem)}
      onChange={(event) => chooseFlowUnit(event.target.value as FlowUnit)}
    >
      {FLOW_UNITS.map((unit) => (
        <option key={unit} value={unit}>
          {unit}
        </option>
      ))}
    </SelectField>
  );
}
