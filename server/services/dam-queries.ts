import type { EntityManager } from 'typeorm';
import { notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import { damActionsFor } from '#server/policies/dam-policy.ts';
import type { DamRole } from '#shared/contract/actions.ts';
import type { DamDto } from '#shared/contract/dams.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import { isUnreadBy } from './unread-notes.ts';

interface DamRow {
  id: string;
  name: string;
  unit_system: UnitSystem;
  datum: string;
  full_supply_level: number | null;
  gamma_w: number;
  archived_at: Date | null;
  roles: DamRole[] | null;
  drawing_count: number;
  open_note_count: number;
  unread_note_count: number;
}

/** Notes in use on a dam `d`. */
const NOTES_OF_DAM = `FROM note o JOIN net n ON n.id = o.net_id JOIN section c ON c.id = n.section_id
      JOIN sheet s ON s.id = c.sheet_id JOIN drawing w ON w.id = s.drawing_id
      WHERE w.dam_id = d.id AND w.archived_at IS NULL AND n.archived_at IS NULL AND c.archived_at IS NULL`;

/** The same rule as `dam.read` in the policy: members see their dams, admins all. $1 = person, $2 = admin. */
const DAMS_SEEN_BY = `SELECT d.*, m.roles,
    (SELECT count(*)::int FROM drawing w WHERE w.dam_id = d.id AND w.archived_at IS NULL) AS drawing_count,
    (SELECT count(*)::int ${NOTES_OF_DAM} AND o.state <> 'closed') AS open_note_count,
    (SELECT count(*)::int ${NOTES_OF_DAM} AND m.person_id IS NOT NULL AND ${isUnreadBy('$1')}) AS unread_note_count
  FROM dam d LEFT JOIN membership m ON m.dam_id = d.id AND m.person_id = $1
  WHERE (m.person_id IS NOT NULL OR $2::boolean)`;

function toDto(row: DamRow, actor: Actor): DamDto {
  const roles = row.roles ?? [];
  return {
    id: row.id,
    name: row.name,
    unitSystem: row.unit_system,
    datum: row.datum,
    fullSupplyLevel: row.full_supply_level,
    gammaW: row.gamma_w,
    archivedAt: row.archived_at?.toISOString() ?? null,
    roles,
    can: damActionsFor({ admin: actor.admin, roles }),
    drawingCount: row.drawing_count,
    openNoteCount: row.open_note_count,
    unreadNoteCount: row.unread_note_count,
  };
}

/** The dams the actor may see, by name: those in use, or those put away. */
export async function listDams(manager: EntityManager, actor: Actor, archived: boolean): Promise<DamDto[]> {
  const rows: DamRow[] = await manager.query(
    `${DAMS_SEEN_BY} AND (d.archived_at IS NOT NULL) = $3 ORDER BY d.name, d.id`,
    [actor.id, actor.admin, archived],
  );
  return rows.map((row) => toDto(row, actor));
}

/** @throws AppError not-found */
export async function getDam(manager: EntityManager, actor: Actor, damId: string): Promise<DamDto> {
  const rows: DamRow[] = await manager.query(`${DAMS_SEEN_BY} AND d.id = $3`, [actor.id, actor.admin, damId]);
  if (!rows[0]) throw notFound();
  return toDto(rows[0], actor);
}
