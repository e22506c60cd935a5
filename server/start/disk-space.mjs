import { statfsSync } from 'node:fs';
import { faults } from './messages.mjs';

/** Below this the database could be stopped by a full disk in the middle of a change. */
export const DEFAULT_MIN_FREE_BYTES = 512 * 1024 * 1024;

/** @param {string} folder */
export function freeBytes(folder) {
  const disk = statfsSync(folder);
  return disk.bavail * disk.bsize;
}

/** @param {string} folder @param {NodeJS.ProcessEnv} env */
export function checkDiskSpace(folder, env) {
  const needed = Number(env.MIN_FREE_BYTES || DEFAULT_MIN_FREE_BYTES);
  const free = freeBytes(folder);
  if (free < needed) throw faults.diskFull(folder, free, needed);
}
