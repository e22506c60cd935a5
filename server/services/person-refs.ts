import { type EntityManager, In } from 'typeorm';
import { PersonEntity } from '#server/entities/person-entity.ts';
import type { PersonRef } from '#shared/contract/common.ts';

/** The named people by id; nulls and repeats among the ids are taken in stride. */
export async function personRefs(
  manager: EntityManager,
  ids: ReadonlyArray<string | null>,
): Promise<Map<string, PersonRef>> {
  const wanted = [...new Set(ids.filter((each) => each !== null))];
  if (wanted.length === 0) return new Map();
  const people = await manager.find(PersonEntity, {
    select: { id: true, name: true },
    where: { id: In(wanted) },
  });
  return new Map(people.map(({ id, name }) => [id, { id, name }]));
}
