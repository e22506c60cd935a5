/**
 * Everything the start scripts say to a person. One sentence for what happened, one for what to do:
 * whoever reads it has a terminal and no source code before them.
 */

/** A fault with a sentence of its own: printed without a stack, exit code 1. */
export class StartFault extends Error {}

/** @param {string} line */
export function say(line) {
  process.stdout.write(`${line}\n`);
}

/** @param {number} bytes */
export function inWords(bytes) {
  const gigabytes = bytes / 1e9;
  if (gigabytes >= 1) return `${gigabytes.toFixed(1)} GB`;
  return `${Math.floor(bytes / 1e6)} MB`;
}

export const faults = {
  /** @param {string} found */
  nodeTooOld: (found) =>
    new StartFault(
      `Tracehead needs Node 20.19 or newer and this is Node ${found}. Install a newer Node, then start again.`,
    ),
  /** @param {string} why */
  packagesFailed: (why) =>
    new StartFault(
      `The packages could not be installed: ${why}. Check the connection to the npm registry, then start again.`,
    ),
  /** @param {string} problem */
  postgresMissing: (problem) =>
    new StartFault(
      `${problem} Install it (Debian and Ubuntu: sudo apt-get install postgresql), or name an existing database in DATABASE_URL.`,
    ),
  chromiumMissing: () =>
    new StartFault(
      'The browser tests need Chromium, which was not found. Install it (Debian: sudo apt-get install chromium), or name the program in CHROMIUM_PATH.',
    ),
  /** @param {string} packageName @param {string} why */
  aptFailed: (packageName, why) =>
    new StartFault(
      `The Debian package ${packageName} could not be installed: ${why}. Run apt-get update and apt-get install ${packageName} by hand, then start again.`,
    ),
  noSystemUser: () =>
    new StartFault(
      'PostgreSQL refuses to run as root and there is no system user named postgres. Create one (useradd --system postgres), or start as an ordinary user.',
    ),
  /** @param {string} folder @param {number} freeBytes @param {number} neededBytes */
  diskFull: (folder, freeBytes, neededBytes) =>
    new StartFault(
      `The disk that holds ${folder} is full: ${inWords(freeBytes)} free, ${inWords(neededBytes)} needed. Free some space, or set STORAGE_DIR to a folder on another disk, then start again.`,
    ),
  /** @param {string} folder */
  noSpaceLeft: (folder) =>
    new StartFault(
      `The disk ran full while writing below ${folder}. Free some space, or set STORAGE_DIR to a folder on another disk, then start again.`,
    ),
  /** @param {string} path */
  notWritable: (path) =>
    new StartFault(
      `${path} cannot be written by this user. Change its owner, or set STORAGE_DIR to a folder that can be written, then start again.`,
    ),
  /** @param {string} host @param {number} port */
  portBusy: (host, port) =>
    new StartFault(
      `Port ${port} on ${host} is used by another program. Choose another port, for example: PORT=${port + 1} npm start`,
    ),
  /** @param {string} host @param {number} port @param {string} why */
  portRefused: (host, port, why) =>
    new StartFault(
      `Port ${port} on ${host} cannot be opened (${why}). Choose another PORT or HOST, then start again.`,
    ),
  /** @param {string} value */
  portMalformed: (value) =>
    new StartFault(
      `PORT is "${value}", which is not a port number. Give a whole number from 1 to 65535, for example: PORT=4181 npm start`,
    ),
  /** @param {string | null} address @param {number} pid */
  alreadyRunning: (address, pid) =>
    new StartFault(
      address
        ? `Tracehead is already running at ${address} (process ${pid}). Nothing was started.`
        : `Tracehead is being started already (process ${pid}). Nothing was started.`,
    ),
  secretMissing: () =>
    new StartFault(
      'SESSION_SECRET must be set in production, to at least 32 random characters that stay the same from start to start. Make some with: openssl rand -base64 32',
    ),
  /** @param {string} dataDir @param {string} why */
  clusterBroken: (dataDir, why) =>
    new StartFault(
      `The database in ${dataDir} does not start: ${why} Put back a copy of that folder, or move it away to begin with an empty database.`,
    ),
  /** @param {string} secretsFile @param {string} dataDir */
  secretsLost: (secretsFile, dataDir) =>
    new StartFault(
      `The passwords of the database in ${dataDir} are missing: ${secretsFile} is gone or damaged. Put that file back, or move the database folder away to begin with an empty one.`,
    ),
  /** @param {string} dataDir @param {number} needed @param {number[]} found */
  wrongMajor: (dataDir, needed, found) =>
    new StartFault(
      `The database in ${dataDir} was made by PostgreSQL ${needed}, and only ${found.join(', ')} is installed. Install PostgreSQL ${needed}, or move that folder away to begin with an empty database.`,
    ),
  /** @param {string} step @param {string} why */
  databaseStepFailed: (step, why) => new StartFault(`The database could not be ${step}: ${why}`),
  /** @param {string} why */
  buildFailed: (why) => new StartFault(`The pages could not be built: ${why}`),
  /** @param {string} why */
  serverFailed: (why) => new StartFault(`The server stopped before it was ready: ${why}`),
  /** @param {string[]} known */
  scriptUnknown: (known) => new StartFault(`Name one of these scripts: ${known.join(', ')}.`),
  /** @param {string} why */
  endingFailed: (why) => new StartFault(`Not everything could be stopped: ${why}`),
  /** @param {number} seconds @param {string} why */
  serverSlow: (seconds, why) =>
    new StartFault(`The server was not ready after ${seconds} seconds: ${why} It has been stopped.`),
};

/**
 * Turns whatever was thrown into one sentence.
 * @param {unknown} error
 * @param {string} storageDir
 * @returns {string}
 */
export function sentenceFor(error, storageDir) {
  if (error instanceof StartFault) return error.message;
  const code = errorCode(error);
  if (code === 'ENOSPC' || code === 'EDQUOT') return faults.noSpaceLeft(storageDir).message;
  if (code === 'EACCES' || code === 'EPERM' || code === 'EROFS') {
    return faults.notWritable(errorPath(error) ?? storageDir).message;
  }
  const message = error instanceof Error ? error.message : String(error);
  return `Something unforeseen stopped the start: ${message}`;
}

/** @param {unknown} error */
export function errorCode(error) {
  return error instanceof Error && 'code' in error ? String(error.code) : null;
}

/** @param {unknown} error */
function errorPath(error) {
  return error instanceof Error && 'path' in error ? String(error.path) : null;
}
