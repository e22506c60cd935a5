import { chmodSync, mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import type { TestProject } from 'vitest/node';
import { createDataSource } from '#server/entities/data-source.ts';
import { databaseUrls, startCluster } from '#server/start/postgres-cluster.mjs';

declare module 'vitest' {
  interface ProvidedContext {
    /** Addresses of the throw-away cluster; the database in `ownerUrl` and `appUrl` is the migrated template. */
    cluster: { superuserUrl: string; ownerUrl: string; appUrl: string };
  }
}

const PREFIX = 'tracehead-test-';

/** Starts PostgreSQL once for a run and makes the template that each test file clones. */
export async function setup(project: TestProject): Promise<() => Promise<void>> {
  sweepAbandoned();
  const folder = mkdtempSync(path.join(os.tmpdir(), `${PREFIX}${process.pid}-`));
  // As root the database runs as another system user, who has to get in.
  chmodSync(folder, 0o755);
  const cluster = await startCluster(folder, {
    settings: ['max_connections = 200'],
    quiet: true,
    throwAway: true,
  });
  const { superuser, owner, app } = databaseUrls(cluster);
  const db = await createDataSource({ url: owner, poolSize: 1 }).initialize();
  await db.runMigrations({ transaction: 'each' });
  // A template cannot be cloned while somebody is connected to it.
  await db.destroy();
  project.provide('cluster', { superuserUrl: superuser, ownerUrl: owner, appUrl: app });
  return async () => {
    await cluster.stop();
    rmSync(folder, { recursive: true, force: true });
  };
}

/** A run that was killed could not stop its PostgreSQL; the next run does it. */
function sweepAbandoned(): void {
  for (const name of readdirSync(os.tmpdir())) {
    const pid = Number(name.startsWith(PREFIX) ? name.slice(PREFIX.length).split('-')[0] : Number.NaN);
    if (Number.isNaN(pid) || isAlive(pid)) continue;
    const folder = path.join(os.tmpdir(), name);
    stopPostmaster(path.join(folder, 'postgres', 'postmaster.pid'));
    rmSync(folder, { recursive: true, force: true });
  }
}

function isAlive(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch {
    return false;
  }
}

function stopPostmaster(pidFile: string): void {
  try {
    process.kill(Number(readFileSync(pidFile, 'utf8').split('\n')[0]), 'SIGQUIT');
  } catch {
    // It never started or has gone by itself.
  }
}
