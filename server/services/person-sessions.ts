import type { EntityManager } from 'typeorm';
import type { LivePort } from '#server/live/live-port.ts';

/**
 * Ends a person's sessions on every device, but for `exceptSid`, and tells their live streams to look again
 * whether they still may listen.
 */
export async function endSessionsOf(
  { manager, live }: { manager: EntityManager; live: LivePort },
  personId: string,
  exceptSid: string | null = null,
): Promise<void> {
  await manager.query(
    `DELETE FROM session WHERE sess -> 'passport' ->> 'user' = $1 AND ($2::text IS NULL OR sid <> $2)`,
    [personId, exceptSid],
  );
  await live.publish(manager, { type: 'person', personId });
}
