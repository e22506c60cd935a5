import type { FrozenNet } from '#shared/compute/compare-revisions.ts';
import type { DocumentEntity, FlowNetDocument, VersionedEntity } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';

/**
 * The second of two nets with the ids of the first wherever something is in both, so that they can be compared as two
 * revisions of one net are. The same is what has the same id; then a line of the same kind and course, as in a copied
 * net; then what alone has its kind and name; then, where both lose as many drops, the equipotentials of as many drops.
 * What is matched by none of it keeps its id. Documents and readings are not changed.
 */
export function alignedWith(one: FrozenNet, other: FrozenNet): FrozenNet {
  const ids = sharedIds(one, other);
  const idOf = (id: string) => ids.get(id) ?? id;
  const entities = Object.entries(other.document.entities).map(([id, entity]): [string, VersionedEntity] => [
    idOf(id),
    { ...entity, id: idOf(id) },
  ]);
  return {
    document: { ...other.document, entities: Object.fromEntries(entities) },
    reading: {
      ...other.reading,
      lines: other.reading.lines.map((line) => ({ ...line, id: idOf(line.id) })),
      points: other.reading.points.map((point) => ({ ...point, id: idOf(point.id) })),
    },
  };
}

type KeyOf = (id: string, value: DocumentEntity) => string | null;

/** Ids of the second net with those of the first that they stand for. */
function sharedIds(one: FrozenNet, other: FrozenNet): Map<string, string> {
  const ids = new Map<string, string>();
  const match = (ofOne: KeyOf, ofOther: KeyOf) => {
    const taken = new Set(ids.values());
    const left = uniqueIds(one.document, ofOne, (id) => !taken.has(id));
    const right = uniqueIds(other.document, ofOther, (id) => !ids.has(id));
    for (const [key, id] of right) {
      const found = left.get(key);
      if (found !== undefined) ids.set(id, found);
    }
  };
  match(byId, byId);
  match(byCourse, byCourse);
  match(byName, byName);
  const drops = one.reading.quantities.drops;
  if (drops !== null && drops === other.reading.quantities.drops)
    match(byDrops(one.reading), byDrops(other.reading));
  return ids;
}

const byId: KeyOf = (id) => id;

const byCourse: KeyOf = (_id, value) =>
  value.kind === 'line' && value.points.length > 1 ? `${value.line} ${JSON.stringify(value.points)}` : null;

const byName: KeyOf = (_id, value) => {
  const name = 'name' in value ? value.name.trim().toLowerCase() : '';
  if (name === '') return null;
  return `${value.kind} ${value.kind === 'line' ? value.line : ''} ${name}`;
};

const byDrops = ({ lines }: NetReading): KeyOf => {
  const drops = new Map(lines.map((line) => [line.id, line.drops]));
  return (id, value) => {
    const lost = value.kind === 'line' && value.line === 'equipotential' ? (drops.get(id) ?? null) : null;
    return lost === null ? null : `equipotential of ${lost}`;
  };
};

/** Ids by a key that only one entity has. */
function uniqueIds(
  { entities }: FlowNetDocument,
  keyOf: KeyOf,
  isLeft: (id: string) => boolean,
): Map<string, string> {
  const found = new Map<string, string[]>();
  for (const [id, { value }] of Object.entries(entities)) {
    const key = isLeft(id) ? keyOf(id, value) : null;
    if (key !== null) found.set(key, [...(found.get(key) ?? []), id]);
  }
  return new Map(
    [...found].flatMap(([key, sharing]) => (sharing.length === 1 ? [[key, sharing[0]!] as const] : [])),
  );
}
