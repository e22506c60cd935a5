import { randomBytes } from 'node:crypto';
import { existsSync, readFileSync } from 'node:fs';
import { writeFileSafely } from './kept-file.mjs';

/**
 * @typedef {object} Secrets
 * @property {string} superuserPassword
 * @property {string} ownerPassword
 * @property {string} appPassword
 * @property {string} sessionSecret
 */

const NAMES = /** @type {const} */ (['superuserPassword', 'ownerPassword', 'appPassword', 'sessionSecret']);

/** The kept secrets, or null when the file is missing or damaged. @param {string} file @returns {Secrets | null} */
export function readSecrets(file) {
  if (!existsSync(file)) return null;
  try {
    const kept = JSON.parse(readFileSync(file, 'utf8'));
    return NAMES.every((name) => typeof kept[name] === 'string' && kept[name].length > 0) ? kept : null;
  } catch {
    return null;
  }
}

/** @param {string} file @returns {Secrets} */
export function makeSecrets(file) {
  const secrets = {
    superuserPassword: secret(),
    ownerPassword: secret(),
    appPassword: secret(),
    sessionSecret: secret(),
  };
  writeFileSafely(file, `${JSON.stringify(secrets, null, 2)}\n`, 0o600);
  return secrets;
}

/**
 * The key of the sign-in cookies where the database is somebody else's and there are no passwords of ours to keep.
 * @param {string} file
 * @returns {string}
 */
export function keptSessionSecret(file) {
  if (existsSync(file)) return readFileSync(file, 'utf8').trim();
  const made = secret();
  writeFileSafely(file, `${made}\n`, 0o600);
  return made;
}

/** URL-safe on purpose: passwords go into connection addresses. */
function secret() {
  return randomBytes(32).toString('base64url');
}
