import { mkdir, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { pino } from 'pino';
import type { AppDeps } from '#server/app-deps.ts';
import { compose } from '#server/composition.ts';
import { readConfig } from '#server/config/config.ts';
import { demoSignIns } from '#server/demo/demo-people.ts';
import { isTaken, seedDemo } from '#server/demo/seed-demo.ts';
import type { JobsPort } from '#server/jobs/jobs-port.ts';
import { DEMO_SIGN_INS_FILE } from '#server/services/session-service.ts';

/** The seed draws its sheets itself, and a server takes up waiting mail at its start: nothing has to be queued. */
const nothingQueued: JobsPort = { async enqueue() {}, async start() {}, async stop() {} };

/** The file is written last: it tells the start script that the demo is complete, and the sign-in page whom to offer. */
async function writeSignIns({ config }: AppDeps, signIns: ReturnType<typeof demoSignIns>): Promise<void> {
  await mkdir(config.storageDir, { recursive: true });
  await writeFile(path.join(config.storageDir, DEMO_SIGN_INS_FILE), JSON.stringify(signIns, null, 2));
}

const config = readConfig(process.env);
if (config.production) throw new Error('There are no demo accounts in production.');
const product = await compose(config, pino({ level: 'warn' }));
const deps: AppDeps = { ...product.deps, jobs: nothingQueued };
try {
  if (await isTaken(deps)) await writeSignIns(deps, []);
  else {
    await seedDemo(deps);
    await writeSignIns(deps, demoSignIns());
  }
} finally {
  await product.deps.db.destroy();
}
