import type { EntityManager, EntityTarget, ObjectLiteral } from 'typeorm';
import { conflict } from '#server/errors/app-error.ts';

/**
 * Ids are made where the thing is made; the same one a second time is a repeat or a mistake, never a new thing.
 * @throws AppError already-exists
 */
export async function refuseTakenId(
  manager: EntityManager,
  target: EntityTarget<ObjectLiteral>,
  id: string,
  thing: string,
): Promise<void> {
  if (!(await manager.existsBy(target, { id }))) return;
  throw conflict(
    'already-exists',
    'This exists already',
    `The ${thing} was made already. Reload the page to see it.`,
  );
}
