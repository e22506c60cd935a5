import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { faults, say } from './messages.mjs';
import { lastLines, runCommand } from './run-command.mjs';

const [MIN_MAJOR, MIN_MINOR] = [20, 19];

/** @param {string} version such as "20.19.3" */
export function checkNode(version) {
  const [major = 0, minor = 0] = version.split('.').map(Number);
  if (major < MIN_MAJOR || (major === MIN_MAJOR && minor < MIN_MINOR)) throw faults.nodeTooOld(version);
}

/** Installs the packages when they are missing or are not those of the lock file. @param {string} root */
export async function ensurePackages(root) {
  const wanted = lockStamp(root);
  if (readStamp(root) === wanted) return;
  if (!installedMatchesLock(root)) {
    say('Installing packages, which takes a minute or two the first time.');
    // NODE_ENV=production would leave out what builds the pages.
    const npm = await runCommand('npm', ['ci', '--include=dev', '--no-audit', '--no-fund'], { cwd: root });
    if (npm.code !== 0) throw faults.packagesFailed(lastLines(npm.output, 2));
  }
  writeFileSync(stampFile(root), wanted);
}

/** @param {string} root */
function stampFile(root) {
  return path.join(root, 'node_modules', '.tracehead-lock');
}

/** @param {string} root */
function readStamp(root) {
  try {
    return readFileSync(stampFile(root), 'utf8');
  } catch {
    return null;
  }
}

/** Another major version of Node may need other prebuilt parts. @param {string} root */
export function lockStamp(root) {
  const hash = createHash('sha256').update(readFileSync(path.join(root, 'package-lock.json')));
  return `${hash.digest('hex')} node${process.versions.modules} ${process.platform}-${process.arch}`;
}

/**
 * True when what npm last put into node_modules is what the lock file asks for, as after a
 * contributor's own `npm install`: installing again would take node_modules away under running programs.
 * @param {string} root
 */
export function installedMatchesLock(root) {
  const installedFile = path.join(root, 'node_modules', '.package-lock.json');
  if (!existsSync(installedFile)) return false;
  const installed = lockedPackages(installedFile);
  const wanted = lockedPackages(path.join(root, 'package-lock.json'));
  return Object.entries(wanted).every(([name, entry]) => {
    if (name === '') return true;
    const found = installed[name];
    return found ? found.version === entry.version : entry.optional === true;
  });
}

/**
 * @param {string} file
 * @returns {Record<string, {version?: string, optional?: boolean}>}
 */
function lockedPackages(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8')).packages ?? {};
  } catch {
    return {};
  }
}
