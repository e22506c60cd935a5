import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { netStateText } from '#client/text/drawings.ts';
import { DEMO_PASSWORD, engineer, reviewer } from '#server/demo/demo-people.ts';
import { apron, fullSupply, isTaken, seedDemo } from '#server/demo/seed-demo.ts';
import type { DrawingDto } from '#shared/contract/drawings.ts';
import type { PointReading } from '#shared/contract/reading.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
  await seedDemo(app.deps);
});
afterAll(() => app.close());

const TABLES = ['person', 'dam', 'drawing', 'sheet', 'section', 'net', 'note', 'revision', 'outbox_mail'];
const counts = () =>
  Promise.all(
    TABLES.map(async (table) => {
      const [{ count }] = await app.db.query(`SELECT count(*)::int FROM ${table}`);
      return [table, count];
    }),
  );

async function signedIn(email: string) {
  const caller = app.caller();
  await caller.signIn(email, DEMO_PASSWORD);
  return caller;
}

describe('the demo', () => {
  it('is not added twice when a seed is run again', async () => {
    const before = await counts();
    await seedDemo(app.deps);
    expect(await counts()).toEqual(before);
    expect(await isTaken(app.deps)).toBe(false);
  });

  it('shows a finished net with pressures, to whoever signs in with the password offered', async () => {
    const caller = await signedIn(engineer.email);
    const { body } = await caller.get(`/nets/${fullSupply}/schedule`).expect(200);
    expect(body.state).toBe('read');
    expect(body.points.map((point: PointReading) => point.status)).toEqual(['read', 'read', 'read', 'read']);
  });

  it('has one drawing that is not to scale and one net that is not finished', async () => {
    const caller = await signedIn(engineer.email);
    const { body: waiting } = await caller.get('/waiting').expect(200);
    const kinds = waiting.items.map((item: { kind: string }) => item.kind);
    expect(kinds).toContain('calibrate');
    expect(kinds).toContain('trace');
    const { body: dams } = await caller.get('/dams').expect(200);
    const { body: drawings } = await caller.get(`/dams/${dams.items[0].id}/drawings`).expect(200);
    const nets = (drawings.items as DrawingDto[]).flatMap((drawing) =>
      drawing.sections.flatMap((section) => section.nets),
    );
    const stateOf = (name: string) => nets.filter((net) => net.name === name).map(netStateText);
    expect(stateOf('Redrawn for the review')).toEqual(['not finished']);
    expect(nets.find((net) => net.id === fullSupply)?.drops).toBe(10);
  });

  it('has given the reviewer something to check, with its mail in the outbox', async () => {
    const caller = await signedIn(reviewer.email);
    const { body: revisions } = await caller.get(`/nets/${apron}/revisions`).expect(200);
    expect(revisions.items).toHaveLength(1);
    const { body: revision } = await caller.get(`/revisions/${revisions.items[0].id}`).expect(200);
    expect(revision.decideRefusal).toBeNull();
    const mails = await app.db.query('SELECT to_address FROM outbox_mail');
    expect(mails).toEqual([{ to_address: reviewer.email }]);
  });

  it('keeps out of a database in which somebody else has an account', async () => {
    await app.signIn('Nora Fell');
    expect(await isTaken(app.deps)).toBe(true);
  });
});
