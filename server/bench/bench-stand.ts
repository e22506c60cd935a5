import { chmodSync, mkdtempSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { createDataSource } from '#server/entities/data-source.ts';
import { ensureClient } from '#server/start/client-build.mjs';
import { projectRoot } from '#server/start/paths.mjs';
import { freeLoopbackPort } from '#server/start/ports.mjs';
import { databaseUrls, startCluster } from '#server/start/postgres-cluster.mjs';
import { startServer } from '#server/start/server-process.mjs';

export interface BenchStand {
  address: string;
  serverPid: number;
  ownerUrl: string;
  appUrl: string;
  storageDir: string;
  close(): Promise<void>;
}

/** The product as it is started for use (its built pages when `pages` are looked at), on a database and a storage folder that go away afterwards. */
export async function openBenchStand({
  pages = false,
  env = {},
}: {
  pages?: boolean;
  env?: Record<string, string>;
} = {}): Promise<BenchStand> {
  if (pages) await ensureClient(projectRoot);
  const storageDir = mkdtempSync(path.join(os.tmpdir(), 'tracehead-bench-'));
  // As root the database runs as another system user, who has to get in.
  chmodSync(storageDir, 0o755);
  const cluster = await startCluster(storageDir, { quiet: true });
  const urls = databaseUrls(cluster);
  const db = await createDataSource({ url: urls.owner, poolSize: 1 }).initialize();
  await db.runMigrations({ transaction: 'each' });
  await db.destroy();
  const port = await freeLoopbackPort(null);
  const server = await startServer(projectRoot, {
    ...process.env,
    NODE_ENV: 'development',
    DATABASE_URL: '',
    DATABASE_APP_URL: urls.app,
    STORAGE_DIR: storageDir,
    HOST: '127.0.0.1',
    PORT: String(port),
    PUBLIC_URL: '',
    LOG_LEVEL: 'error',
    SESSION_SECRET: cluster.secrets.sessionSecret,
    ...env,
  });
  return {
    address: server.address,
    serverPid: server.pid,
    ownerUrl: urls.owner,
    appUrl: urls.app,
    storageDir,
    async close() {
      await server.stop();
      await cluster.stop();
      rmSync(storageDir, { recursive: true, force: true });
    },
  };
}
