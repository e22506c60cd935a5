import { spawn } from 'node:child_process';
import { mkdirSync, openSync } from 'node:fs';
import path from 'node:path';
import { faults } from './messages.mjs';

const READY_SECONDS = 60;
/** Longer than the server itself allows requests and then jobs in flight. */
const STOP_MS = 60_000;

/**
 * @typedef {object} RunningServer
 * @property {string} address where it listens
 * @property {number} pid
 * @property {Promise<number>} ended the exit code, once it has stopped for whatever reason
 * @property {() => Promise<void>} stop
 */

/**
 * Starts the server in a process of its own and waits until it can serve.
 * @param {string} root
 * @param {NodeJS.ProcessEnv} env
 * @param {{logFile?: string | null}} [options] where its log goes instead of the terminal
 * @returns {Promise<RunningServer>}
 */
export async function startServer(root, env, options = {}) {
  const log = options.logFile ? openLog(options.logFile) : 'inherit';
  const child = spawn(process.execPath, ['--import', 'tsx', path.join(root, 'server', 'main.ts')], {
    cwd: root,
    env,
    // A group of its own: Ctrl-C reaches only the start script, which stops things in their order.
    detached: true,
    // The channel also tells the server when this process is gone, so that it never outlives it unseen.
    stdio: ['ignore', log, log, 'ipc'],
  });
  /** @type {Promise<number>} */
  const ended = new Promise((resolve) => {
    child.on('exit', (code) => resolve(code ?? 1));
    child.on('error', () => resolve(1));
  });
  const stop = () => stopChild(child, ended);
  try {
    const address = await listening(child, ended);
    await ready(address, ended);
    return { address, pid: child.pid ?? 0, ended, stop };
  } catch (error) {
    await stop();
    throw error;
  }
}

/** @param {string} logFile */
function openLog(logFile) {
  mkdirSync(path.dirname(logFile), { recursive: true });
  return openSync(logFile, 'w');
}

/**
 * @param {import('node:child_process').ChildProcess} child
 * @param {Promise<number>} ended
 * @returns {Promise<string>}
 */
function listening(child, ended) {
  return new Promise((resolve, reject) => {
    let why = '';
    child.on('message', (message) => {
      const { address, fault } = /** @type {{address?: string, fault?: string}} */ (message);
      if (fault) why = fault;
      if (address) resolve(address);
    });
    ended.then((code) => reject(faults.serverFailed(why || `it ended with code ${code}; its log says why.`)));
  });
}

/** @param {string} address @param {Promise<number>} ended */
async function ready(address, ended) {
  let hasEnded = false;
  ended.then(() => {
    hasEnded = true;
  });
  const deadline = Date.now() + READY_SECONDS * 1000;
  let why = '';
  while (Date.now() < deadline) {
    if (hasEnded) throw faults.serverFailed('its log says why.');
    const answer = await ask(`${address}/readyz`);
    if (answer.ok) return;
    why = answer.why;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw faults.serverSlow(READY_SECONDS, why);
}

/** @param {string} url */
async function ask(url) {
  try {
    const response = await fetch(url, { signal: AbortSignal.timeout(5_000) });
    return { ok: response.ok, why: response.ok ? '' : `it answers ${await response.text()}.` };
  } catch (error) {
    return { ok: false, why: `it does not answer (${error instanceof Error ? error.message : error}).` };
  }
}

/** @param {import('node:child_process').ChildProcess} child @param {Promise<number>} ended */
async function stopChild(child, ended) {
  child.kill('SIGTERM');
  const timer = setTimeout(() => child.kill('SIGKILL'), STOP_MS);
  await ended;
  clearTimeout(timer);
}
