import { mkdtempSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import type { DataSource } from 'typeorm';
import { createDataSource } from '#server/entities/data-source.ts';
import { freeLoopbackPort } from '#server/start/ports.mjs';
import { startServer } from '#server/start/server-process.mjs';
import { cloneDatabase } from './test-database.ts';

export interface RealServer {
  address: string;
  storageDir: string;
  /** What the server was started with, for scripts that work on the same database and storage. */
  env: NodeJS.ProcessEnv;
  /** A connection of the owner, to prepare and to look. */
  db: DataSource;
  /** Stops the process and starts another on the same database, storage and port. */
  restart(): Promise<void>;
  /** Stops the process in order and leaves the rest. */
  stop(): Promise<void>;
  /** Ends the process as a breakdown would: in the middle of whatever it does. */
  kill(): Promise<void>;
  close(): Promise<void>;
}

export const projectRoot = path.resolve(import.meta.dirname, '..', '..');

/** The server as it is started for use: a process of its own, on a cloned database and a storage folder of its own. */
export async function startRealServer(env: Record<string, string> = {}): Promise<RealServer> {
  const database = await cloneDatabase();
  const storageDir = mkdtempSync(path.join(os.tmpdir(), 'tracehead-storage-'));
  const port = await freeLoopbackPort(null);
  const serverEnv = {
    ...process.env,
    NODE_ENV: 'development',
    DATABASE_URL: '',
    DATABASE_APP_URL: database.appUrl,
    STORAGE_DIR: storageDir,
    HOST: '127.0.0.1',
    PORT: String(port),
    PUBLIC_URL: `http://127.0.0.1:${port}`,
    SESSION_SECRET: 'a secret for tests only, of enough length',
    LOG_LEVEL: process.env.LOG_LEVEL ?? 'error',
    ...env,
  };
  const start = () => startServer(projectRoot, serverEnv);
  let server = await start();
  const db = await createDataSource({ url: database.ownerUrl, poolSize: 4 }).initialize();
  return {
    address: server.address,
    storageDir,
    env: serverEnv,
    db,
    async restart() {
      await server.stop();
      server = await start();
    },
    stop: () => server.stop(),
    async kill() {
      process.kill(server.pid, 'SIGKILL');
      await server.ended;
    },
    async close() {
      await server.stop();
      await db.destroy();
      await database.drop();
      rmSync(storageDir, { recursive: true, force: true });
    },
  };
}
