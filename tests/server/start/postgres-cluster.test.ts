import {
  chmodSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import net from 'node:net';
import os from 'node:os';
import path from 'node:path';
import pg from 'pg';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { databaseUrls, type RunningCluster, startCluster } from '#server/start/postgres-cluster.mjs';

const isRoot = process.getuid?.() === 0;
let storageDir: string;
let cluster: RunningCluster | null;

const start = async () => {
  cluster = await startCluster(storageDir, { quiet: true, throwAway: true });
  return cluster;
};
const stop = async () => {
  await cluster?.stop();
  cluster = null;
};
const kept = () => JSON.parse(readFileSync(path.join(storageDir, 'cluster.json'), 'utf8'));

async function ask(url: string, sql: string): Promise<string[]> {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    const { rows } = await client.query({ text: sql, rowMode: 'array' });
    return rows.map((row) => String(row[0]));
  } finally {
    await client.end();
  }
}

beforeEach(() => {
  storageDir = mkdtempSync(path.join(os.tmpdir(), 'tracehead-cluster-'));
  chmodSync(storageDir, 0o755);
  cluster = null;
});
afterEach(async () => {
  const { dataDir } = cluster ?? {};
  await stop();
  rmSync(storageDir, { recursive: true, force: true });
  if (dataDir?.startsWith('/var/lib/tracehead/'))
    rmSync(path.dirname(dataDir), { recursive: true, force: true });
});

describe("the product's own cluster", () => {
  it('is UTF-8, checks its pages, asks for passwords, and has one database with two roles', async () => {
    const { owner, app, superuser } = databaseUrls(await start());
    expect(await ask(superuser, 'SHOW server_encoding')).toEqual(['UTF8']);
    expect(await ask(superuser, 'SHOW data_checksums')).toEqual(['on']);
    expect(await ask(owner, 'SELECT current_user')).toEqual(['tracehead_owner']);
    expect(await ask(app, 'SELECT current_user')).toEqual(['tracehead_app']);
    await expect(ask(app.replace(/:[^:@]+@/, ':wrong@'), 'SELECT 1')).rejects.toThrow(/password/);
    await expect(ask(app, 'CREATE TABLE public.mine (id int)')).rejects.toThrow(/permission denied/);
  });

  it('does not run as root', async () => {
    const { dataDir } = await start();
    expect(statSync(dataDir).uid).not.toBe(0);
    expect(statSync(dataDir).mode & 0o777).toBe(0o700);
  });

  it('keeps what was written and its port from start to start', async () => {
    const first = await start();
    await ask(databaseUrls(first).owner, 'CREATE TABLE kept AS SELECT 7 AS seven');
    await stop();
    const second = await start();
    expect(second.port).toBe(first.port);
    expect(await ask(databaseUrls(second).owner, 'SELECT seven FROM kept')).toEqual(['7']);
  });

  it('takes another port when its own has been taken meanwhile', async () => {
    const { port } = await start();
    await stop();
    const other = net.createServer().listen(port, '127.0.0.1');
    await new Promise((resolve) => other.once('listening', resolve));
    const again = await start();
    await new Promise((resolve) => other.close(resolve));
    expect(again.port).not.toBe(port);
    expect(await ask(databaseUrls(again).app, 'SELECT 1')).toEqual(['1']);
  });

  it('is used, not started again, by a second program', async () => {
    const first = await start();
    const second = await startCluster(storageDir, { quiet: true });
    expect([first.startedHere, second.startedHere, second.port]).toEqual([true, false, first.port]);
  });

  it('is made anew over what an interrupted first start left', async () => {
    mkdirSync(path.join(storageDir, 'postgres.new'));
    writeFileSync(path.join(storageDir, 'postgres.new', 'half'), '');
    await start();
    expect(existsSync(path.join(storageDir, 'postgres.new'))).toBe(false);
  });

  it('gets its roles when the first start was cut off before they were made', async () => {
    await start();
    await stop();
    writeFileSync(path.join(storageDir, 'cluster.json'), JSON.stringify({ ...kept(), rolesReady: false }));
    expect(await ask(databaseUrls(await start()).app, 'SELECT current_user')).toEqual(['tracehead_app']);
    expect(kept().rolesReady).toBe(true);
  });

  it('lies elsewhere when its user cannot enter the folder, and is found there again', async () => {
    chmodSync(storageDir, 0o700);
    const { dataDir } = await start();
    // Only root starts it as somebody else, who is shut out of a private folder.
    expect(dataDir.startsWith(storageDir)).toBe(!isRoot);
    await ask(databaseUrls(cluster as RunningCluster).owner, 'CREATE TABLE kept AS SELECT 7 AS seven');
    await stop();
    rmSync(path.join(storageDir, 'cluster.json'));
    expect(await ask(databaseUrls(await start()).owner, 'SELECT seven FROM kept')).toEqual(['7']);
  });
});
