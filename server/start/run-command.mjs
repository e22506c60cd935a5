import { spawn } from 'node:child_process';

/** The last part of a program's output is what explains a failure; the rest is not kept. */
const KEPT_CHARS = 64_000;
const NO_SPACE =
  'the disk is full. Free some space, or set STORAGE_DIR to a folder on another disk, then start again.';

/**
 * @typedef {object} RunOptions
 * @property {NodeJS.ProcessEnv} [env]
 * @property {string} [cwd]
 * @property {string} [input] written to standard input
 * @property {{uid: number, gid: number} | null} [user] run as this user
 * @property {boolean} [show] let the program have the terminal instead of keeping its output
 * @property {boolean} [detached] a process group of its own, so that Ctrl-C does not reach it
 */

/**
 * Runs a program to its end. A program that cannot be found gives code 127, as a shell would.
 * @param {string} command
 * @param {string[]} args
 * @param {RunOptions} [options]
 * @returns {Promise<{code: number, output: string}>}
 */
export function runCommand(command, args, options = {}) {
  const { promise, resolve, reject } = withResolvers();
  const child = spawn(command, args, {
    cwd: options.cwd,
    env: options.env ?? process.env,
    detached: options.detached ?? false,
    stdio: options.show ? 'inherit' : 'pipe',
    ...(options.user ?? {}),
  });
  let output = '';
  const keep = (/** @type {Buffer} */ chunk) => {
    output = (output + chunk).slice(-KEPT_CHARS);
  };
  child.stdout?.on('data', keep);
  child.stderr?.on('data', keep);
  child.on('error', (/** @type {NodeJS.ErrnoException} */ error) => {
    if (error.code === 'ENOENT') resolve({ code: 127, output: `${command} was not found` });
    else reject(error);
  });
  child.on('close', (code, signal) => resolve({ code: code ?? (signal ? 128 : 1), output }));
  // A program that ends without reading its input is no fault of ours.
  child.stdin?.on('error', () => {});
  child.stdin?.end(options.input ?? '');
  return promise;
}

function withResolvers() {
  /** @type {(value: {code: number, output: string}) => void} */
  let resolve = () => {};
  /** @type {(error: Error) => void} */
  let reject = () => {};
  const promise = new Promise((res, rej) => {
    resolve = res;
    reject = rej;
  });
  return { promise, resolve, reject };
}

/**
 * Why a program failed, on one line: a full disk, the error it names, or else its last lines that say something.
 * @param {string} output
 * @param {number} [count]
 */
export function lastLines(output, count = 1) {
  if (/No space left on device|ENOSPC/.test(output)) return NO_SPACE;
  const lines = output.split('\n').map((line) => line.trim());
  const named = lines.find((line) => /^(\w*Error|error)\b.*?: /.test(line));
  if (named) return named;
  const telling = lines.filter((line) => line && !/^(at |[{}^]|Node\.js v)/.test(line));
  return telling.slice(-count).join(' ') || 'it gave no reason';
}
