import { existsSync } from 'node:fs';
import { aptInstall, canInstall } from './apt.mjs';
import { faults } from './messages.mjs';

const PLACES = ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome'];

/**
 * The browser for the tests: the one named in CHROMIUM_PATH, or the machine's own, installed when that is allowed.
 * @returns {Promise<string>}
 */
export async function ensureChromium() {
  const found = findChromium();
  if (found) return found;
  if (!canInstall()) throw faults.chromiumMissing();
  await aptInstall('chromium');
  const installed = findChromium();
  if (!installed) throw faults.chromiumMissing();
  return installed;
}

function findChromium() {
  const places = process.env.CHROMIUM_PATH ? [process.env.CHROMIUM_PATH, ...PLACES] : PLACES;
  return places.find((place) => existsSync(place)) ?? null;
}
