import { createHash } from 'node:crypto';
import { chownSync, mkdirSync, rmSync } from 'node:fs';
import path from 'node:path';
import { isRoot } from './apt.mjs';
import { faults } from './messages.mjs';
import { runCommand } from './run-command.mjs';

const FALLBACK_ROOT = '/var/lib/tracehead';

/** @typedef {{uid: number, gid: number}} SystemUser */

/** PostgreSQL refuses to run as root; null means the present user will do. @returns {Promise<SystemUser | null>} */
export async function postgresUser() {
  if (!isRoot()) return null;
  const [uid, gid] = await Promise.all([idOf('-u'), idOf('-g')]);
  if (uid === null || gid === null) throw faults.noSystemUser();
  return { uid, gid };
}

/** @param {string} flag */
async function idOf(flag) {
  const answer = await runCommand('id', [flag, 'postgres']);
  return answer.code === 0 ? Number(answer.output.trim()) : null;
}

/**
 * Makes an empty folder the database user can write, inside `wanted` when it can get there. A checkout in
 * somebody's private home shuts that user out; then a folder below /var/lib is taken.
 * @param {string} wanted
 * @param {SystemUser | null} user
 */
export async function makeClusterFolder(wanted, user) {
  for (const folder of clusterFolders(wanted)) {
    rmSync(folder, { recursive: true, force: true });
    // Only the last folder is private: the database user has to pass through those above it.
    mkdirSync(path.dirname(folder), { recursive: true, mode: 0o755 });
    mkdirSync(folder, { mode: 0o700 });
    if (!user) return folder;
    chownSync(folder, user.uid, user.gid);
    if (await canWrite(folder, user)) return folder;
    rmSync(folder, { recursive: true });
  }
  throw faults.notWritable(wanted);
}

/** The places for it in order; below /var/lib one for each checkout, so that two do not meet. @param {string} wanted */
export function clusterFolders(wanted) {
  const checkout = createHash('sha256')
    .update(path.resolve(path.dirname(wanted)))
    .digest('hex')
    .slice(0, 12);
  return [wanted, path.join(FALLBACK_ROOT, checkout, path.basename(wanted))];
}

/** Asked of the system itself: file modes alone do not tell what mounts and ACLs allow. @param {string} folder @param {SystemUser} user */
async function canWrite(folder, user) {
  const test = await runCommand('sh', ['-c', 'test -w "$1" && cd "$1"', 'sh', folder], { user, cwd: '/' });
  return test.code === 0;
}
