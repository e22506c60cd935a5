import { createHash } from 'node:crypto';
import {
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  renameSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import path from 'node:path';
import { faults, say } from './messages.mjs';
import { lastLines, runCommand } from './run-command.mjs';

/** How long another build of the same pages is waited for. */
const OTHER_BUILD_MS = 120_000;
const SOURCES = ['src', 'shared', 'index.html', 'vite.config.ts', 'package-lock.json'];

/** Where the built pages lie. @param {string} root */
export function clientDir(root) {
  return path.join(root, 'dist', 'client');
}

/** Builds the pages when their sources have changed since the last build. @param {string} root */
export async function ensureClient(root) {
  const deadline = Date.now() + OTHER_BUILD_MS;
  while (!isClientFresh(root)) {
    const wanted = sourcesStamp(root);
    say('Building the pages.');
    const outcome = await buildClient(root);
    if (outcome.code === 0) return writeFileSync(stampFile(root), wanted);
    // Two programs of one checkout, such as a start and a test, may want the pages in the same moment.
    if (!isOtherBuild(outcome.output) || Date.now() > deadline) {
      throw faults.buildFailed(lastLines(outcome.output, 6));
    }
    await new Promise((resolve) => setTimeout(resolve, 1000));
  }
}

/** @param {string} root */
const stampFile = (root) => path.join(root, 'dist', 'client.stamp');

/** @param {string} root */
const isClientFresh = (root) =>
  existsSync(clientDir(root)) && readText(stampFile(root)) === sourcesStamp(root);

/** @param {string} output */
const isOtherBuild = (output) => output.includes('Found another Vite build process');

/**
 * Builds beside the present pages and then changes places, so that a failed build leaves the old ones and a
 * running server is without pages for no longer than two renames take.
 * @param {string} root
 */
async function buildClient(root) {
  const target = clientDir(root);
  const draft = `${target}.${process.pid}.new`;
  mkdirSync(path.dirname(target), { recursive: true });
  const vite = path.join(root, 'node_modules', 'vite', 'bin', 'vite.js');
  const args = [vite, 'build', '--outDir', draft, '--emptyOutDir', '--logLevel', 'error'];
  const build = await runCommand(process.execPath, args, {
    cwd: root,
    env: { ...process.env, NODE_ENV: 'production' },
  });
  if (build.code !== 0) {
    rmSync(draft, { recursive: true, force: true });
    return build;
  }
  rmSync(`${target}.old`, { recursive: true, force: true });
  if (existsSync(target)) renameSync(target, `${target}.old`);
  renameSync(draft, target);
  rmSync(`${target}.old`, { recursive: true, force: true });
  return build;
}

/** Changes when any source changes, whatever its date says. @param {string} root */
export function sourcesStamp(root) {
  const hash = createHash('sha256');
  for (const file of SOURCES.flatMap((source) => filesUnder(path.join(root, source)))) {
    hash.update(path.relative(root, file)).update('\0').update(readFileSync(file)).update('\0');
  }
  return hash.digest('hex');
}

/** @param {string} place @returns {string[]} */
function filesUnder(place) {
  if (!existsSync(place)) return [];
  if (statSync(place).isFile()) return [place];
  return readdirSync(place)
    .sort()
    .flatMap((name) => filesUnder(path.join(place, name)));
}

/** @param {string} file */
function readText(file) {
  return existsSync(file) ? readFileSync(file, 'utf8') : null;
}
