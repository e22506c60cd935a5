import { type ChildProcess, execFileSync, spawn } from 'node:child_process';
import { chmodSync, existsSync, mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import net from 'node:net';
import os from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { freeLoopbackPort } from '#server/start/ports.mjs';
import { projectRoot } from '#tests/support/real-server.ts';

/** The start script as a person runs it: a process of its own, on an empty storage folder. */
interface Start {
  process: ChildProcess;
  output: () => string;
  ended: Promise<number | null>;
}

let storageDir: string;
let port: number;

function start(env: Record<string, string> = {}): Start {
  const child = spawn(process.execPath, ['server/start/start.mjs'], {
    cwd: projectRoot,
    env: {
      ...process.env,
      NODE_ENV: '',
      DATABASE_URL: '',
      DATABASE_APP_URL: '',
      STORAGE_DIR: storageDir,
      PORT: String(port),
      ...env,
    },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let output = '';
  child.stdout.on('data', (chunk) => {
    output += chunk;
  });
  child.stderr.on('data', (chunk) => {
    output += chunk;
  });
  const ended = new Promise<number | null>((resolve) => child.on('close', resolve));
  return { process: child, output: () => output, ended };
}

/** Waits for the line with the address; fails with what was said when the script ends before. */
async function ready(run: Start): Promise<void> {
  let over = false;
  run.ended.then(() => {
    over = true;
  });
  await expect
    .poll(() => over || run.output().includes('Tracehead is ready at'), { timeout: 90_000, interval: 20 })
    .toBe(true);
  expect(run.output()).toContain(`Tracehead is ready at http://127.0.0.1:${port}`);
}

const answers = (address: string) =>
  fetch(address).then(
    (response) => response.ok,
    () => false,
  );

const sentences = (run: Start) =>
  run
    .output()
    .split('\n')
    .filter((line) => line.trim() && !line.startsWith('{'));

const clusterState = () => JSON.parse(readFileSync(path.join(storageDir, 'cluster.json'), 'utf8'));
const isPostgresUp = () => existsSync(path.join(clusterState().dataDir, 'postmaster.pid'));

beforeAll(async () => {
  storageDir = mkdtempSync(path.join(os.tmpdir(), 'tracehead-first-start-'));
  // As root the database runs as another system user, who has to get in.
  chmodSync(storageDir, 0o755);
  port = await freeLoopbackPort(null);
});
afterAll(() => rmSync(storageDir, { recursive: true, force: true }));

describe('npm start on an empty storage folder', () => {
  it('makes a database, serves, says where, refuses a second start, and stops what it started', async () => {
    const first = start();
    await ready(first);
    expect(await answers(`http://127.0.0.1:${port}/readyz`)).toBe(true);
    expect(await answers(`http://127.0.0.1:${port}/`)).toBe(true);

    const second = start();
    expect(await second.ended).toBe(1);
    expect(sentences(second)).toEqual([
      `Tracehead is already running at http://127.0.0.1:${port} (process ${first.process.pid}). Nothing was started.`,
    ]);

    first.process.kill('SIGINT');
    expect(await first.ended).toBe(0);
    expect(await answers(`http://127.0.0.1:${port}/healthz`)).toBe(false);
    expect(isPostgresUp()).toBe(false);
    expect(existsSync(path.join(storageDir, 'running.json'))).toBe(false);
  });

  it('keeps its secrets to itself and shows the demo sign-ins', () => {
    expect(statSync(path.join(storageDir, 'secrets.json')).mode & 0o777).toBe(0o600);
    expect(existsSync(path.join(storageDir, 'demo-sign-ins.json'))).toBe(true);
  });
});

describe('the second start', () => {
  it('is ready within five seconds, on the same database and its port, and prints the sign-ins again', async () => {
    const { port: before } = clusterState();
    const took: number[] = [];
    // The quickest of three: what else runs on this machine can only slow a start.
    while (took.length < 3 && !took.some((ms) => ms < 5_000)) {
      const began = performance.now();
      const run = start();
      await ready(run);
      took.push(performance.now() - began);
      run.process.kill('SIGTERM');
      expect(await run.ended).toBe(0);
      expect(clusterState().port).toBe(before);
      expect(run.output()).toMatch(/Demo sign-ins:\n {2}\S+@\S+/);
    }
    // Promised by the issue: second start to ready within 5 s.
    expect(Math.min(...took)).toBeLessThan(5_000);
  });

  it('listens on loopback only and leaves no socket file', async () => {
    const run = start();
    await ready(run);
    const { port: databasePort, dataDir } = clusterState();
    const listening = execFileSync('sh', ['-c', 'cat /proc/net/tcp /proc/net/tcp6'], { encoding: 'utf8' });
    const hexPort = databasePort.toString(16).toUpperCase().padStart(4, '0');
    const local = listening
      .split('\n')
      .map((line) => line.trim().split(/\s+/))
      .filter((cells) => cells[3] === '0A' && cells[1]?.endsWith(`:${hexPort}`))
      .map((cells) => cells[1]);
    // 127.0.0.1 as the kernel writes it.
    expect(local).toEqual([`0100007F:${hexPort}`]);
    const socketLine = readFileSync(path.join(dataDir, 'postmaster.pid'), 'utf8').split('\n')[4];
    expect(socketLine?.trim()).toBe('');
    run.process.kill('SIGINT');
    await run.ended;
  });

  it('takes over the database of a start that was killed', async () => {
    const killed = start();
    await ready(killed);
    killed.process.kill('SIGKILL');
    await killed.ended;
    // The server notices that its start script has gone, and stops by itself.
    await expect.poll(() => answers(`http://127.0.0.1:${port}/healthz`), { timeout: 30_000 }).toBe(false);
    expect(isPostgresUp()).toBe(true);
    const next = start();
    await ready(next);
    next.process.kill('SIGINT');
    expect(await next.ended).toBe(0);
    expect(isPostgresUp()).toBe(false);
  });
});

describe('what can go wrong is one clear sentence and exit code 1', () => {
  const fails = async (env: Record<string, string>) => {
    const run = start(env);
    expect(await run.ended).toBe(1);
    const said = sentences(run);
    // A list of settings stands indented below its sentence.
    expect(
      said.filter((line) => !line.startsWith('  ')),
      run.output(),
    ).toHaveLength(1);
    expect(existsSync(path.join(storageDir, 'running.json'))).toBe(false);
    return said.join('\n');
  };

  it('a port that another program has', async () => {
    const other = net.createServer().listen(port, '127.0.0.1');
    await new Promise((resolve) => other.once('listening', resolve));
    expect(await fails({})).toMatch(
      /^Port \d+ on 127\.0\.0\.1 is used by another program\. Choose another port/,
    );
    await new Promise((resolve) => other.close(resolve));
  });

  it('a disk with too little room', async () => {
    expect(await fails({ MIN_FREE_BYTES: '1000000000000000' })).toMatch(
      /^The disk that holds .* is full: .* needed\./,
    );
  });

  it('production without a secret', async () => {
    expect(await fails({ NODE_ENV: 'production' })).toMatch(/^SESSION_SECRET must be set in production/);
  });

  it('settings that cannot be used', async () => {
    const said = await fails({ PUBLIC_URL: 'ftp://files', LOG_LEVEL: 'loud' });
    expect(said).toMatch(/^The server stopped before it was ready: These settings cannot be used:/);
    expect(said).toMatch(/PUBLIC_URL: must .*\n.*LOG_LEVEL: must be one of/);
  });

  it('a database that does not answer', async () => {
    const nobody = await freeLoopbackPort(null);
    const sentence = await fails({ DATABASE_URL: `postgres://x:y@127.0.0.1:${nobody}/z` });
    expect(sentence).toMatch(/^The database could not be brought up to date: .*ECONNREFUSED/);
  });

  it('passwords of the database that are gone', async () => {
    const secrets = path.join(storageDir, 'secrets.json');
    const kept = readFileSync(secrets, 'utf8');
    rmSync(secrets);
    expect(await fails({})).toMatch(
      /^The passwords of the database in .* are missing: .* Put that file back/,
    );
    writeFileSync(secrets, kept, { mode: 0o600 });
  });

  it('a broken database', async () => {
    const control = path.join(clusterState().dataDir, 'global', 'pg_control');
    const kept = readFileSync(control);
    writeFileSync(control, Buffer.alloc(kept.length));
    expect(await fails({})).toMatch(
      /^The database in .* does not start: .+\. Put back a copy of that folder/,
    );
    writeFileSync(control, kept);
    const run = start();
    await ready(run);
    run.process.kill('SIGINT');
    expect(await run.ended).toBe(0);
  });
});
