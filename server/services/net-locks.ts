import type { EntityManager } from 'typeorm';
import { notFound } from '#server/errors/app-error.ts';

/**
 * Locks of nets, always taken in this order: the section, then its nets by id. Whatever changes a document or makes
 * a net holds the section's lock, because known points belong to all nets of a section; whatever counts within one
 * net (notes, revisions) holds that net's.
 */

/** Locks a section row. FOR NO KEY UPDATE lets rows that only refer to it be written meanwhile. */
export async function lockSection(manager: EntityManager, sectionId: string): Promise<void> {
  const rows: unknown[] = await manager.query('SELECT id FROM section WHERE id = $1 FOR NO KEY UPDATE', [
    sectionId,
  ]);
  if (rows.length === 0) throw notFound();
}

/** Locks the section of a net. */
export async function lockSectionOfNet(manager: EntityManager, netId: string): Promise<void> {
  const rows: unknown[] = await manager.query(
    'SELECT id FROM section WHERE id = (SELECT section_id FROM net WHERE id = $1) FOR NO KEY UPDATE',
    [netId],
  );
  if (rows.length === 0) throw notFound();
}

export interface LockedNet {
  id: string;
  changeNumber: number;
}

/** Locks one net and returns its newest change number. */
export async function lockNet(manager: EntityManager, netId: string): Promise<LockedNet> {
  const rows: Array<{ id: string; change_number: string }> = await manager.query(
    'SELECT id, change_number FROM net WHERE id = $1 FOR NO KEY UPDATE',
    [netId],
  );
  const row = rows[0];
  if (!row) throw notFound();
  return { id: row.id, changeNumber: Number(row.change_number) };
}

/** Locks all nets of a section, in id order, and returns their newest change numbers. */
export async function lockNetsOfSection(manager: EntityManager, sectionId: string): Promise<LockedNet[]> {
  const rows: Array<{ id: string; change_number: string }> = await manager.query(
    'SELECT id, change_number FROM net WHERE section_id = $1 ORDER BY id FOR NO KEY UPDATE',
    [sectionId],
  );
  return rows.map((row) => ({ id: row.id, changeNumber: Number(row.change_number) }));
}
