import path from 'node:path';
import { fileURLToPath } from 'node:url';

export const projectRoot = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '..', '..');

/** @param {NodeJS.ProcessEnv} env */
export function storageDirOf(env) {
  return env.STORAGE_DIR ? path.resolve(env.STORAGE_DIR) : path.join(projectRoot, 'storage');
}

/** Where each kept file of the start scripts lies. @param {string} storageDir */
export function startFiles(storageDir) {
  return {
    secrets: path.join(storageDir, 'secrets.json'),
    sessionSecret: path.join(storageDir, 'session-secret'),
    cluster: path.join(storageDir, 'cluster.json'),
    running: path.join(storageDir, 'running.json'),
    demoSignIns: path.join(storageDir, 'demo-sign-ins.json'),
    postgres: path.join(storageDir, 'postgres'),
  };
}
