import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { DrawingEntity, RenderJobEntity, SheetEntity } from '#server/entities/drawing-entity.ts';
import type { RegisterPage, RegisterRow } from '#shared/contract/register.ts';
import type { Caller } from '#tests/support/caller.ts';
import {
  addFinishedNet,
  addNet,
  addSheet,
  batchesOf,
  lineOf,
  type NetPlaceFixture,
  put,
} from '#tests/support/net-fixture.ts';
import {
  addRolePerson,
  readyToDecide,
  readyToSend,
  SIGNATURE,
  sendInputFor,
  sentUnopened,
} from '#tests/support/revision-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addDam, addMember } from '#tests/support/test-people.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

async function read(caller: Caller, query: Record<string, string> = {}): Promise<RegisterPage> {
  return (await caller.get(`/register?${new URLSearchParams(query)}`).expect(200)).body;
}
const idsOf = async (caller: Caller, query: Record<string, string> = {}) =>
  (await read(caller, query)).items.map(({ id }) => id);
async function rowOf(caller: Caller, id: string, query: Record<string, string> = {}): Promise<RegisterRow> {
  const row = (await read(caller, query)).items.find((each) => each.id === id);
  if (!row) throw new Error(`The register has no row ${id}.`);
  return row;
}

async function drawingOf({ sheetId }: { sheetId: string }): Promise<string> {
  return (await app.db.getRepository(SheetEntity).findOneByOrFail({ id: sheetId })).drawingId;
}

async function writeNote(caller: Caller, netId: string, text: string): Promise<string> {
  const id = uuidv7();
  await caller.post(`/nets/${netId}/notes`, { id, anchor: { on: 'drawing' }, text }).expect(201);
  return id;
}

/** What the register holds against what the tables say now: triggers must have left no difference. */
async function expectKeptUp(): Promise<void> {
  const differences = await app.db.query(
    `WITH now AS (SELECT * FROM register_rows(ARRAY(SELECT id FROM drawing)))
      (SELECT 'missing' AS what, id, kind FROM (SELECT * FROM now EXCEPT SELECT * FROM register_entry) m)
      UNION ALL (SELECT 'too many', id, kind FROM (SELECT * FROM register_entry EXCEPT SELECT * FROM now) t)`,
  );
  expect(differences).toEqual([]);
  expect(await app.db.query('SELECT * FROM register_stale')).toEqual([]);
}

describe('the register', () => {
  it('is empty for somebody without a dam', async () => {
    const { caller } = await app.signIn('New Here');
    expect(await read(caller)).toEqual({ items: [], nextCursor: null, total: 0 });
  });

  it('lists a drawing, then its sections, then their nets, with what each is and who made it', async () => {
    const place = await addNet(app);
    const drawingId = await drawingOf(place);
    const { items, total } = await read(place.caller);
    expect(items.map(({ id, kind }) => [id, kind])).toEqual([
      [drawingId, 'drawing'],
      [place.sectionId, 'section'],
      [place.netId, 'net'],
    ]);
    expect(total).toBe(3);
    expect(items[2]).toMatchObject({
      damName: 'Harrow Fen Dam',
      drawing: { id: drawingId, number: 'HF-114', revision: 'C' },
      section: { name: 'B–B', chainage: '212' },
      net: 'Full supply',
      sheet: { id: place.sheetId, pageNumber: 1, pictureId: null },
      states: ['draft'],
      madeBy: { name: 'Iris Marsh' },
      isArchived: false,
    });
    await expectKeptUp();
  });

  it('shows each part, and an admin, the dam; nobody who has no part or has left', async () => {
    const { damId, netId, caller } = await addNet(app);
    const everyone = [
      caller,
      (await addRolePerson(app, damId, 'Remi Okafor', 'reviewer')).caller,
      (await addRolePerson(app, damId, 'Tove Lind', 'colleague')).caller,
      (await app.signIn('Ada Quist', { admin: true })).caller,
    ];
    for (const each of everyone) expect(await idsOf(each, { dam: damId })).toContain(netId);
    const stranger = await addNet(app, 'Somebody Else');
    for (const query of [{}, { dam: damId }, { q: 'HF-114' }, { archived: 'yes' }] as Array<
      Record<string, string>
    >)
      expect(await idsOf(stranger.caller, query)).not.toContain(netId);
    const leaver = await addRolePerson(app, damId, 'Leaving', 'colleague');
    expect(await idsOf(leaver.caller)).toContain(netId);
    await caller.delete(`/dams/${damId}/members/${leaver.person.id}`).expect(204);
    expect((await read(leaver.caller)).items).toEqual([]);
  });

  it('shows what was put away only when it is asked for: a net, a drawing, a whole dam', async () => {
    const place = await addNet(app);
    const { caller, damId, sectionId, netId } = place;
    const drawingId = await drawingOf(place);
    const all = [drawingId, sectionId, netId];
    const lists = async () => [await idsOf(caller), await idsOf(caller, { archived: 'yes' })];
    await caller.post(`/nets/${netId}/archive`).expect(200);
    expect(await lists()).toEqual([[drawingId, sectionId], [netId]]);
    expect((await rowOf(caller, sectionId)).states).toEqual(['bare']);
    await caller.post(`/drawings/${drawingId}/archive`).expect(200);
    expect(await lists()).toEqual([[], all]);
    await expectKeptUp();
    await caller.post(`/drawings/${drawingId}/restore`).expect(200);
    await caller.post(`/nets/${netId}/restore`).expect(200);
    await caller.post(`/dams/${damId}/archive`).expect(200);
    expect(await lists()).toEqual([[], all]);
    expect((await rowOf(caller, netId, { archived: 'yes' })).isArchived).toBe(true);
    await caller.post(`/dams/${damId}/restore`).expect(200);
    expect(await lists()).toEqual([all, []]);
  });

  it('tells how far a drawing is, from preparing to accepted, and filters by it', async () => {
    const place = await readyToSend(app);
    const { caller, netId, reviewer } = place;
    const drawingId = await drawingOf(place);
    const states = async () => [
      (await rowOf(caller, drawingId)).states,
      (await rowOf(caller, netId)).states,
      await idsOf(caller, { state: 'sent' }),
    ];
    expect(await states()).toEqual([['draft'], ['draft'], []]);
    const input = await sendInputFor(place, reviewer.person.id);
    await caller.post(`/nets/${netId}/revisions`, input).expect(201);
    expect(await states()).toEqual([['sent'], ['sent'], [drawingId, place.sectionId, netId]]);
    expect((await rowOf(caller, netId)).revisionLabel).toBe('A');
    await readyToDecide(reviewer.caller, input.id);
    const decision = { decision: 'accepted', note: '', ...SIGNATURE };
    await reviewer.caller.post(`/revisions/${input.id}/decision`, decision).expect(201);
    expect(await states()).toEqual([['accepted'], ['accepted'], []]);
    await expectKeptUp();

    const jobs = app.db.getRepository(RenderJobEntity);
    const bare = await drawingOf({ sheetId: await addSheet(app, place.damId, place.engineer.id) });
    expect((await rowOf(caller, bare)).states).toEqual(['bare']);
    await jobs.insert({ id: uuidv7(), drawingId: bare, state: 'running' });
    expect((await rowOf(caller, bare)).states).toEqual(['preparing']);
    await jobs.update({ drawingId: bare }, { state: 'refused' });
    expect(await idsOf(caller, { state: 'unusable' })).toEqual([bare]);
    await expectKeptUp();
  });

  it('knows whose a net is: who made it and who drew on it', async () => {
    const { damId, netId, sectionId, caller, engineer } = await addNet(app);
    const other = await addRolePerson(app, damId, 'Second Engineer', 'engineer');
    expect(await idsOf(caller, { whose: 'me', kind: 'net' })).toEqual([netId]);
    expect(await idsOf(other.caller, { whose: 'me' })).toEqual([]);
    const line = put(lineOf([[3, 3]], { finished: false }));
    await other.caller.post(`/nets/${netId}/commands`, batchesOf()([line])).expect(200);
    expect(await idsOf(other.caller, { whose: 'me' })).toEqual([netId]);
    expect(await idsOf(other.caller, { whose: engineer.id })).toContain(sectionId);
    await expectKeptUp();
  });

  it('puts the latest work first when asked', async () => {
    const first = await addNet(app);
    const second = uuidv7();
    await first.caller.post(`/sections/${first.sectionId}/nets`, { id: second, name: 'Flood' }).expect(201);
    const newest = async () => (await idsOf(first.caller, { sort: 'newest', kind: 'net' }))[0];
    expect(await newest()).toBe(second);
    const line = put(lineOf([[3, 3]], { finished: false }));
    await first.caller.post(`/nets/${first.netId}/commands`, batchesOf()([line])).expect(200);
    expect(await newest()).toBe(first.netId);
    await expectKeptUp();
  });

  it('refuses a cursor that it did not make, and one of another order', async () => {
    const { caller } = await app.signIn('Pages');
    const made = (content: unknown) => Buffer.from(JSON.stringify(content)).toString('base64url');
    for (const cursor of [
      'x',
      made(['number', 'key']),
      made(['newest', 'yesterday', uuidv7()]),
      made(['dam', 'a', uuidv7()]),
    ])
      await caller.get(`/register?cursor=${cursor}`).expect(400);
    await caller.get('/register?sort=colour').expect(400);
  });
});

describe('a register of many drawings', () => {
  let caller: Caller;
  let numbers: string[];
  beforeAll(async () => {
    const signedIn = await app.signIn('Many Drawings');
    caller = signedIn.caller;
    numbers = Array.from({ length: 120 }, (_, n) => `HF-${n + 1}`);
    for (const name of ['Alder Dam', 'Birch Dam']) {
      const damId = await addDam(app.db, signedIn.person.id, { name });
      await addMember(app.db, damId, signedIn.person.id, 'colleague');
      await app.db.getRepository(DrawingEntity).insert(
        numbers.map((number) => ({
          id: uuidv7(),
          damId,
          uploadedBy: signedIn.person.id,
          sha256: 'b'.repeat(64),
          fileName: `${number}.tif`,
          mediaType: 'image/tiff',
          byteSize: '1',
          number,
        })),
      );
    }
  });

  const allPages = async (sort: string): Promise<RegisterRow[]> => {
    const rows: RegisterRow[] = [];
    let cursor: string | null = null;
    do {
      const page: RegisterPage = await read(caller, { sort, ...(cursor ? { cursor } : {}) });
      expect(page.total).toBe(cursor ? null : 240);
      rows.push(...page.items);
      cursor = page.nextCursor;
    } while (cursor);
    return rows;
  };

  it('is read page by page, each row once, HF-2 before HF-10', async () => {
    const rows = await allPages('number');
    expect(new Set(rows.map(({ id }) => id)).size).toBe(240);
    expect(rows.map(({ drawing }) => drawing.number)).toEqual(numbers.flatMap((each) => [each, each]));
  });

  it('is read dam by dam, and newest first', async () => {
    const rows = await allPages('dam');
    expect(rows.map(({ damName, drawing }) => [damName, drawing.number])).toEqual(
      ['Alder Dam', 'Birch Dam'].flatMap((dam) => numbers.map((number) => [dam, number])),
    );
    const times = (await allPages('newest')).map(({ at }) => at);
    expect(times).toEqual([...times].sort().reverse());
  });
});

describe('a search', () => {
  let place: NetPlaceFixture;
  let drawingId: string;
  beforeAll(async () => {
    place = await addFinishedNet(app, 'Searching');
    drawingId = await drawingOf(place);
    await place.caller
      .patch(`/drawings/${drawingId}`, { number: 'HF-118/03', title: 'Spillway apron, uplift' })
      .expect(200);
  });
  const search = (q: string, more: Record<string, string> = {}) => idsOf(place.caller, { q, ...more });

  it('finds a drawing number by its parts, in whole, in one word, and by the beginning of its last word', async () => {
    for (const q of ['HF-118/03', 'hf 118', '118', '03', 'HF118', 'hf11803', 'HF-118/0', 'hf-1'])
      expect(await search(q, { kind: 'drawing' }), q).toEqual([drawingId]);
    for (const q of ['HF-117', '18', '8/03', 'HF-118/04', '118 apro uplift'])
      expect(await search(q), q).toEqual([]);
  });

  it('finds a section and a net by words of their drawing and their own', async () => {
    expect(await search('spillway')).toEqual([drawingId, place.sectionId, place.netId]);
    expect(await search('apron B–B')).toEqual([place.sectionId, place.netId]);
    expect(await search('B-B full sup')).toEqual([place.netId]);
    expect(await search('Harrow Fen 212', { kind: 'section' })).toEqual([place.sectionId]);
  });

  it('finds a net by its notes as soon as they are written or changed, and shows where', async () => {
    const noteId = await writeNote(place.caller, place.netId, 'The toe drain is\nblocked at +1.20 m.');
    expect(await search('toe-drain')).toEqual([place.netId]);
    const { found } = await rowOf(place.caller, place.netId, { q: 'HF-118 toe bloc' });
    expect(found?.noteNumber).toBe(1);
    expect(found?.parts).toEqual([
      { text: 'The ', isHit: false },
      { text: 'toe', isHit: true },
      { text: ' drain is ', isHit: false },
      { text: 'blocked', isHit: true },
      { text: ' at +1.20 m.', isHit: false },
    ]);
    expect((await rowOf(place.caller, place.netId, { q: 'spillway' })).found).toBeNull();
    const answer = { id: uuidv7(), text: 'Cleaned in Übersee with <b>care</b>.' };
    await place.caller.post(`/notes/${noteId}/answers`, answer).expect(201);
    expect(await search('übersee')).toEqual([place.netId]);
    await place.caller
      .patch(`/notes/${noteId}/entries/${answer.id}`, { text: 'Cleaned in October.' })
      .expect(200);
    expect(await search('übersee')).toEqual([]);
    expect(await search('octob')).toEqual([place.netId]);
    await expectKeptUp();
  });

  it('shows no note of a net to the reviewer who may still read it blind', async () => {
    const { caller, netId, reviewer, revisionId } = await sentUnopened(app);
    await writeNote(caller, netId, 'The pressure at P1 is 42 kPa.');
    const found = async () => (await rowOf(reviewer.caller, netId, { q: 'pressure' })).found;
    expect(await found()).toBeNull();
    await readyToDecide(reviewer.caller, revisionId);
    expect((await found())?.parts.map(({ text }) => text).join('')).toBe('The pressure at P1 is 42 kPa.');
  });

  it('takes signs of a query language for what they are', async () => {
    for (const q of ["'", 'a & !b', '(', ':*', '\\', '<->', '%', "'; DROP TABLE note; --"])
      expect(await search(q), q).toEqual([]);
    await place.caller.get(`/register?q=${'x'.repeat(201)}`).expect(400);
  });

  it('finds nothing of a dam that the reader may not see', async () => {
    const stranger = await addNet(app, 'Stranger');
    expect(await idsOf(stranger.caller, { q: 'spillway' })).toEqual([]);
    expect((await read(stranger.caller, { q: 'octob' })).total).toBe(0);
  });

  it('takes names and notes of any length and kind, which must never keep a change from being saved', async () => {
    const { caller, netId, sectionId, sheetId, damId } = await addNet(app);
    const drawing = await drawingOf({ sheetId });
    const longest = (sign: string) => sign.repeat(200).slice(0, 200);
    await caller.patch(`/dams/${damId}`, { name: longest('7.') }).expect(200);
    await caller.patch(`/drawings/${drawing}`, { number: longest('1.'), title: longest('ß') }).expect(200);
    await caller.patch(`/sections/${sectionId}`, { name: longest('水') }).expect(200);
    await caller.patch(`/nets/${netId}`, { name: longest('🜄') }).expect(200);
    await writeNote(caller, netId, 'x'.repeat(4000));
    for (let n = 0; n < 3; n += 1)
      await writeNote(
        caller,
        netId,
        Array.from({ length: 800 }, (_, m) => `w${n}${m}`)
          .join(' ')
          .slice(0, 4000),
      );
    expect(await idsOf(caller, { q: 'w07', sort: 'dam' })).toEqual([netId]);
    await expectKeptUp();
  });

  it('follows the name of the dam', async () => {
    await place.caller.patch(`/dams/${place.damId}`, { name: 'Low Marsh Dam' }).expect(200);
    expect(await search('low marsh', { kind: 'net' })).toEqual([place.netId]);
    expect(await search('harrow')).toEqual([]);
    await expectKeptUp();
  });
});

describe('notes in the register', () => {
  it('are counted as open, and as new to who has not read them, for the net, its section and its drawing', async () => {
    const place = await addNet(app);
    const tove = await addRolePerson(app, place.damId, 'Tove Lind', 'colleague');
    const admin = (await app.signIn('Ada Quist', { admin: true })).caller;
    const noteId = await writeNote(tove.caller, place.netId, 'Is this the new piezometer?');
    const countsFor = async (caller: Caller) =>
      (await read(caller, { dam: place.damId })).items.map(({ openNotes, unreadNotes }) => [
        openNotes,
        unreadNotes,
      ]);
    expect(await countsFor(place.caller)).toEqual(Array(3).fill([1, 1]));
    expect(await countsFor(tove.caller)).toEqual(Array(3).fill([1, 0]));
    expect(await countsFor(admin)).toEqual(Array(3).fill([1, 0]));
    await place.caller.put(`/notes/${noteId}/read`, { entries: 1 }).expect(200);
    expect(await countsFor(place.caller)).toEqual(Array(3).fill([1, 0]));
    await tove.caller.post(`/notes/${noteId}/close`).expect(200);
    expect(await countsFor(place.caller)).toEqual(Array(3).fill([0, 0]));
  });
});

describe('two transactions at once', () => {
  it('on nets of one drawing leave the register right and do not wait for each other', async () => {
    const { damId, sectionId, sheetId, netId, caller } = await addNet(app);
    const nets = [netId, ...Array.from({ length: 5 }, () => uuidv7())];
    for (const id of nets.slice(1))
      await caller.post(`/sections/${sectionId}/nets`, { id, name: `Case ${id.slice(-2)}` }).expect(201);
    const trace = (id: string) =>
      caller.post(`/nets/${id}/commands`, batchesOf()([put(lineOf([[3, 3]], { finished: false }))]));
    await Promise.all([
      ...nets.map((id) => trace(id).expect(200)),
      ...nets.map((id) => writeNote(caller, id, `On ${id.slice(-2)}`)),
      ...nets.map((id) => caller.patch(`/nets/${id}`, { name: `Renamed ${id.slice(-3)}` }).expect(200)),
      caller.patch(`/drawings/${await drawingOf({ sheetId })}`, { title: 'Sections' }).expect(200),
      caller.patch(`/dams/${damId}`, { name: 'Quick Dam' }).expect(200),
    ]);
    await expectKeptUp();
  });
});
