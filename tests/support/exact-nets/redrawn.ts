import type { FlowNetDocument, SheetPoint, VersionedEntity } from '#shared/contract/document.ts';
import { entityIdOf } from '#tests/support/exact-nets/exact-net-document.ts';
import { seededRandom } from '#tests/support/exact-nets/seeded-noise.ts';

function withEntities(document: FlowNetDocument, entities: VersionedEntity[]): FlowNetDocument {
  return { ...document, entities: Object.fromEntries(entities.map((entity) => [entity.id, entity])) };
}

/** The same entities under ids in another order: as if they had been drawn in that order. */
export function drawnInAnotherOrder(document: FlowNetDocument, seed: number): FlowNetDocument {
  const random = seededRandom(seed);
  const shuffled = Object.values(document.entities)
    .map((entity) => ({ entity, key: random() }))
    .sort((a, b) => a.key - b.key);
  return withEntities(
    document,
    shuffled.map(({ entity }, i) => ({ ...entity, id: entityIdOf(i + 1) })),
  );
}

/** About half of the lines drawn the other way round. */
export function someLinesReversed(document: FlowNetDocument, seed: number): FlowNetDocument {
  const random = seededRandom(seed);
  return withEntities(
    document,
    Object.values(document.entities).map((entity) =>
      entity.value.kind === 'line' && random() < 0.5
        ? { ...entity, value: { ...entity.value, points: [...entity.value.points].reverse() } }
        : entity,
    ),
  );
}

/** A vertex more in the middle of every segment. */
export function withMoreVertices(document: FlowNetDocument): FlowNetDocument {
  return withEntities(
    document,
    Object.values(document.entities).map((entity) => {
      if (entity.value.kind !== 'line') return entity;
      const points = entity.value.points.flatMap((point, i, all): Array<[number, number]> => {
        const next = all[i + 1];
        return next === undefined ? [point] : [point, [(point[0] + next[0]) / 2, (point[1] + next[1]) / 2]];
      });
      return { ...entity, value: { ...entity.value, points } };
    }),
  );
}

/** Every line with a third of its vertices, stopping short of or running past its end by up to `gapPx`, some the other way round. */
export function drawnCarelessly(document: FlowNetDocument, gapPx: number, seed: number): FlowNetDocument {
  const random = seededRandom(seed);
  return withEntities(
    document,
    Object.values(document.entities).map((entity) => {
      if (entity.value.kind !== 'line') return entity;
      const all = entity.value.points;
      const points = all.filter((_, i) => i === 0 || i === all.length - 1 || i % 3 === 0);
      const last = points.length - 1;
      points[0] = moved(points[0]!, points[1]!, (2 * random() - 1) * gapPx);
      points[last] = moved(points[last]!, points[last - 1]!, (2 * random() - 1) * gapPx);
      return { ...entity, value: { ...entity.value, points: random() < 0.5 ? points : points.reverse() } };
    }),
  );
}

/** An end moved along its line, outwards for a positive distance in pixels. */
function moved(end: SheetPoint, before: SheetPoint, distance: number): SheetPoint {
  const length = Math.hypot(end[0] - before[0], end[1] - before[1]);
  return [
    end[0] + ((end[0] - before[0]) * distance) / length,
    end[1] + ((end[1] - before[1]) * distance) / length,
  ];
}
