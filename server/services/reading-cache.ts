import { AppError } from '#server/errors/app-error.ts';

/**
 * What was read off nets, by what it was read from; `most` of them are kept. A key names the net with its change
 * number, so what is kept under it never goes stale; what was asked for least recently makes room. Who asks while it is
 * being read waits for the same reading. That a net cannot be read is kept as well; a failure of the server is tried
 * again.
 */
export function createReadingCache<T>(most: number) {
  const kept = new Map<string, Promise<T>>();

  function begin(key: string, read: () => Promise<T>): Promise<T> {
    const reading = read();
    reading.catch((error: unknown) => {
      if (!(error instanceof AppError)) kept.delete(key);
    });
    return reading;
  }

  return {
    get(key: string, read: () => Promise<T>): Promise<T> {
      const reading = kept.get(key) ?? begin(key, read);
      kept.delete(key);
      kept.set(key, reading);
      const [oldest] = kept.keys();
      if (kept.size > most && oldest !== undefined) kept.delete(oldest);
      return reading;
    },
  };
}
