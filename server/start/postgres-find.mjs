import { existsSync, readdirSync } from 'node:fs';
import path from 'node:path';
import { aptInstall, canInstall, forbidDebianCluster } from './apt.mjs';
import { faults } from './messages.mjs';
import { runCommand } from './run-command.mjs';

export const MIN_POSTGRES = 15;
const DEBIAN_ROOT = '/usr/lib/postgresql';

/** @typedef {{binDir: string, major: number}} PostgresPrograms */

/**
 * The newest PostgreSQL that will do, or the one of a given major version when a cluster was made by it.
 * Installs Debian's package when nothing is found and that is allowed.
 * @param {number | null} [madeBy]
 * @param {string} [dataDir] named in the fault when no installed version can open it
 * @returns {Promise<PostgresPrograms>}
 */
export async function ensurePostgres(madeBy = null, dataDir = '') {
  let found = await findPostgres();
  if (found.every((each) => each.major < MIN_POSTGRES)) {
    if (!canInstall()) throw faults.postgresMissing(missingSentence(found));
    forbidDebianCluster();
    await aptInstall('postgresql');
    found = await findPostgres();
  }
  const chosen = choosePostgres(found, madeBy);
  if (chosen) return chosen;
  if (madeBy === null) throw faults.postgresMissing(missingSentence(found));
  throw faults.wrongMajor(
    dataDir,
    madeBy,
    found.map((each) => each.major),
  );
}

/** @param {PostgresPrograms[]} found @param {number | null} madeBy */
export function choosePostgres(found, madeBy) {
  const fit = found.filter((each) => (madeBy === null ? each.major >= MIN_POSTGRES : each.major === madeBy));
  return fit.sort((a, b) => b.major - a.major)[0] ?? null;
}

/** @param {PostgresPrograms[]} found */
function missingSentence(found) {
  if (found.length === 0) return `PostgreSQL ${MIN_POSTGRES} or newer was not found.`;
  const newest = Math.max(...found.map((each) => each.major));
  return `PostgreSQL ${MIN_POSTGRES} or newer is needed and only ${newest} was found.`;
}

/**
 * Every PostgreSQL on the machine that has the programs to make and run a cluster.
 * @param {string} [debianRoot]
 * @returns {Promise<PostgresPrograms[]>}
 */
export async function findPostgres(debianRoot = DEBIAN_ROOT) {
  const debian = debianPostgres(debianRoot);
  // Asking each candidate for its version costs a process; Debian's folders say it in their name.
  if (debian.length > 0) return debian;
  const folders = [await binDirOfPgConfig(), ...(process.env.PATH ?? '').split(path.delimiter)];
  const versions = await Promise.all([...new Set(folders)].map(versionIn));
  return versions.filter((each) => each !== null);
}

/** @param {string} debianRoot @returns {PostgresPrograms[]} */
function debianPostgres(debianRoot) {
  if (!existsSync(debianRoot)) return [];
  return readdirSync(debianRoot)
    .filter((name) => /^\d+$/.test(name))
    .map((name) => ({ binDir: path.join(debianRoot, name, 'bin'), major: Number(name) }))
    .filter((each) => hasPrograms(each.binDir));
}

async function binDirOfPgConfig() {
  const answer = await runCommand('pg_config', ['--bindir']);
  return answer.code === 0 ? answer.output.trim() : '';
}

/** @param {string} binDir */
function hasPrograms(binDir) {
  return ['initdb', 'pg_ctl', 'postgres', 'psql'].every((name) => existsSync(path.join(binDir, name)));
}

/** @param {string} binDir @returns {Promise<PostgresPrograms | null>} */
async function versionIn(binDir) {
  if (!binDir || !hasPrograms(binDir)) return null;
  const answer = await runCommand(path.join(binDir, 'postgres'), ['--version']);
  const major = Number(/(\d+)(\.\d+|devel|beta|rc)/.exec(answer.output)?.[1]);
  return answer.code === 0 && major > 0 ? { binDir, major } : null;
}
