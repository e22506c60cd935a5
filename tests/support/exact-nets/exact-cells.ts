import { cellsOf, type NetCells } from '#shared/compute/cells/cells.ts';
import { modelNet, type NetModel } from '#shared/compute/net/net-model.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { singleInputs } from '#shared/compute/single-inputs.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';

/** The net of a document in order with its cells, as the reading of it makes them. */
export function cellsOfDocument(document: FlowNetDocument): {
  model: NetModel;
  net: NetCells;
  map: SectionMap;
} {
  const { map } = readSetOut(document);
  if (map === null) throw new Error('The document is not set out.');
  const { water, count } = singleInputs(document);
  const model = modelNet(document, map, water, count.tracingAccuracyPx);
  return { model, net: cellsOf(model, count.tracingAccuracyPx), map };
}
