import { type EntityManager, In, MoreThan } from 'typeorm';
import { DocumentEntityRow, NetEntity } from '#server/entities/net-entity.ts';
import { notFound } from '#server/errors/app-error.ts';
import type { ChangesDto } from '#shared/contract/nets.ts';
import { personRefs } from './person-refs.ts';

/**
 * What changed in a net and its section after change `since`, removed entities with a null value. The number is read
 * before the entities: a change between the two is told again next time, never left out.
 */
export async function changesSince(
  manager: EntityManager,
  netId: string,
  since: number,
): Promise<ChangesDto> {
  const net = await manager.findOneBy(NetEntity, { id: netId });
  if (!net) throw notFound();
  const rows = await manager.find(DocumentEntityRow, {
    where: { ownerId: In([net.id, net.sectionId]), changeNumber: MoreThan(String(since)) },
    order: { changeNumber: 'ASC', entityId: 'ASC' },
  });
  const people = await personRefs(
    manager,
    rows.map((row) => row.changedBy),
  );
  return {
    changeNumber: Number(net.changeNumber),
    entities: rows.map((row) => ({
      id: row.entityId,
      version: row.version,
      value: row.removed ? null : row.value,
      changedBy: people.get(row.changedBy) ?? null,
      clientId: row.clientId,
    })),
  };
}
