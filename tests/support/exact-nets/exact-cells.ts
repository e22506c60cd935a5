import { cellsOf, type NetCells } from '#shared/compute/cells/cells.ts';
import { headsOf, type NetHeads } from '#shared/compute/net/net-heads.ts';
import { modelNet, type NetModel } from '#shared/compute/net/net-model.ts';
import { type NetCheckInputs, netCheckOf } from '#shared/compute/net-check/net-check.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { singleInputs } from '#shared/compute/single-inputs.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetCheckReading } from '#shared/contract/reading-net-check.ts';

type CellsOfDocument = { model: NetModel; net: NetCells; map: SectionMap; heads: NetHeads };

/** The net of an isotropic document in order with its cells, in pixels of the sheet. */
export function cellsOfDocument(document: FlowNetDocument): CellsOfDocument {
  const { map } = readSetOut(document);
  if (map === null) throw new Error('The document is not set out.');
  const { water, count } = singleInputs(document);
  const model = modelNet(document, map, water, count.tracingAccuracyPx);
  const heads = headsOf(model, map, water.headwater, count.drops, count.tracingAccuracyPx * map.unitsPerPx);
  return { model, net: cellsOf(model, count.tracingAccuracyPx), map, heads };
}

/** What an isotropic document's net is checked with, `seepage` and `channels` as stated for it. */
export function checkInputsOf(
  document: FlowNetDocument,
  stated: { seepage: number | null; channels: number | null } = { seepage: null, channels: null },
): NetCheckInputs {
  const { model, net, heads } = cellsOfDocument(document);
  const { count, water } = singleInputs(document);
  return {
    model,
    cells: net,
    heads,
    enteredRatio: count.cellRatio,
    accuracyPx: count.tracingAccuracyPx,
    gammaW: water.gammaW,
    quantities: stated,
    relativeK: () => 1,
    hasCommonSection: true,
    toSheet: (place) => place,
  };
}

/** The check of an isotropic document's net. */
export function checkOfDocument(...given: Parameters<typeof checkInputsOf>): NetCheckReading {
  return netCheckOf(checkInputsOf(...given));
}
