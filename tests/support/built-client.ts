import path from 'node:path';
import { ensureClient } from '#server/start/client-build.mjs';

/** Browser tests look at the pages as they are built for use. */
export async function setup(): Promise<void> {
  await ensureClient(path.resolve(import.meta.dirname, '..', '..'));
}
