import type { FlowNetDocument, VersionedEntity } from '#shared/contract/document.ts';
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
