import { closeSync, openSync, readFileSync, rmSync, writeSync } from 'node:fs';
import { readJson, writeFileSafely } from './kept-file.mjs';
import { errorCode, faults } from './messages.mjs';

/**
 * Claims the storage folder for this process, or says who has it. Opening with "wx" makes two starts in the
 * same moment safe: only one of them creates the file.
 * @param {string} file
 * @returns {{setAddress: (address: string) => void, release: () => void}}
 */
export function claimStorage(file) {
  try {
    const handle = openSync(file, 'wx');
    writeSync(handle, JSON.stringify({ pid: process.pid, address: null }));
    closeSync(handle);
  } catch (error) {
    if (errorCode(error) !== 'EEXIST') throw error;
    const holder = readJson(file);
    if (isStartProcess(holder?.pid)) throw faults.alreadyRunning(holder.address ?? null, holder.pid);
    rmSync(file, { force: true });
    return claimStorage(file);
  }
  return {
    setAddress: (address) => writeFileSafely(file, JSON.stringify({ pid: process.pid, address })),
    release: () => rmSync(file, { force: true }),
  };
}

/**
 * Process numbers are used again after a crash or a restart of the machine, so a living process counts only
 * when it is one of ours.
 * @param {unknown} pid
 */
export function isStartProcess(pid) {
  if (typeof pid !== 'number' || pid === process.pid) return false;
  try {
    process.kill(pid, 0);
  } catch (error) {
    if (errorCode(error) !== 'EPERM') return false;
  }
  try {
    return /server\/start\/(start|dev|with-database)\.mjs/.test(readFileSync(`/proc/${pid}/cmdline`, 'utf8'));
  } catch {
    // Systems without /proc: a living process is all there is to go by.
    return process.platform !== 'linux';
  }
}
