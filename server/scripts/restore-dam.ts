import path from 'node:path';
import { pino } from 'pino';
import type { AppDeps } from '#server/app-deps.ts';
import { compose } from '#server/composition.ts';
import { readConfig } from '#server/config/config.ts';
import { AppError } from '#server/errors/app-error.ts';
import type { JobsPort } from '#server/jobs/jobs-port.ts';
import { restoreArchive } from '#server/services/restore-service.ts';

/** Restores a dam from an archive on this machine: npm run restore-dam -- dam.zip */
const USAGE = 'Usage: npm run restore-dam -- <archive.zip>';

/** A server takes up what waits at its start: nothing has to be queued here. */
const nothingQueued: JobsPort = { async enqueue() {}, async start() {}, async stop() {} };

async function main(file: string): Promise<void> {
  const product = await compose(readConfig(process.env), pino({ level: 'warn' }));
  const deps: AppDeps = { ...product.deps, jobs: nothingQueued };
  try {
    const restored = await restoreArchive(deps, path.resolve(process.env.INIT_CWD ?? '.', file), null);
    console.log(`${restored.name} is restored: ${restored.rows} rows, ${restored.files} files.`);
    for (const { name } of restored.peopleMade) console.log(`Entered without a password: ${name}`);
    console.log('Its sheets are prepared when the server starts next.');
  } finally {
    await product.deps.db.destroy();
  }
}

const [file, ...more] = process.argv.slice(2);
if (file === undefined || more.length > 0) {
  console.error(USAGE);
  process.exitCode = 2;
} else {
  await main(file).catch((error: unknown) => {
    console.error(error instanceof AppError ? `${error.title}. ${error.detail}` : error);
    process.exitCode = 1;
  });
}
