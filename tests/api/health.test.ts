import { Writable } from 'node:stream';
import { pino } from 'pino';
import { afterEach, describe, expect, it } from 'vitest';
import { createTestApp, type TestApp, type TestAppOptions } from '#tests/support/test-app.ts';
import { withDataSource } from '#tests/support/test-database.ts';

let app: TestApp;
const open = async (options?: TestAppOptions) => {
  app = await createTestApp(options);
  return app;
};
afterEach(() => app.close());

const readiness = async () => {
  const response = await fetch(`${app.address}/readyz`);
  return { status: response.status, body: await response.json() };
};

describe('/healthz', () => {
  it('answers while the process lives, whatever else is wrong', async () => {
    await open({ config: { minFreeBytes: Number.MAX_SAFE_INTEGER } });
    const response = await fetch(`${app.address}/healthz`);
    expect([response.status, await response.json()]).toEqual([200, { status: 'alive' }]);
  });
});

describe('/readyz', () => {
  it('is 200 when the database answers, every migration has run and the disk has room', async () => {
    await open();
    expect(await readiness()).toEqual({
      status: 200,
      body: { status: 'ready', checks: { database: 'ok', migrations: 'ok', disk: 'ok' } },
    });
  });

  it('is 503 with too little room on the disk', async () => {
    await open({ config: { minFreeBytes: Number.MAX_SAFE_INTEGER } });
    expect(await readiness()).toMatchObject({ status: 503, body: { checks: { disk: 'failed' } } });
  });

  it('is 503 while a migration is pending', async () => {
    await open();
    await withDataSource(app.database.ownerUrl, (db) => db.undoLastMigration({ transaction: 'each' }));
    expect(await readiness()).toMatchObject({ status: 503, body: { checks: { migrations: 'failed' } } });
  });
});

describe('the log', () => {
  it('has the number that the error shows, and neither cookie nor token', async () => {
    const lines: string[] = [];
    const sink = new Writable({
      write(chunk, _encoding, done) {
        lines.push(String(chunk));
        done();
      },
    });
    await open({ deps: { logger: pino({ level: 'info' }, sink) } });
    const response = await fetch(`${app.address}/api/v1/nowhere?token=secret-of-an-invitation`, {
      headers: { cookie: 'tracehead.sid=secret-of-a-session' },
    });
    const problem = (await response.json()) as { requestId: string };
    expect(response.headers.get('x-request-id')).toBe(problem.requestId);
    await expect.poll(() => lines.join('')).toContain(problem.requestId);
    expect(lines.join('')).not.toMatch(/secret-of/);
  });
});
