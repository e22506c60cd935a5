import path from 'node:path';
import { live } from './life.mjs';
import { checkNode, ensurePackages } from './packages.mjs';
import { projectRoot, storageDirOf } from './paths.mjs';
import { ensurePostgres } from './postgres-find.mjs';
import { runCommand } from './run-command.mjs';

/** npm run bench [-- --only NAME --json FILE] */
await live(storageDirOf(process.env), async (life) => {
  checkNode(process.versions.node);
  await life.step(ensurePackages(projectRoot));
  await life.step(ensurePostgres());
  const script = path.join(projectRoot, 'server', 'bench', 'run.ts');
  const args = ['--import', 'tsx', script, ...process.argv.slice(2)];
  // Relative file names are those of the caller.
  const bench = await runCommand(process.execPath, args, { show: true });
  return bench.code;
});
