import { mkdirSync } from 'node:fs';
import path from 'node:path';
import { claimStorage } from './already-running.mjs';
import { clientDir, ensureClient } from './client-build.mjs';
import { openDatabase, prepareDatabase } from './database-steps.mjs';
import { checkDiskSpace } from './disk-space.mjs';
import { readJson } from './kept-file.mjs';
import { live } from './life.mjs';
import { faults, say } from './messages.mjs';
import { checkNode, ensurePackages } from './packages.mjs';
import { projectRoot, startFiles, storageDirOf } from './paths.mjs';
import { checkPortFree, DEFAULT_HOST, wantedPort } from './ports.mjs';
import { startServer } from './server-process.mjs';

const storageDir = storageDirOf(process.env);

await live(storageDir, async (life) => {
  checkNode(process.versions.node);
  // The server would refuse too, but only after a database had been made.
  if (process.env.NODE_ENV === 'production' && !process.env.SESSION_SECRET) throw faults.secretMissing();
  mkdirSync(storageDir, { recursive: true });
  const claim = claimStorage(startFiles(storageDir).running);
  life.atEnd(claim.release);
  const host = process.env.HOST || DEFAULT_HOST;
  const port = wantedPort(process.env);
  checkDiskSpace(storageDir, process.env);
  await checkPortFree(host, port);
  await life.step(ensurePackages(projectRoot));

  const pages = ensureClient(projectRoot);
  // The pages are built while the database starts; a fault of theirs is reported when their turn comes.
  pages.catch(() => {});
  const database = await openDatabase(storageDir, process.env);
  if (database.cluster) life.atEnd(database.cluster.stop);
  life.check();
  await life.step(prepareDatabase(projectRoot, storageDir, database));
  await life.step(pages);

  const env = { ...database.appEnv, HOST: host, PORT: String(port), CLIENT_DIR: clientDir(projectRoot) };
  const logFile = process.stdout.isTTY ? path.join(storageDir, 'log', 'server.log') : null;
  const server = await startServer(projectRoot, env, { logFile });
  life.atEnd(server.stop);
  claim.setAddress(server.address);
  life.check();
  welcome(server.address, logFile);

  const reason = await Promise.race([life.asked, server.ended]);
  if (typeof reason !== 'number') return 0;
  say(`The server ended by itself with code ${reason}; its log says why.`);
  return 1;
});

/** @param {string} address @param {string | null} logFile */
function welcome(address, logFile) {
  say(`\nTracehead is ready at ${process.env.PUBLIC_URL || address}\n`);
  const signIns = process.env.NODE_ENV === 'production' ? [] : readJson(startFiles(storageDir).demoSignIns);
  if (signIns?.length) say(`Demo sign-ins:\n${signInLines(signIns).join('\n')}\n`);
  if (logFile) say(`The log is in ${path.relative(process.cwd(), logFile)}. Ctrl-C stops everything.`);
}

/** @param {Array<{name: string, email: string, password: string, part: string}>} people */
function signInLines(people) {
  const width = Math.max(...people.map((person) => person.email.length));
  return people.map((person) => {
    return `  ${person.email.padEnd(width)}  ${person.password}  ${person.name}, ${person.part}`;
  });
}
