import { ensureClient } from './client-build.mjs';
import { live } from './life.mjs';
import { checkNode, ensurePackages } from './packages.mjs';
import { projectRoot, storageDirOf } from './paths.mjs';

await live(storageDirOf(process.env), async (life) => {
  checkNode(process.versions.node);
  await life.step(ensurePackages(projectRoot));
  await ensureClient(projectRoot);
  return 0;
});
