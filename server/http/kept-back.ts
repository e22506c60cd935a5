import type { Request } from 'express';
import type { EntityManager } from 'typeorm';
import { figuresKeptBack } from '#server/errors/figures-kept-back.ts';
import type { Actor, DamScope, RouteRecord, TargetKind } from './route-record.ts';

/** The revisions whose figures a route about such a target may tell. */
const REVISIONS_OF: Partial<Record<TargetKind, string>> = {
  revision: 'r.id = $1',
  net: 'r.net_id = $1',
};

/**
 * Refuses whatever tells figures of a revision to a reviewer who may still read it blind: the net as it stands, its
 * schedule, notes and sheets as much as the frozen ones. A route that tells none says so with `figures: 'none'`.
 * @throws AppError figures-kept-back
 */
export async function refuseKeptBack(
  manager: EntityManager,
  record: RouteRecord,
  req: Request,
  { actor, scope }: { actor: Actor | null; scope: DamScope | null },
): Promise<void> {
  if (record.access.who !== 'dam' || record.figures === 'none' || actor === null) return;
  const condition = REVISIONS_OF[record.access.target];
  if (condition === undefined || !scope?.roles.includes('reviewer')) return;
  const rows: Array<{ id: string; label: string }> = await manager.query(
    `SELECT r.id, r.label FROM revision r WHERE ${condition} AND figures_kept_back(r.id, $2) LIMIT 1`,
    [req.params[`${record.access.target}Id`], actor.id],
  );
  const [row] = rows;
  if (row === undefined) return;
  throw figuresKeptBack(row);
}
