import type { Actor } from '#server/http/route-record.ts';
import { PRESENCE_LEASE_MS, type PresenceBeat, type PresenceDto } from '#shared/contract/presence.ts';
import type { ServiceDeps } from './service-deps.ts';

/** How many open desks are told of, so that an answer stays small whoever sends signs of life. */
const MOST_TOLD = 50;

/** One desk of one person on one net. */
interface OpenDesk {
  netId: string;
  damId: string;
  clientId: string;
}

/** Times are the database's, which all server processes share. */
const ALIVE = `seen_at > now() - interval '${PRESENCE_LEASE_MS} milliseconds'`;

/**
 * Who has a net open. Each desk holds a lease that its signs of life renew; the others are told only when somebody
 * comes, goes or takes up something else.
 */
export function createPresenceService({ manager, live }: Pick<ServiceDeps, 'manager' | 'live'>) {
  const announce = ({ damId, netId }: OpenDesk) => live.publish(manager, { type: 'presence', damId, netId });

  async function beat(desk: OpenDesk, actor: Actor, { tool, entityId }: PresenceBeat): Promise<PresenceDto> {
    const { netId, clientId } = desk;
    const known: unknown[] = await manager.query(
      `SELECT FROM net_presence WHERE net_id = $1 AND client_id = $2 AND person_id = $3
        AND tool = $4 AND entity_id IS NOT DISTINCT FROM $5 AND ${ALIVE}`,
      [netId, clientId, actor.id, tool, entityId],
    );
    // A number that another person uses is left with that person.
    await manager.query(
      `INSERT INTO net_presence AS held (net_id, client_id, person_id, tool, entity_id)
        VALUES ($1, $2, $3, $4, $5)
        ON CONFLICT (net_id, client_id) DO UPDATE
        SET tool = excluded.tool, entity_id = excluded.entity_id, seen_at = now()
        WHERE held.person_id = excluded.person_id`,
      [netId, clientId, actor.id, tool, entityId],
    );
    const lapsed = await removeLapsed(netId);
    if (known.length === 0 || lapsed > 0) await announce(desk);
    return present(netId);
  }

  /** Rows that somebody renews at this moment are passed over: two signs of life never wait for one another. */
  async function removeLapsed(netId: string): Promise<number> {
    const [, count]: [unknown, number] = await manager.query(
      `DELETE FROM net_presence WHERE net_id = $1 AND client_id IN (
        SELECT client_id FROM net_presence WHERE net_id = $1 AND NOT (${ALIVE}) FOR UPDATE SKIP LOCKED)`,
      [netId],
    );
    return count;
  }

  async function leave(desk: OpenDesk, actor: Actor): Promise<void> {
    const [, count]: [unknown, number] = await manager.query(
      'DELETE FROM net_presence WHERE net_id = $1 AND client_id = $2 AND person_id = $3',
      [desk.netId, desk.clientId, actor.id],
    );
    if (count > 0) await announce(desk);
  }

  async function present(netId: string): Promise<PresenceDto> {
    const rows: Array<{
      client_id: string;
      id: string;
      name: string;
      tool: string;
      entity_id: string | null;
    }> = await manager.query(
      `SELECT n.client_id, p.id, p.name, n.tool, n.entity_id
          FROM net_presence n JOIN person p ON p.id = n.person_id
          WHERE n.net_id = $1 AND p.deactivated_at IS NULL AND n.${ALIVE}
          ORDER BY p.name, n.client_id LIMIT ${MOST_TOLD}`,
      [netId],
    );
    return {
      desks: rows.map((row) => ({
        clientId: row.client_id,
        person: { id: row.id, name: row.name },
        tool: row.tool,
        entityId: row.entity_id,
      })),
    };
  }

  return { beat, leave, present };
}
