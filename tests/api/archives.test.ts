import { createHash, randomBytes, randomUUID } from 'node:crypto';
import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { v7 as uuidv7 } from 'uuid';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { RevisionEntity } from '#server/entities/ledger-entity.ts';
import { ARCHIVED_TABLES, LEFT_OUT } from '#server/services/archive-tables.ts';
import { readDocument } from '#server/services/net-document.ts';
import { placeOfNet } from '#server/services/net-place.ts';
import { appendReviewRecord } from '#server/services/review-records.ts';
import { freezePayload } from '#server/services/revision-payload.ts';
import { artifactKey, originalKey } from '#server/storage/storage-keys.ts';
import { ENGINE_VERSION } from '#shared/compute/engine-version.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { ArchiveManifest } from '#shared/contract/archives.ts';
import type { RevisionPayload } from '#shared/contract/revisions.ts';
import { downloadArchive, expectSameRows } from '#tests/support/archived-rows.ts';
import type { Caller } from '#tests/support/caller.ts';
import { type ReadyNet, readyToSend } from '#tests/support/revision-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import type { TestPerson } from '#tests/support/test-people.ts';
import { readZip, writeZip } from '#tests/support/zip-files.ts';

const folder = mkdtempSync(path.join(os.tmpdir(), 'tracehead-archive-'));
const sha256 = (content: Buffer | string) => createHash('sha256').update(content).digest('hex');

let app: TestApp;
let admin: Caller;
let archiveFile: string;
let damId: string;

beforeAll(async () => {
  app = await createTestApp();
  damId = await addDamWithRecords();
  admin = (await app.signIn('Archivist', { admin: true })).caller;
  archiveFile = path.join(folder, 'dam.zip');
  await downloadArchive(app, admin, damId, archiveFile);
}, 120_000);
afterAll(async () => {
  await app.close();
  rmSync(folder, { recursive: true, force: true });
});

/** A dam with something in every table: a frozen net, a decision, a sheet in the ledger, notes with a file and an earlier text. */
async function addDamWithRecords(): Promise<string> {
  const place = await readyToSend(app);
  const { netId, reviewer } = place;
  const scan = await keep(randomBytes(300_000), originalKey);
  await app.db.query('UPDATE drawing SET sha256 = $1, byte_size = 300000', [scan]);
  const revisionId = await freeze(place);
  const note = { id: uuidv7(), anchor: { on: 'place', at: [1, 1] }, text: 'Why so steep?' };
  await reviewer.caller.post(`/nets/${netId}/notes`, note).expect(201);
  await addLedger(revisionId, reviewer.person);
  await addToNote(netId, note.id, reviewer.person.id);
  return place.damId;
}

/** Freezes the net as sending does, without the server's limit of time for reading it, which a busy machine oversteps. */
async function freeze({ netId, engineer, reviewer }: ReadyNet): Promise<string> {
  const { net, section, sheet, drawing, dam } = await placeOfNet(app.db.manager, netId);
  const document = await documentOf(app, netId);
  const [drawer, checker] = [engineer, reviewer.person].map(({ id, name }) => ({ id, name }));
  const payload: RevisionPayload = {
    payloadVersion: 1,
    revisionId: uuidv7(),
    netId,
    netName: net.name,
    label: 'A',
    dam,
    drawing,
    section,
    sheet,
    document,
    reading: readNet(document),
    engineVersion: ENGINE_VERSION,
    drawnBy: [drawer!],
    sentBy: drawer!,
    reviewer: checker!,
    reviewers: [checker!],
    dueOn: null,
    sentAt: new Date().toISOString(),
    message: 'Please look at line 3.',
    blindFirst: null,
    stayedOpen: [],
    previousHash: null,
  };
  const { text, hash } = freezePayload(payload);
  const { revisionId, label, engineVersion, sentAt } = payload;
  await app.db.query(
    `INSERT INTO revision (id, net_id, number, label, change_number, payload, payload_hash, engine_version, drawn_by, sent_by,
        reviewer_id, reviewer_ids, sent_at) VALUES ($1, $2, 1, $3, $4, $5, $6, $7, $8, $9, $10, $11, $12)`,
    [
      ...[revisionId, netId, label, net.changeNumber, text, hash, engineVersion],
      ...[[engineer.id], engineer.id, reviewer.person.id, [reviewer.person.id], sentAt],
    ],
  );
  return revisionId;
}

const documentOf = async (of: TestApp, netId: string) =>
  readDocument(of.db.manager, await placeOfNet(of.db.manager, netId));

async function addLedger(revisionId: string, reviewer: TestPerson): Promise<void> {
  const row = await app.db.getRepository(RevisionEntity).findOneByOrFail({ id: revisionId });
  const at = new Date();
  await appendReviewRecord(app.db.manager, row, reviewer, at, { kind: 'placesShown' });
  await appendReviewRecord(app.db.manager, row, reviewer, at, { kind: 'figuresOpened' });
  await app.db.query(
    `INSERT INTO check_draft VALUES ($1, $2, '{title block drops}', '[{"itemId": "datum", "answer": "yes", "remark": "γ"}]', now())`,
    [revisionId, reviewer.id],
  );
  await app.db.query(
    `INSERT INTO decision (id, revision_id, decision, decided_by, note, decided_at) VALUES ($1, $2, 'accepted', $3, 'Good.', now())`,
    [uuidv7(), revisionId, reviewer.id],
  );
  const pdf = await keep(Buffer.from('%PDF-1.7 sheet'), artifactKey);
  await app.db.query(
    `INSERT INTO artifact (id, revision_id, kind, storage_key, sha256) VALUES ($1, $2, 'calculation-sheet-a3', $3, $4)`,
    [uuidv7(), revisionId, artifactKey(pdf), pdf],
  );
}

async function addToNote(netId: string, noteId: string, authorId: string): Promise<void> {
  const [entry] = await app.db.query('SELECT id FROM note_entry WHERE note_id = $1', [noteId]);
  const photo = await keep(Buffer.from('photo of the toe'), originalKey);
  await app.db.query(
    `INSERT INTO note_file (id, net_id, entry_id, file_name, media_type, byte_size, sha256, uploaded_by, uploaded_at)
      VALUES ($1, $2, $3, 'toe.jpg', 'image/jpeg', 16, $4, $5, now())`,
    [uuidv7(), netId, entry.id, photo, authorId],
  );
  await app.db.query('INSERT INTO note_entry_earlier VALUES ($1, $2, $3, now())', [
    uuidv7(),
    entry.id,
    'Before,\nwith a line break, a quote " and γ.',
  ]);
}

async function keep(content: Buffer, keyOf: (hash: string) => string): Promise<string> {
  const file = path.join(folder, randomUUID());
  writeFileSync(file, content);
  const hash = sha256(content);
  await app.deps.storage.putFile(keyOf(hash), file);
  return hash;
}

const upload = (caller: Caller, file: string) =>
  caller.post('/archives').set('Content-Type', 'application/zip').send(readFileSync(file));

const manifestOf = (entries: Map<string, Buffer>): ArchiveManifest =>
  JSON.parse(entries.get('manifest.json')!.toString());

/** The archive with an entry changed, and with a manifest that says so when asked. */
async function changedArchive(
  name: string,
  change: (content: Buffer) => Buffer,
  { manifestToo = false } = {},
): Promise<string> {
  const entries = await readZip(archiveFile);
  const content = change(entries.get(name)!);
  entries.set(name, content);
  if (manifestToo) {
    const manifest = manifestOf(entries);
    const stated = manifest.entries.find((entry) => entry.name === name)!;
    Object.assign(stated, { byteSize: content.length, sha256: sha256(content) });
    entries.set('manifest.json', Buffer.from(JSON.stringify(manifest)));
  }
  const file = path.join(folder, `${randomUUID()}.zip`);
  await writeZip(file, entries);
  return file;
}

describe('an archive', () => {
  it('knows every table of the schema: it is in it, or there is a reason why not', async () => {
    const tables: Array<{ tablename: string }> = await app.db.query(
      `SELECT tablename FROM pg_tables WHERE schemaname = 'public'`,
    );
    const known = [...ARCHIVED_TABLES.map(({ name }) => name), ...Object.keys(LEFT_OUT)];
    expect(tables.map(({ tablename }) => tablename).filter((name) => !known.includes(name))).toEqual([]);
    expect(new Set(known).size).toBe(known.length);
  });

  it('names every entry with its size and hash, and every original is the one uploaded', async () => {
    const entries = await readZip(archiveFile);
    const { entries: stated } = manifestOf(entries);
    expect([...entries.keys()].at(-1)).toBe('manifest.json');
    expect(stated.map(({ name }) => name)).toEqual([...entries.keys()].slice(0, -1));
    for (const { name, byteSize, sha256: hash } of stated) {
      expect([entries.get(name)!.length, sha256(entries.get(name)!)], name).toEqual([byteSize, hash]);
    }
    const drawings = await app.db.query('SELECT sha256 FROM drawing WHERE dam_id = $1', [damId]);
    for (const drawing of drawings) expect(entries.has(`files/sha256/${drawing.sha256}`)).toBe(true);
  });

  it('holds nothing by which one could sign in', async () => {
    const everything = Buffer.concat([...(await readZip(archiveFile)).values()]).toString('latin1');
    expect(everything).not.toContain('$argon2');
    expect(everything).not.toContain('password_hash');
  });

  it('is not begun when a file that a row refers to is gone', async () => {
    const other = await createTestApp();
    try {
      await upload((await other.signIn('Ada', { admin: true })).caller, archiveFile).expect(201);
      const [{ sha256: hash }] = await other.db.query('SELECT sha256 FROM drawing LIMIT 1');
      rmSync(path.join(other.storageDir, originalKey(hash)));
      const caller = (await other.signIn('Bea', { admin: true })).caller;
      const { body } = await caller.get(`/dams/${damId}/archive.zip`).expect(500);
      expect(body.detail).toContain(hash);
    } finally {
      await other.close();
    }
  });
});

describe('restoring into an empty installation', () => {
  let empty: TestApp;
  let caller: Caller;
  beforeAll(async () => {
    empty = await createTestApp();
    caller = (await empty.signIn('Ada Quist', { admin: true })).caller;
  });
  afterAll(() => empty.close());

  const kept = () =>
    existsSync(path.join(empty.storageDir, 'sha256'))
      ? readdirSync(path.join(empty.storageDir, 'sha256'))
      : [];
  afterEach(() => expect(readdirSync(path.join(empty.storageDir, 'incoming'))).toEqual([]));

  /** Refused with the entry's name, and nothing written. */
  async function expectRefused(file: string, words: RegExp): Promise<void> {
    const { body } = await upload(caller, file).expect(422);
    expect(body.code).toBe('refused-file');
    expect(body.detail).toMatch(words);
    const [{ count }] = await empty.db.query('SELECT count(*)::int FROM dam');
    const [people] = await empty.db.query('SELECT count(*)::int FROM person');
    expect([count, people.count, kept()]).toEqual([0, 1, []]);
  }

  it('is refused for what is no ZIP', async () => {
    const file = path.join(folder, 'no.zip');
    writeFileSync(file, 'not a zip at all, though long enough to look for an end of one');
    await expectRefused(file, /cannot be read as a ZIP/);
  });

  it('is refused when a byte of an original differs, with the name of the entry', async () => {
    const [name] = [...(await readZip(archiveFile)).keys()].filter((each) =>
      each.startsWith('files/sha256/'),
    );
    const flip = (content: Buffer) => {
      const changed = Buffer.from(content);
      changed[changed.length >> 1]! ^= 1;
      return changed;
    };
    await expectRefused(await changedArchive(name!, flip), new RegExp(`^${name}: .*hash differs`));
    // A manifest that was changed along does not help: the name of a file is its hash.
    await expectRefused(await changedArchive(name!, flip, { manifestToo: true }), new RegExp(`^${name}: `));
  });

  it('is refused when a frozen figure was changed, though every hash of the manifest fits', async () => {
    const change = (content: Buffer) => {
      const text = content.toString();
      expect(text).toContain('\\"porePressure\\":');
      return Buffer.from(text.replace(/\\"porePressure\\":(\d)/, '\\"porePressure\\":1$1'));
    };
    const file = await changedArchive('tables/revision.ndjson', change, { manifestToo: true });
    await expectRefused(file, /^tables\/revision\.ndjson: Revision .+ not as it was frozen/);
  });

  it('is refused when a record of a reviewer was changed or taken out', async () => {
    const entry = 'tables/review_record.ndjson';
    const lines = (content: Buffer) => content.toString().trimEnd().split('\n');
    const renamed = (content: Buffer) => Buffer.from(content.toString().replaceAll('Remi Okafor', 'Another'));
    const without = (content: Buffer) => Buffer.from(`${lines(content).slice(1).join('\n')}\n`);
    for (const change of [renamed, without]) {
      const file = await changedArchive(entry, change, { manifestToo: true });
      await expectRefused(file, /^tables\/review_record\.ndjson: A record of revision A is not as it was/);
    }
  });

  it('is refused for an entry too many, one too few, and a format of another day', async () => {
    const whole = await readZip(archiveFile);
    const write = async (entries: Map<string, Buffer>) => {
      const file = path.join(folder, `${randomUUID()}.zip`);
      await writeZip(file, entries);
      return file;
    };
    await expectRefused(await write(new Map([...whole, ['evil.sh', Buffer.from('x')]])), /^evil\.sh: /);
    const fewer = new Map([...whole].filter(([name]) => name !== 'people.ndjson'));
    await expectRefused(await write(fewer), /^people\.ndjson: The entry is missing/);
    const later = { ...manifestOf(whole), version: 2 };
    const other = new Map([...whole, ['manifest.json', Buffer.from(JSON.stringify(later))]]);
    await expectRefused(await write(other), /^manifest\.json: /);
  });

  it('brings back every row, file and figure; people come without a password', async () => {
    const { body } = await upload(caller, archiveFile).expect(201);
    expect(body).toMatchObject({ damId, name: expect.any(String) });
    await expectSameRows(app, empty, damId);
    for (const { name } of manifestOf(await readZip(archiveFile)).entries)
      if (name.startsWith('files/')) {
        const file = readFileSync(path.join(empty.storageDir, name.slice('files/'.length)));
        expect(sha256(file)).toBe(path.basename(name));
      }
    const people = await empty.db.query(
      `SELECT password_hash, deactivated_at IS NOT NULL AS closed, admin FROM person WHERE name <> 'Ada Quist' OR deactivated_at IS NOT NULL`,
    );
    expect(people.length).toBe(body.peopleMade.length);
    for (const person of people)
      expect(person).toMatchObject({ password_hash: null, closed: true, admin: false });
  });

  it('has the same schedules, and the ledger opens', async () => {
    const nets = await app.db.query('SELECT id FROM net ORDER BY id');
    for (const { id } of nets) {
      const [before, after] = await Promise.all([documentOf(app, id), documentOf(empty, id)]);
      expect(after).toEqual(before);
      expect(readNet(after)).toEqual(readNet(before));
    }
    const [{ id }] = await app.db.query('SELECT id FROM revision LIMIT 1');
    const [before, after] = await Promise.all([
      admin.get(`/revisions/${id}`),
      caller.get(`/revisions/${id}`),
    ]);
    expect(after.body.payload).toEqual(before.body.payload);
    expect(after.body.summary.hash).toBe(before.body.summary.hash);
  });

  it('has the tiles of every drawing made again by jobs', async () => {
    const jobs = empty.jobs.queued.filter(({ name }) => name === 'render-drawing').map(({ rowId }) => rowId);
    const rows = await empty.db.query(`SELECT id, state FROM render_job`);
    expect(rows.every((row: { state: string }) => row.state === 'waiting')).toBe(true);
    expect(jobs.sort()).toEqual(rows.map((row: { id: string }) => row.id).sort());
    const [{ count }] = await empty.db.query('SELECT count(*)::int FROM drawing');
    expect(jobs).toHaveLength(count);
  });

  it('is refused when the dam is there already', async () => {
    const { body } = await upload(caller, archiveFile).expect(409);
    expect(body.code).toBe('already-exists');
  });
});

describe('somebody with the same address and another id', () => {
  it('is named by what goes on, while the record keeps the id that was frozen', async () => {
    const other = await createTestApp();
    try {
      const { caller } = await other.signIn('Ada', { admin: true });
      const [engineer] = await app.db.query(
        'SELECT p.id, p.email FROM revision r JOIN person p ON p.id = r.sent_by',
      );
      const here = (await other.signIn('Iris')).person;
      await other.db.query('UPDATE person SET email = $1 WHERE id = $2', [engineer.email, here.id]);
      await upload(caller, archiveFile).expect(201);
      const named = async (sql: string) => (await other.db.query(sql)).map((row: { id: string }) => row.id);
      expect(await named('SELECT person_id AS id FROM membership')).toContain(here.id);
      expect(await named('SELECT DISTINCT changed_by AS id FROM document_entity')).toEqual([here.id]);
      expect(await named('SELECT sent_by AS id FROM revision')).toEqual([engineer.id]);
      const [{ id }] = await other.db.query('SELECT id FROM revision LIMIT 1');
      await caller.get(`/revisions/${id}`).expect(200);
    } finally {
      await other.close();
    }
  });
});
