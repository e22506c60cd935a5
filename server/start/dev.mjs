import { spawn } from 'node:child_process';
import { mkdirSync } from 'node:fs';
import path from 'node:path';
import { claimStorage } from './already-running.mjs';
import { openDatabase, prepareDatabase } from './database-steps.mjs';
import { checkDiskSpace } from './disk-space.mjs';
import { live } from './life.mjs';
import { say } from './messages.mjs';
import { checkNode, ensurePackages } from './packages.mjs';
import { projectRoot, startFiles, storageDirOf } from './paths.mjs';
import { checkPortFree, DEFAULT_HOST, wantedPort } from './ports.mjs';

/** For contributors: the server starts again at each change of its sources, and Vite serves the pages. */
const storageDir = storageDirOf(process.env);
const DEV_PORT = Number(process.env.DEV_PORT || 5180);

await live(storageDir, async (life) => {
  checkNode(process.versions.node);
  mkdirSync(storageDir, { recursive: true });
  const claim = claimStorage(startFiles(storageDir).running);
  life.atEnd(claim.release);
  const host = process.env.HOST || DEFAULT_HOST;
  const port = wantedPort(process.env);
  checkDiskSpace(storageDir, process.env);
  await checkPortFree(host, port);
  await checkPortFree(host, DEV_PORT);
  await life.step(ensurePackages(projectRoot));
  const database = await openDatabase(storageDir, process.env);
  if (database.cluster) life.atEnd(database.cluster.stop);
  await life.step(prepareDatabase(projectRoot, storageDir, database));

  const pages = `http://localhost:${DEV_PORT}`;
  const env = {
    ...database.appEnv,
    HOST: host,
    PORT: String(port),
    PUBLIC_URL: process.env.PUBLIC_URL || pages,
  };
  const server = startProgram(['node_modules/tsx/dist/cli.mjs', 'watch', 'server/main.ts'], env);
  life.atEnd(server.stop);
  const viteEnv = {
    ...process.env,
    DEV_SERVER_ADDRESS: `http://${host}:${port}`,
    DEV_PORT: String(DEV_PORT),
  };
  const vite = startProgram(['node_modules/vite/bin/vite.js', '--host', host], viteEnv);
  life.atEnd(vite.stop);
  claim.setAddress(pages);
  say(`The pages are at ${pages}, the server is at http://${host}:${port}. Ctrl-C stops both.`);
  const ended = await Promise.race([life.asked, server.ended, vite.ended]);
  // Asked to end, all is well; a program that ended by itself has said why.
  return ended === 'asked' ? 0 : 1;
});

/** In a process group of its own, so that Ctrl-C leaves the order of stopping to this script. @param {string[]} args @param {NodeJS.ProcessEnv} env */
function startProgram([file = '', ...args], env) {
  const child = spawn(process.execPath, [path.join(projectRoot, file), ...args], {
    cwd: projectRoot,
    env,
    detached: true,
    stdio: ['ignore', 'inherit', 'inherit'],
  });
  const ended = new Promise((resolve) => child.on('exit', resolve));
  const stop = async () => {
    if (child.exitCode === null && child.pid) process.kill(-child.pid, 'SIGTERM');
    await ended;
  };
  return { ended, stop };
}
