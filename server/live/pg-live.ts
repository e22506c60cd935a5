import pg from 'pg';
import type { Logger } from 'pino';
import * as z from 'zod/mini';
import { liveEvent } from '#shared/contract/live.ts';
import { createListeners } from './live-listeners.ts';
import type { LivePort } from './live-port.ts';

const CHANNEL = 'tracehead_live';
const RECONNECT_MS = 1000;

export interface PgLiveOptions {
  url: string;
  /** Role taken on connecting, where one login serves owner and application. */
  role?: string;
  logger: Logger;
}

/**
 * Announcements through PostgreSQL's NOTIFY, which delivers at commit, to all processes. Each process listens on
 * one connection of its own; when that breaks it connects again and says that there was a gap.
 */
export function createPgLive({ url, role, logger }: PgLiveOptions): LivePort {
  const { subscribe, tell, tellGap } = createListeners();
  let client: pg.Client | null = null;
  let timer: NodeJS.Timeout | null = null;
  let stopped = false;

  function onNotification({ payload }: pg.Notification): void {
    const event = z.safeParse(liveEvent, JSON.parse(payload ?? 'null'));
    // A newer server on the same database may announce what this one does not know.
    if (event.success) tell(event.data);
  }

  async function connect(): Promise<void> {
    const next = new pg.Client({
      connectionString: url,
      application_name: 'tracehead-live',
      keepAlive: true,
      ...(role ? { options: `-c role=${role}` } : {}),
    });
    let lost = false;
    const onLost = (error?: Error) => {
      if (lost || stopped) return;
      lost = true;
      logger.warn({ err: error }, 'the live channel broke and is opened again');
      client = null;
      timer = setTimeout(reconnect, RECONNECT_MS);
    };
    next.on('error', onLost);
    next.on('end', () => onLost());
    next.on('notification', onNotification);
    await next.connect();
    await next.query(`LISTEN ${CHANNEL}`);
    client = next;
  }

  function reconnect(): void {
    connect().then(
      // Only now, listening again: what is fetched from here on misses nothing.
      () => tellGap(),
      (error: unknown) => {
        if (stopped) return;
        logger.warn({ err: error }, 'the live channel could not be opened');
        timer = setTimeout(reconnect, RECONNECT_MS);
      },
    );
  }

  return {
    subscribe,
    async publish(manager, event) {
      await manager.query('SELECT pg_notify($1, $2)', [CHANNEL, JSON.stringify(event)]);
    },
    start: connect,
    async stop() {
      stopped = true;
      if (timer) clearTimeout(timer);
      await client?.end();
    },
  };
}
