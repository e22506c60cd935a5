import { createHash } from 'node:crypto';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { netStateText } from '#client/text/drawings.ts';
import { demoId } from '#server/demo/demo-ids.ts';
import { DEMO_PASSWORD, engineer, reviewer } from '#server/demo/demo-people.ts';
import { apron, fullSupply, isTaken, seedDemo } from '#server/demo/seed-demo.ts';
import type { DrawingDto } from '#shared/contract/drawings.ts';
import type { PointReading } from '#shared/contract/reading.ts';
import type { RegisterPage } from '#shared/contract/register.ts';
import { downloadArchive, expectSameRows } from '#tests/support/archived-rows.ts';
import type { Caller } from '#tests/support/caller.ts';
import { readyToDecide } from '#tests/support/revision-fixture.ts';
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
    const revisionId = revisions.items[0].id;
    await readyToDecide(caller, revisionId);
    const { body: revision } = await caller.get(`/revisions/${revisionId}`).expect(200);
    expect(revision.decideRefusal).toBeNull();
    const mails = await app.db.query('SELECT to_address FROM outbox_mail');
    expect(mails).toEqual([{ to_address: reviewer.email }]);
  });

  describe('taken as an archive and restored into an empty installation', () => {
    const DAM = demoId(10);
    const folder = mkdtempSync(path.join(os.tmpdir(), 'tracehead-demo-archive-'));
    let empty: TestApp;
    let before: Caller;
    let after: Caller;
    let answer: { rows: number; files: number; drawings: number };
    beforeAll(async () => {
      before = await signedIn(engineer.email);
      const file = path.join(folder, 'demo.zip');
      await downloadArchive(app, before, DAM, file);
      empty = await createTestApp();
      after = (await empty.signIn('Ada Elsewhere', { admin: true })).caller;
      const upload = after.post('/archives').set('Content-Type', 'application/zip').send(readFileSync(file));
      answer = (await upload.expect(201)).body;
    });
    afterAll(async () => {
      await empty.close();
      rmSync(folder, { recursive: true, force: true });
    });

    it('has every row as it was, and every original byte for byte', async () => {
      const rows = await expectSameRows(app, empty, DAM);
      expect(rows).toBeGreaterThan(100);
      expect(answer).toMatchObject({ drawings: 3, files: 3 });
      const files: Array<{ sha256: string }> = await empty.db.query('SELECT sha256 FROM drawing');
      for (const { sha256 } of files) {
        const bytes = readFileSync(path.join(empty.storageDir, 'sha256', sha256));
        expect(createHash('sha256').update(bytes).digest('hex')).toBe(sha256);
      }
    });

    it('has every schedule, every frozen figure and its hash the same', async () => {
      const nets: Array<{ id: string }> = await app.db.query('SELECT id FROM net ORDER BY id');
      expect(nets).toHaveLength(4);
      const read = async (caller: Caller, address: string) => (await caller.get(address).expect(200)).body;
      for (const address of nets.map(({ id }) => `/nets/${id}/schedule`))
        expect(await read(after, address), address).toEqual(await read(before, address));
      const revisions: Array<{ id: string }> = await app.db.query('SELECT id FROM revision ORDER BY id');
      expect(revisions.length).toBeGreaterThan(0);
      for (const address of revisions.map(({ id }) => `/revisions/${id}`)) {
        const [was, is] = [await read(before, address), await read(after, address)];
        expect(is.payload, address).toEqual(was.payload);
        expect(is.summary.hash).toBe(was.summary.hash);
      }
    });

    it('stands in the register as it did, but for sheets that are prepared again', async () => {
      const rowsFor = async (caller: Caller) => {
        const page: RegisterPage = (await caller.get('/register').expect(200)).body;
        return page.items.map(({ kind, id, states, madeBy, at, openNotes }) => ({
          ...{ kind, id, madeBy, at, openNotes },
          states: kind === 'drawing' ? [] : states,
        }));
      };
      expect(await rowsFor(after)).toEqual(await rowsFor(before));
    });
  });

  it('keeps out of a database in which somebody else has an account', async () => {
    await app.signIn('Nora Fell');
    expect(await isTaken(app.deps)).toBe(true);
  });
});
