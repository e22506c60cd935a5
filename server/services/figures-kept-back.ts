import type { EntityManager } from 'typeorm';
import { conflict } from '#server/errors/app-error.ts';
import { figuresKeptBack } from '#server/errors/figures-kept-back.ts';

/** Whether the figures of a revision are kept back from a reader, who may still read blind. */
export async function areFiguresKeptBack(
  manager: EntityManager,
  revisionId: string,
  personId: string,
): Promise<boolean> {
  const [row] = await manager.query('SELECT figures_kept_back($1, $2) AS kept', [revisionId, personId]);
  return row.kept === true;
}

/** @throws AppError figures-kept-back when one of the nets has a revision that the reader may still read blind */
export async function refuseKeptBackNets(
  manager: EntityManager,
  netIds: readonly string[],
  personId: string,
): Promise<void> {
  const [row]: Array<{ id: string; label: string }> = await manager.query(
    'SELECT id, label FROM revision WHERE net_id = ANY ($1::uuid[]) AND figures_kept_back(id, $2) LIMIT 1',
    [netIds, personId],
  );
  if (row) throw figuresKeptBack(row);
}

export const figuresOpenAlready = () =>
  conflict(
    'conflict',
    'The figures are open',
    'You have opened the figures of this revision, or it no longer waits for you, so it cannot be read blind any more.',
  );
