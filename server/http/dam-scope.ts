import type { EntityManager } from 'typeorm';
import type { DamRole } from '#shared/contract/actions.ts';
import type { Actor, DamScope, TargetKind } from './route-record.ts';

/** From each kind of target to its dam, as one query that takes the target's id. */
const DAM_OF: Record<TargetKind, string> = {
  dam: 'SELECT id AS dam_id FROM dam WHERE id = $1',
  drawing: 'SELECT dam_id FROM drawing WHERE id = $1',
  sheet: 'SELECT d.dam_id FROM sheet s JOIN drawing d ON d.id = s.drawing_id WHERE s.id = $1',
  section: `SELECT d.dam_id FROM section c JOIN sheet s ON s.id = c.sheet_id
    JOIN drawing d ON d.id = s.drawing_id WHERE c.id = $1`,
  net: `SELECT d.dam_id FROM net n JOIN section c ON c.id = n.section_id JOIN sheet s ON s.id = c.sheet_id
    JOIN drawing d ON d.id = s.drawing_id WHERE n.id = $1`,
  note: `SELECT d.dam_id FROM note o JOIN net n ON n.id = o.net_id JOIN section c ON c.id = n.section_id
    JOIN sheet s ON s.id = c.sheet_id JOIN drawing d ON d.id = s.drawing_id WHERE o.id = $1`,
  revision: `SELECT d.dam_id FROM revision r JOIN net n ON n.id = r.net_id JOIN section c ON c.id = n.section_id
    JOIN sheet s ON s.id = c.sheet_id JOIN drawing d ON d.id = s.drawing_id WHERE r.id = $1`,
};

const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/i;

/** The dam a target belongs to and the actor's parts on it; null when there is no such target. */
export async function loadDamScope(
  manager: EntityManager,
  actor: Actor,
  target: TargetKind,
  targetId: string,
): Promise<DamScope | null> {
  if (!UUID.test(targetId)) return null;
  const rows: Array<{ dam_id: string; roles: DamRole[] | null }> = await manager.query(
    `SELECT t.dam_id, m.roles FROM (${DAM_OF[target]}) t
     LEFT JOIN membership m ON m.dam_id = t.dam_id AND m.person_id = $2`,
    [targetId, actor.id],
  );
  const row = rows[0];
  return row ? { damId: row.dam_id, roles: row.roles ?? [], admin: actor.admin } : null;
}
