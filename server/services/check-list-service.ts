import type { EntityManager } from 'typeorm';
import { v7 as uuidv7 } from 'uuid';
import { DamEntity } from '#server/entities/dam-entity.ts';
import { conflict, invalidInput, notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import type { CheckListDto, CheckListItem } from '#shared/contract/check-list.ts';
import { checkListOf } from '#shared/text/default-check-list.ts';
import { writeEvent } from './event-writer.ts';
import type { ServiceDeps } from './service-deps.ts';

/** The check list of a dam as it stands. @throws AppError not-found */
export async function checkListDtoOf(manager: EntityManager, damId: string): Promise<CheckListDto> {
  const dam = await manager.findOneBy(DamEntity, { id: damId });
  if (!dam) throw notFound();
  return { items: [...checkListOf(dam.checkList)], isUsual: dam.checkList === null };
}

/**
 * Gives a dam a check list of its own, or the usual one back with null. What reviewers have answered stays with the items
 * whose words stay. Runs in a transaction of the caller. @throws AppError not-found, conflict, invalid-input
 */
export async function changeCheckList(
  { manager, live }: Pick<ServiceDeps, 'manager' | 'live'>,
  damId: string,
  items: readonly CheckListItem[] | null,
  actor: Actor,
): Promise<void> {
  const dam = await manager.findOne(DamEntity, {
    where: { id: damId },
    lock: { mode: 'pessimistic_write' },
  });
  if (!dam) throw notFound();
  if (dam.archivedAt)
    throw conflict(
      'conflict',
      'This dam is put away',
      'Bring the dam back before you change anything on it.',
    );
  if (items && new Set(items.map(({ id }) => id)).size < items.length)
    throw invalidInput([{ path: 'items', message: 'an item stands in the list twice' }]);
  const checkList = items && withOwnIds(items, checkListOf(dam.checkList));
  await manager.update(DamEntity, { id: damId }, { checkList });
  const text = items ? 'changed the check list for reviewers' : 'put the usual check list for reviewers back';
  await writeEvent(manager, { damId, personId: actor.id, type: 'dam.checkListChanged', text });
  await live.publish(manager, { type: 'dam', damId });
}

/** An item whose words were changed is another one: no answer to the old words may stand for it. */
function withOwnIds(next: readonly CheckListItem[], before: readonly CheckListItem[]): CheckListItem[] {
  const words = new Map(before.map(({ id, text }) => [id, text]));
  return next.map((item) => (words.get(item.id) === item.text ? item : { ...item, id: uuidv7() }));
}
