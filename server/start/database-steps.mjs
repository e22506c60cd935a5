import { existsSync, readdirSync } from 'node:fs';
import path from 'node:path';
import { faults, say } from './messages.mjs';
import { startFiles } from './paths.mjs';
import { databaseUrls, startCluster } from './postgres-cluster.mjs';
import { migrationsDone } from './postgres-roles.mjs';
import { lastLines, runCommand } from './run-command.mjs';
import { keptSessionSecret } from './secrets.mjs';

/**
 * @typedef {object} OpenDatabase
 * @property {NodeJS.ProcessEnv} ownerEnv for scripts that change the schema
 * @property {NodeJS.ProcessEnv} appEnv for the server, which does not get the owner's password
 * @property {import('./postgres-cluster.mjs').RunningCluster | null} cluster null when DATABASE_URL was given
 */

/**
 * The database named in DATABASE_URL, or else the project's own cluster, started.
 * @param {string} storageDir
 * @param {NodeJS.ProcessEnv} env
 * @returns {Promise<OpenDatabase>}
 */
export async function openDatabase(storageDir, env) {
  const cluster = env.DATABASE_URL ? null : await startCluster(storageDir);
  const common = { ...env, STORAGE_DIR: storageDir, ...sessionSecret(storageDir, env, cluster) };
  if (!cluster) return { ownerEnv: common, appEnv: common, cluster };
  const urls = databaseUrls(cluster);
  return {
    ownerEnv: { ...common, DATABASE_URL: urls.owner, DATABASE_APP_URL: urls.app },
    appEnv: { ...common, DATABASE_APP_URL: urls.app },
    cluster,
  };
}

/**
 * In production it is given; otherwise it is made once, so that people stay signed in through a restart.
 * @param {string} storageDir
 * @param {NodeJS.ProcessEnv} env
 * @param {OpenDatabase['cluster']} cluster
 */
function sessionSecret(storageDir, env, cluster) {
  if (env.NODE_ENV === 'production' || env.SESSION_SECRET) return {};
  const kept = cluster?.secrets.sessionSecret ?? keptSessionSecret(startFiles(storageDir).sessionSecret);
  return { SESSION_SECRET: kept };
}

/**
 * Runs what is pending.
 * @param {string} root
 * @param {OpenDatabase} database
 */
export async function bringUpToDate(root, database) {
  if (await isMigrationPending(root, database.cluster)) {
    await runScript(root, 'migrate', 'brought up to date', database.ownerEnv);
  }
}

/**
 * Runs what is pending, and fills an empty database with the demo, except in production.
 * @param {string} root
 * @param {string} storageDir
 * @param {OpenDatabase} database
 */
export async function prepareDatabase(root, storageDir, database) {
  await bringUpToDate(root, database);
  const isProduction = database.ownerEnv.NODE_ENV === 'production';
  if (isProduction || existsSync(startFiles(storageDir).demoSignIns)) return;
  say('Drawing the demo, if nobody is in the database yet.');
  await runScript(root, 'seed', 'filled with the demo', database.ownerEnv);
}

/**
 * Asked with psql, because loading the whole data layer only to hear "nothing to do" takes a second of each start.
 * @param {string} root
 * @param {import('./postgres-cluster.mjs').RunningCluster | null} cluster
 */
async function isMigrationPending(root, cluster) {
  if (!cluster) return true;
  const done = await migrationsDone(cluster.binDir, cluster.port, cluster.secrets.ownerPassword);
  return migrationTimestamps(root).some((timestamp) => !done.includes(timestamp));
}

/** @param {string} root */
function migrationTimestamps(root) {
  return readdirSync(path.join(root, 'server', 'migrations')).flatMap((name) => {
    const match = /^(\d{13})-/.exec(name);
    return match?.[1] ? [match[1]] : [];
  });
}

/** @param {string} root @param {string} name @param {string} outcome @param {NodeJS.ProcessEnv} env */
async function runScript(root, name, outcome, env) {
  const args = ['--import', 'tsx', path.join(root, 'server', 'scripts', `${name}.ts`)];
  const script = await runCommand(process.execPath, args, { cwd: root, env });
  if (script.code !== 0) throw faults.databaseStepFailed(outcome, lastLines(script.output, 3));
}
