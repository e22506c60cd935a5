import { AppError } from '#server/errors/app-error.ts';
import type { NetReading } from '#shared/contract/reading.ts';

/** Readings kept in memory; a reading of a big net takes some 100 kB. */
const KEPT = 64;

/**
 * The newest readings by what they are the reading of. A key names the net with its change number, so a reading kept
 * under it never goes stale; the one asked for least recently makes room. Who asks while it is being read waits for
 * the same reading. That a net cannot be read is kept as well; a failure of the server is tried again.
 */
export function createReadingCache() {
  const kept = new Map<string, Promise<NetReading>>();

  function begin(key: string, read: () => Promise<NetReading>): Promise<NetReading> {
    const reading = read();
    reading.catch((error: unknown) => {
      if (!(error instanceof AppError)) kept.delete(key);
    });
    return reading;
  }

  return {
    get(key: string, read: () => Promise<NetReading>): Promise<NetReading> {
      const reading = kept.get(key) ?? begin(key, read);
      kept.delete(key);
      kept.set(key, reading);
      const [oldest] = kept.keys();
      if (kept.size > KEPT && oldest !== undefined) kept.delete(oldest);
      return reading;
    },
  };
}
