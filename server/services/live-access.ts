import type { EntityManager } from 'typeorm';
import type { LiveEvent } from '#shared/contract/live.ts';

/** What a live stream may carry to a person. */
export interface LiveAccess {
  personId: string;
  admin: boolean;
  damIds: ReadonlySet<string>;
}

/** What the person of this session may hear of now; null once the session or the person's sign-in has ended. */
export async function loadLiveAccess(
  manager: EntityManager,
  personId: string,
  sid: string,
): Promise<LiveAccess | null> {
  const rows: Array<{ admin: boolean; dam_ids: string[] }> = await manager.query(
    `SELECT p.admin, ARRAY(SELECT m.dam_id FROM membership m WHERE m.person_id = p.id) AS dam_ids
      FROM person p
      JOIN session s ON s.sid = $2 AND s.expire > now() AND s.sess -> 'passport' ->> 'user' = p.id::text
      WHERE p.id = $1 AND p.deactivated_at IS NULL`,
    [personId, sid],
  );
  const row = rows[0];
  return row ? { personId, admin: row.admin, damIds: new Set(row.dam_ids) } : null;
}

/** Whether an event concerns this person: the same rule as `dam.read`, or what is about themselves. */
export function mayHear(access: LiveAccess, event: LiveEvent): boolean {
  if (event.type === 'person' || event.type === 'notesRead') return event.personId === access.personId;
  return access.admin || access.damIds.has(event.damId);
}
