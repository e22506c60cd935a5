import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { faults } from './messages.mjs';
import { freeLoopbackPort } from './ports.mjs';
import { lastLines, runCommand } from './run-command.mjs';

const START_SECONDS = 60;

/**
 * Starts the server of a cluster on loopback, or finds it running.
 * @param {{binDir: string, dataDir: string}} cluster
 * @param {import('./postgres-user.mjs').SystemUser | null} user
 * @param {number | null} rememberedPort
 * @param {string[]} settings
 */
export async function startPostmaster({ binDir, dataDir }, user, rememberedPort, settings) {
  const pgCtl = path.join(binDir, 'pg_ctl');
  const status = await runCommand(pgCtl, ['status', '-D', dataDir], { user, cwd: '/' });
  if (status.code === 0) return { port: portOfRunning(dataDir), startedHere: false };
  const port = await freeLoopbackPort(rememberedPort);
  writeFileSync(path.join(dataDir, 'tracehead.conf'), configuration(port, settings));
  const log = path.join(dataDir, 'start.log');
  rmSync(log, { force: true });
  const args = ['start', '-w', '-t', String(START_SECONDS), '-D', dataDir, '-l', log];
  // A group of its own: Ctrl-C in the terminal must reach the server first and the database last.
  const start = await runCommand(pgCtl, args, { user, cwd: '/', detached: true });
  if (start.code !== 0) throw brokenFault(dataDir, reasonIn(log, start.output));
  return { port, startedHere: true };
}

/** A full disk is no broken database, and moving it away would be the wrong advice. @param {string} dataDir @param {string} reason */
export function brokenFault(dataDir, reason) {
  return /No space left on device/.test(reason)
    ? faults.noSpaceLeft(dataDir)
    : faults.clusterBroken(dataDir, reason);
}

/** Line 4 of postmaster.pid is the port. @param {string} dataDir */
function portOfRunning(dataDir) {
  return Number(readFileSync(path.join(dataDir, 'postmaster.pid'), 'utf8').split('\n')[3]);
}

/** @param {number} port @param {string[]} settings */
function configuration(port, settings) {
  return [
    '# Written at each start; changes made here are lost.',
    `port = ${port}`,
    "listen_addresses = '127.0.0.1'",
    "unix_socket_directories = ''",
    "log_timezone = 'UTC'",
    "timezone = 'UTC'",
    'logging_collector = on',
    "log_filename = 'postgresql-%a.log'",
    'log_truncate_on_rotation = on',
    'log_rotation_age = 1d',
    ...settings,
    '',
  ].join('\n');
}

/** The server's own word for why it did not start, without its timestamp. @param {string} log @param {string} fallback */
export function reasonIn(log, fallback) {
  const text = existsSync(log) ? readFileSync(log, 'utf8') : '';
  const fatal = text.split('\n').filter((line) => /(FATAL|PANIC):/.test(line));
  const reason = fatal.at(-1)?.replace(/^.*?(FATAL|PANIC):\s*/, '');
  return `${reason ?? lastLines(text.trim() ? text : fallback)}.`.replace(/\.\.$/, '.');
}

/** @param {{binDir: string, dataDir: string}} cluster @param {import('./postgres-user.mjs').SystemUser | null} user */
export async function stopPostmaster({ binDir, dataDir }, user) {
  // "fast" ends sessions that are still open, after rolling back what they had not committed.
  const args = ['stop', '-w', '-t', String(START_SECONDS), '-m', 'fast', '-D', dataDir];
  await runCommand(path.join(binDir, 'pg_ctl'), args, { user, cwd: '/', detached: true });
}
