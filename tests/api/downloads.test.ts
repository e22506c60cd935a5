import DxfParser from 'dxf-parser';
import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addFinishedNet, addNet, openNet } from '#tests/support/net-fixture.ts';
import { addRolePerson, beginLine, sentRevision } from '#tests/support/revision-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

const polylinesOf = (text: string) =>
  new DxfParser().parseSync(text)!.entities.filter(({ type }) => type === 'LWPOLYLINE').length;

describe('downloads', () => {
  it('of a net as DXF are refused with the way out while it is not set out', async () => {
    const { caller, netId } = await addNet(app);
    const { body } = await caller.get(`/nets/${netId}/traces.dxf`).expect(422);
    expect(body).toMatchObject({
      code: 'net-unfinished',
      detail: expect.stringContaining('two known points'),
    });
  });

  it('of a net as DXF carry a name that says what they are of', async () => {
    const { caller, netId } = await addFinishedNet(app);
    const answer = await caller.get(`/nets/${netId}/traces.dxf`).expect(200);
    expect(answer.headers['content-type']).toContain('dxf');
    expect(decodeURIComponent(String(answer.headers['content-disposition']))).toContain(
      'HF-114 Section B–B Full supply.dxf',
    );
    const { document } = await openNet(caller, netId);
    const lines = Object.values(document.entities).filter(({ value }) => value.kind === 'line');
    expect(polylinesOf(answer.body.toString())).toBe(lines.length);
  });

  it('of a revision as DXF stay as they were frozen', async () => {
    const { caller, netId, revisionId } = await sentRevision(app);
    const address = `/revisions/${revisionId}/traces.dxf`;
    const before = await caller.get(address).expect(200);
    await beginLine(caller, netId);
    const after = await caller.get(address).expect(200);
    expect(after.body.toString()).toBe(before.body.toString());
    expect(decodeURIComponent(String(after.headers['content-disposition']))).toMatch(/revision .+\.dxf/);
  });

  it('of the schedule as CSV have a decimal comma when it is asked for', async () => {
    const { caller, netId } = await addFinishedNet(app);
    const point = await caller.get(`/nets/${netId}/schedule.csv`).expect(200);
    const comma = await caller.get(`/nets/${netId}/schedule.csv?decimal=comma`).expect(200);
    const rowOf = (text: string) => text.split('\r\n')[1] ?? '';
    const figures = rowOf(point.text).split(',').slice(1, 9).map(Number);
    expect(figures.every(Number.isFinite)).toBe(true);
    const withComma = rowOf(comma.text).split(';').slice(1, 9);
    expect(withComma.join()).toContain(',');
    expect(withComma.map((each) => Number(each.replace(',', '.')))).toEqual(figures);
    await caller.get(`/nets/${netId}/schedule.csv?decimal=perhaps`).expect(400);
  });

  it('of the activity as CSV have every event of the dam, oldest first, and no formula', async () => {
    const { caller, damId, netId, sectionId } = await addFinishedNet(app);
    await caller.patch(`/sections/${sectionId}`, { name: '=HYPERLINK("x")' }).expect(200);
    const answer = await caller.get(`/dams/${damId}/events.csv`).expect(200);
    expect(answer.headers['content-type']).toMatch(/^text\/csv/);
    const [{ count }] = await app.db.query('SELECT count(*)::int FROM event WHERE dam_id = $1', [damId]);
    const rows = answer.text.trimEnd().split('\r\n');
    expect(rows).toHaveLength(1 + count);
    const times = rows.slice(1).map((row) => row.split(',')[0] ?? '');
    expect(times).toEqual([...times].sort());
    expect(answer.text).not.toMatch(/(^|[,"])=HYPERLINK/m);
    expect(netId).toBeTruthy();
  });

  it('of the activity hold what the list shows: of a person, of a kind, of some days', async () => {
    const { caller, damId, netId } = await addFinishedNet(app);
    const remi = await addRolePerson(app, damId, 'Remi Okafor', 'reviewer');
    const note = { id: uuidv7(), anchor: { on: 'drawing' }, text: 'Why so steep?' };
    await remi.caller.post(`/nets/${netId}/notes`, note).expect(201);
    const later = new Date(Date.now() + 60_000).toISOString();
    for (const [query, kinds] of [
      [`person=${remi.person.id}`, ['note.written']],
      ['about=notes', ['note.written']],
      [`about=notes&until=${later}&person=${remi.person.id}`, ['note.written']],
      [`from=${later}`, []],
      ['about=checking', []],
    ] as const) {
      const { body } = await caller.get(`/dams/${damId}/events?${query}`).expect(200);
      expect(body.items.map(({ type }: { type: string }) => type)).toEqual(kinds);
      const file = await caller.get(`/dams/${damId}/events.csv?${query}`).expect(200);
      const rows = file.text.trimEnd().split('\r\n').slice(1);
      expect(rows.map((row) => row.match(/\bnote\.\w+/)?.[0])).toEqual(kinds);
    }
    await caller.get(`/dams/${damId}/events?about=weather`).expect(400);
    await caller.get(`/dams/${damId}/events.csv?from=yesterday`).expect(400);
  });

  it('of the activity of many years are made in pages, each event once', async () => {
    const { caller, damId, engineer } = await addNet(app);
    await app.db.query(
      `INSERT INTO event (id, dam_id, person_id, type, text, at)
        SELECT gen_random_uuid(), $1, $2, 'dam.changed', 'change ' || n, timestamptz '2001-01-01' + (n / 7) * interval '1 minute'
        FROM generate_series(1, 2345) n`,
      [damId, engineer.id],
    );
    const { text } = await caller
      .get(`/dams/${damId}/events.csv?about=dam&until=2002-01-01T00:00:00Z`)
      .expect(200);
    const changes = text
      .trimEnd()
      .split('\r\n')
      .slice(1)
      .map((row) => row.split(',')[2]);
    expect(new Set(changes).size).toBe(2345);
    expect(changes).toHaveLength(2345);
  });
});
