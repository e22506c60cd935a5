import { halfWidth } from '#shared/compute/doubt/contributions.ts';
import { setOutCauses } from '#shared/compute/doubt/place-doubt.ts';
import { type EndHead, headLostDoubt, type NetDoubt } from '#shared/compute/doubt/point-doubt.ts';
import { seepageDoubt } from '#shared/compute/doubt/seepage-doubt.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { verticesOf } from '#shared/compute/geometry/polyline.ts';
import type { NetHeads } from '#shared/compute/net/net-heads.ts';
import type { NetModel } from '#shared/compute/net/net-model.ts';
import { elevationAt, type Potential } from '#shared/compute/net/potentials.ts';
import type { SetOut } from '#shared/compute/set-out.ts';
import type { SingleInputs } from '#shared/compute/single-inputs.ts';
import type { WorkingFrame } from '#shared/compute/working-frame.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import type { QuantityDoubt } from '#shared/contract/reading-doubt.ts';
import type { CheckedCell } from '#shared/contract/reading-net-check.ts';

/** What all readings of one net have in common as to their doubt; see `readingDoubt`. */
export function netDoubtOf(
  document: FlowNetDocument,
  setOut: SetOut,
  frame: WorkingFrame,
  model: NetModel,
  heads: NetHeads,
  inputs: SingleInputs,
): NetDoubt {
  const headwater = model.potentials.find(({ role }) => role === 'headwater');
  const outlet = heads.outlets[0];
  return {
    setOut: setOutCauses(document, setOut),
    water: inputs.water,
    tracing: inputs.count.tracingAccuracyPx * frame.map.unitsPerPx,
    headwater: headwater === undefined ? { from: 'headwater', at: null } : endOf(headwater, frame),
    outlet: outlet === undefined ? { from: 'typed', at: null } : endOf(outlet, frame),
  };
}

/** Where the head of a boundary comes from: a level, a typed head, or the lowest place along it. */
function endOf({ line, level, shape }: Potential, frame: WorkingFrame): EndHead {
  if (line.value.head !== null) return { from: 'typed', at: null };
  if (line.kind === 'submergedFace') return { from: line.value.water ?? 'tailwater', at: null };
  const lowest = verticesOf(shape).reduce((low, at) =>
    elevationAt(frame.map, at[0], at[1]) < elevationAt(frame.map, low[0], low[1]) ? at : low,
  );
  const at = frame.toSheet(sheetPx(lowest[0], lowest[1]));
  return { from: level === null || line.kind === 'drain' ? 'place' : 'typed', at: sheetPx(at[0], at[1]) };
}

/** Nothing is said of quantities that are not there. */
export const NO_QUANTITY_DOUBT: QuantityDoubt = {
  headLost: null,
  headPerDrop: null,
  seepageFactor: null,
  seepageShares: [],
};

/**
 * Half-widths (95 %) of the net's quantities: head lost by the levels, head per drop by the same over Nd, seepage as a
 * factor from k, the head lost and the accuracy with which the cells are traced. Lengths in the document's unit.
 * Sources: see `headLostDoubt`, `seepageDoubt`.
 */
export function quantityDoubtOf(
  net: NetDoubt,
  quantities: NetReading['quantities'],
  cells: readonly CheckedCell[],
  inputs: SingleInputs,
): QuantityDoubt {
  const { headLost, headPerDrop, seepage } = quantities;
  const lost = headLost === null ? null : finiteOrNull(halfWidth(headLostDoubt(net)));
  const ofSeepage =
    seepage === null || headLost === null || lost === null
      ? { factor: null, shares: [] }
      : seepageDoubt({
          kFactor: inputs.permeability.factor,
          headLost,
          headLostPlusMinus: lost,
          cellRatioPart: cellRatioPart(cells, net.tracing),
        });
  return {
    headLost: lost,
    headPerDrop:
      headPerDrop === null || lost === null || headLost === null || headLost === 0
        ? null
        : finiteOrNull((lost * headPerDrop) / headLost),
    seepageFactor: ofSeepage.factor,
    seepageShares: [...ofSeepage.shares],
  };
}

/**
 * Half-width of the mean B/L of the judged cells as a part of it: each of a cell's four sides is off by the accuracy of
 * tracing by itself, so that the mean of n cells is known √n times better. Nothing is added where no cell is judged.
 */
function cellRatioPart(cells: readonly CheckedCell[], tracing: number): number {
  const parts = cells
    .filter(({ judgement, length, width }) => judgement !== 'notJudged' && length > 0 && width > 0)
    .map(({ length, width }) => Math.SQRT2 * tracing * Math.hypot(1 / length, 1 / width));
  if (parts.length === 0) return 0;
  const mean = Math.hypot(...parts) / parts.length;
  return Number.isFinite(mean) ? mean : 0;
}

function finiteOrNull(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}
