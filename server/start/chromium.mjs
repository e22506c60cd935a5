import { existsSync } from 'node:fs';
import { aptInstall, canInstall } from './apt.mjs';
import { faults, StartFault, say } from './messages.mjs';

/** Chromium without its windows: the same engine, which opens a page in half the time. */
const SHELL = { program: '/usr/bin/chromium-headless-shell', debianPackage: 'chromium-headless-shell' };
const BROWSERS = ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome'];

/**
 * The browser for the tests: the one named in CHROMIUM_PATH, or the machine's own, installed when that is allowed.
 * @returns {Promise<string>}
 */
export async function ensureChromium() {
  const named = process.env.CHROMIUM_PATH;
  if (named && existsSync(named)) return named;
  return existsSync(SHELL.program) || (await installed(SHELL.debianPackage))
    ? SHELL.program
    : await ensureWholeChromium();
}

/**
 * The browser with everything it has: the shell keeps nothing on the disk, and not every system has a package of it.
 * @returns {Promise<string>}
 */
export async function ensureWholeChromium() {
  const named = process.env.CHROMIUM_PATH;
  if (named && existsSync(named)) return named;
  const found = BROWSERS.find((place) => existsSync(place));
  if (found) return found;
  if (!canInstall()) throw faults.chromiumMissing();
  await aptInstall('chromium');
  const made = BROWSERS.find((place) => existsSync(place));
  if (!made) throw faults.chromiumMissing();
  return made;
}

/** @param {string} debianPackage */
async function installed(debianPackage) {
  if (!canInstall()) return false;
  try {
    await aptInstall(debianPackage);
    return existsSync(SHELL.program);
  } catch (error) {
    if (!(error instanceof StartFault)) throw error;
    say(`${error.message} Another Chromium is looked for.`);
    return false;
  }
}
