import { areAt } from '#shared/compute/geometry/polyline.ts';
import { withoutTremor } from '#shared/compute/geometry/tremor.ts';
import type { DocumentEntity, FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';

type Kept = { readonly from: Float64Array; readonly accuracyPx: number; readonly steady: SheetPoint[] };

/** Kept as long as the points of the line are: a line that was not touched is not worked out again. */
const kept = new WeakMap<readonly SheetPoint[], Kept>();

/**
 * The document with its traced lines free of the hand's tremor, see `withoutTremor`: what is read and judged is the
 * line that was meant, not each vertex. `accuracyPx`: the tracing accuracy, in the pixels of the traces.
 */
export function steadyTraces(document: FlowNetDocument, accuracyPx: number): FlowNetDocument {
  const entities = Object.entries(document.entities).map(
    ([id, entity]) => [id, { ...entity, value: steadied(entity.value, accuracyPx) }] as const,
  );
  return { ...document, entities: Object.fromEntries(entities) };
}

function steadied(value: DocumentEntity, accuracyPx: number): DocumentEntity {
  if (value.kind !== 'line') return value;
  const points = steadyPoints(value.points, accuracyPx);
  return points === value.points ? value : { ...value, points };
}

function steadyPoints(points: SheetPoint[], accuracyPx: number): SheetPoint[] {
  const known = kept.get(points);
  // Whoever changes a vertex in place must not be given the line of before.
  if (known?.accuracyPx === accuracyPx && areAt(points, known.from)) return known.steady;
  const smooth = withoutTremor(points, accuracyPx);
  const steady = smooth === points ? points : smooth.map(([x, y]): SheetPoint => [x, y]);
  kept.set(points, { from: Float64Array.from(points.flat()), accuracyPx, steady });
  return steady;
}
