import { withoutTremor } from '#shared/compute/geometry/tremor.ts';
import type { DocumentEntity, FlowNetDocument } from '#shared/contract/document.ts';

/** Kept as long as the line's value is: a line that was not touched is not worked out again. */
const kept = new WeakMap<DocumentEntity, { readonly accuracyPx: number; readonly steady: DocumentEntity }>();

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
  const known = kept.get(value);
  if (known?.accuracyPx === accuracyPx) return known.steady;
  const points = withoutTremor(value.points, accuracyPx);
  const steady: DocumentEntity =
    points === value.points ? value : { ...value, points: points.map(([x, y]) => [x, y]) };
  kept.set(value, { accuracyPx, steady });
  return steady;
}
