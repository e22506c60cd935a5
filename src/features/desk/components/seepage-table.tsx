import { useStore } from 'zustand';
import { NO_FIGURE, plainText } from '#client/lib/figures.ts';
import { exitsText } from '#client/text/exits.ts';
import { flowIn } from '#shared/compute/quantities/seepage-volume.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { flowUnitChoice, ownFlowUnit } from '../model/flow-unit.ts';
import { powerRuns } from './figure-runs.ts';
import { FlowUnitField } from './flow-unit-field.tsx';
import { PlainTable } from './plain-table.tsx';
import { Runs } from './runs.tsx';

const text = exitsText.seepage;

/** The seepage to each outlet and of the whole flow, in the unit that is chosen. */
export function SeepageTable({ document, reading }: { document: FlowNetDocument; reading: NetReading }) {
  const { unitSystem } = document;
  const unit = useStore(flowUnitChoice, (state) => state.unit) ?? ownFlowUnit(unitSystem);
  const { outlets, seepage, seepageFigures, drops, channels, channelsComplete } = reading.quantities;
  const flow = (value: number | null) =>
    value === null ? NO_FIGURE : <Runs runs={powerRuns(flowIn(unit, value, unitSystem), seepageFigures)} />;
  const rows = outlets.map((outlet) => ({
    key: outlet.id,
    cells: [outlet.label, plainText(outlet.drops, 3), plainText(outlet.channels, 3), flow(outlet.seepage)],
  }));
  const whole = {
    key: 'whole',
    cells: [text.whole, plainText(drops, 3), plainText(channels, 3), flow(seepage)],
  };
  return (
    <div className="flex flex-wrap items-end gap-x-6 gap-y-2">
      <div className="min-w-64 flex-1">
        <PlainTable
          caption={text.title}
          columns={[
            { head: text.outlet, words: true },
            { head: text.drops },
            { head: text.channels },
            { head: `${unitSystem === 'SI' ? text.perMetre : text.perFoot}, ${unit}` },
          ]}
          rows={outlets.length > 1 ? [...rows, whole] : [whole]}
        />
        {seepage === null || channelsComplete ? null : (
          <p className="m-0 text-sm text-attention">{text.tracedOnly}</p>
        )}
      </div>
      <FlowUnitField unitSystem={unitSystem} />
    </div>
  );
}
