import { closeSync, fsyncSync, openSync, readFileSync, renameSync, writeSync } from 'node:fs';

/**
 * Writes a small file whole or not at all, so that a full disk or a power cut leaves the old one.
 * @param {string} file
 * @param {string} text
 * @param {number} [mode]
 */
export function writeFileSafely(file, text, mode = 0o644) {
  const draft = `${file}.${process.pid}.new`;
  const handle = openSync(draft, 'w', mode);
  try {
    writeSync(handle, text);
    fsyncSync(handle);
  } finally {
    closeSync(handle);
  }
  renameSync(draft, file);
}

/** The parsed file, or null when it is missing or damaged. @param {string} file */
export function readJson(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'));
  } catch {
    return null;
  }
}
