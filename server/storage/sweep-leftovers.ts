import { readdir, rm, stat } from 'node:fs/promises';
import path from 'node:path';

/** Longer than any upload or rendering may take, so that nothing of another living process is touched. */
const ABANDONED_MS = 24 * 60 * 60 * 1000;
/** Where uploads and renderings under way have their files until they are taken over. */
const FOLDERS = ['incoming', 'work'];

/** Removes what uploads and renderings left behind when their process was killed in the middle. */
export async function sweepLeftovers(storageDir: string, now: Date): Promise<void> {
  for (const folder of FOLDERS.map((name) => path.join(storageDir, name))) {
    const names = await readdir(folder).catch(() => []);
    for (const name of names) {
      const leftover = path.join(folder, name);
      const { mtimeMs } = await stat(leftover).catch(() => ({ mtimeMs: now.getTime() }));
      if (now.getTime() - mtimeMs > ABANDONED_MS) await rm(leftover, { recursive: true, force: true });
    }
  }
}
