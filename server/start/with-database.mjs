import { existsSync, mkdirSync } from 'node:fs';
import path from 'node:path';
import { claimStorage, isStartProcess } from './already-running.mjs';
import { bringUpToDate, openDatabase } from './database-steps.mjs';
import { readJson } from './kept-file.mjs';
import { live } from './life.mjs';
import { faults } from './messages.mjs';
import { checkNode, ensurePackages } from './packages.mjs';
import { projectRoot, startFiles, storageDirOf } from './paths.mjs';
import { runCommand } from './run-command.mjs';

/**
 * Runs one script of server/scripts with the database open, whether the product is running or not:
 * node server/start/with-database.mjs create-admin
 */
const SCRIPTS = ['migrate', 'revert', 'seed', 'create-admin', 'restore-dam'];
/** Scripts that work in the tables, which a new installation has not got before its first start. */
const WORK_IN_TABLES = ['seed', 'create-admin', 'restore-dam'];
const storageDir = storageDirOf(process.env);

await live(storageDir, async (life) => {
  const [name = '', ...args] = process.argv.slice(2);
  if (!SCRIPTS.includes(name)) throw faults.scriptUnknown(SCRIPTS);
  checkNode(process.versions.node);
  await life.step(ensurePackages(projectRoot));
  mkdirSync(storageDir, { recursive: true });
  const { running } = startFiles(storageDir);
  // Beside a running product its database is used; otherwise this script holds the folder while it works.
  const isRunning = existsSync(running) && isStartProcess(readJson(running)?.pid);
  if (!isRunning) life.atEnd(claimStorage(running).release);
  const database = await openDatabase(storageDir, process.env);
  if (database.cluster?.startedHere) life.atEnd(database.cluster.stop);
  life.check();
  // A running product has brought its tables up to date itself, to what it can work with.
  if (!isRunning && WORK_IN_TABLES.includes(name)) await life.step(bringUpToDate(projectRoot, database));
  const script = path.join(projectRoot, 'server', 'scripts', `${name}.ts`);
  const outcome = await runCommand(process.execPath, ['--import', 'tsx', script, ...args], {
    cwd: projectRoot,
    env: database.ownerEnv,
    show: true,
  });
  return outcome.code;
});
