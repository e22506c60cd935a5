import { createHash } from 'node:crypto';
import { mkdirSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs';
import sharp from 'sharp';
import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createCalculationSheetHandler } from '#server/jobs/handlers/make-calculation-sheet.ts';
import { requeueCalculationSheets } from '#server/services/calculation-sheet-service.ts';
import { readingDeps } from '#server/services/service-deps.ts';
import { tileKey, tilePrefix } from '#server/storage/storage-keys.ts';
import type { CalculationSheetDto } from '#shared/contract/calculation-sheets.ts';
import type { RevisionDto } from '#shared/contract/revisions.ts';
import { plusMinusText } from '#shared/text/number-text.ts';
import { addFinishedNet } from '#tests/support/net-fixture.ts';
import { beginLine, SIGNATURE, sentRevision } from '#tests/support/revision-fixture.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

type Revision = Awaited<ReturnType<typeof sentRevision>>;
const SIZES = { widthPx: 2000, heightPx: 1000, tilePx: 512, maxZoom: 2 };

/** The tiles of the fixture's sheet, as rendering would have made them. */
async function addTiles(sheetId: string): Promise<string> {
  const { widthPx, heightPx, tilePx, maxZoom } = SIZES;
  const folder = path.join(app.storageDir, tilePrefix(sheetId, 'base'));
  for (let zoom = 0; zoom <= maxZoom; zoom += 1) {
    const shrink = 2 ** (maxZoom - zoom);
    const [width, height] = [Math.ceil(widthPx / shrink), Math.ceil(heightPx / shrink)];
    for (let y = 0; y * tilePx < height; y += 1)
      for (let x = 0; x * tilePx < width; x += 1) {
        const key = path.join(app.storageDir, tileKey(tilePrefix(sheetId, 'base'), zoom, x, y, 'png'));
        mkdirSync(path.dirname(key), { recursive: true });
        const size = {
          width: Math.min(tilePx, width - x * tilePx),
          height: Math.min(tilePx, height - y * tilePx),
        };
        writeFileSync(
          key,
          await sharp({ create: { ...size, channels: 3, background: '#efe9d8' } })
            .png()
            .toBuffer(),
        );
      }
  }
  return folder;
}

const ask = async (
  place: Revision | Awaited<ReturnType<typeof addFinishedNet>>,
  revisionId: string | null,
  paper = 'A4',
) => {
  const id = uuidv7();
  const input = { id, revisionId, paper, jobNumber: 'J-2207' };
  const { body } = await place.caller.post(`/nets/${place.netId}/calculation-sheets`, input).expect(202);
  expect(body).toMatchObject({ id, state: 'waiting', sha256: null });
  return id;
};

const run = (id: string) => createCalculationSheetHandler(app.deps)(id, new AbortController().signal);

const stateOf = async ({ caller, netId }: Pick<Revision, 'caller' | 'netId'>, id: string) =>
  (await caller.get(`/nets/${netId}/calculation-sheets/${id}`).expect(200)).body as CalculationSheetDto;

async function download({ caller, netId }: Pick<Revision, 'caller' | 'netId'>, id: string): Promise<Buffer> {
  const { body, headers } = await caller
    .get(`/nets/${netId}/calculation-sheets/${id}/file`)
    .buffer(true)
    .parse((res, done) => {
      const chunks: Buffer[] = [];
      res.on('data', (chunk: Buffer) => chunks.push(chunk));
      res.on('end', () => done(null, Buffer.concat(chunks)));
    })
    .expect(200);
  expect(headers['content-type']).toBe('application/pdf');
  expect(headers['content-disposition']).toMatch(/^attachment/);
  return body as Buffer;
}

async function textOf(pdf: Buffer): Promise<string> {
  const document = await getDocument({ data: new Uint8Array(pdf), verbosity: 0 }).promise;
  const texts: string[] = [];
  for (let page = 1; page <= document.numPages; page += 1) {
    const { items } = await (await document.getPage(page)).getTextContent();
    texts.push(...items.map((item) => ('str' in item ? item.str : '')));
  }
  return texts.join(' ').replaceAll(/\s+/g, ' ');
}

describe('the calculation sheet of a revision', () => {
  let place: Revision;
  beforeAll(async () => {
    place = await sentRevision(app);
    await addTiles(place.sheetId);
  });

  it('is made in a job, with the frozen figures and hash, and entered in the ledger', async () => {
    const id = await ask(place, place.revisionId);
    expect(app.jobs.queued).toContainEqual({ name: 'make-calculation-sheet', rowId: id, afterSeconds: 0 });
    await place.caller.get(`/nets/${place.netId}/calculation-sheets/${id}/file`).expect(409);
    await run(id);
    const state = await stateOf(place, id);
    const pdf = await download(place, id);
    expect(state).toMatchObject({ state: 'done', byteSize: pdf.length });
    expect(state.sha256).toBe(createHash('sha256').update(pdf).digest('hex'));
    const { body } = await place.caller.get(`/revisions/${place.revisionId}`).expect(200);
    const { payload, summary } = body as RevisionDto;
    const text = await textOf(pdf);
    expect(text.replaceAll(' ', '')).toContain(summary.hash);
    expect(payload.reading.points.length).toBeGreaterThan(0);
    for (const point of payload.reading.points)
      expect(text).toContain(plusMinusText(point.totalHead, point.totalHeadPlusMinus, 2));
    const artifacts = await app.db.query('SELECT kind, sha256 FROM artifact WHERE revision_id = $1', [
      place.revisionId,
    ]);
    expect(artifacts).toEqual([{ kind: 'calculation-sheet-a4', sha256: state.sha256 }]);
  });

  it('comes out the same again, also after the net went on, and is entered once', async () => {
    const first = await ask(place, place.revisionId);
    await run(first);
    await beginLine(place.caller, place.netId);
    const second = await ask(place, place.revisionId);
    await run(second);
    await run(second);
    expect((await stateOf(place, second)).sha256).toBe((await stateOf(place, first)).sha256);
    const [{ count }] = await app.db.query(
      'SELECT count(*)::int AS count FROM artifact WHERE revision_id = $1',
      [place.revisionId],
    );
    expect(count).toBe(1);
  });

  it('bears the decision once there is one, and no note that came later', async () => {
    const note = { id: uuidv7(), anchor: { on: 'place', at: [10, 10] }, text: 'Before the decision.' };
    await place.caller.post(`/nets/${place.netId}/notes`, note).expect(201);
    await place.reviewer.caller
      .post(`/revisions/${place.revisionId}/decision`, {
        decision: 'accepted',
        note: 'Well drawn.',
        ...SIGNATURE,
      })
      .expect(201);
    const decided = await ask(place, place.revisionId);
    await run(decided);
    const text = await textOf(await download(place, decided));
    expect(text).toContain('accepted by Remi Okafor');
    expect(text).toContain('Before the decision.');
    await place.caller
      .post(`/nets/${place.netId}/notes`, { ...note, id: uuidv7(), text: 'After the decision.' })
      .expect(201);
    const later = await ask(place, place.revisionId);
    await run(later);
    expect((await stateOf(place, later)).sha256).toBe((await stateOf(place, decided)).sha256);
  });

  it('is refused for a revision of another net', async () => {
    const other = await addFinishedNet(app);
    const input = { id: uuidv7(), revisionId: place.revisionId, paper: 'A4', jobNumber: '' };
    await other.caller.post(`/nets/${other.netId}/calculation-sheets`, input).expect(404);
    const own = await ask(place, place.revisionId);
    await other.caller.get(`/nets/${other.netId}/calculation-sheets/${own}`).expect(404);
    await other.caller.get(`/nets/${other.netId}/calculation-sheets/${own}/file`).expect(404);
  });

  it('is tried three times when the server itself is at fault, then given up with a sentence', async () => {
    const broken = await sentRevision(app);
    const folder = await addTiles(broken.sheetId);
    rmSync(folder, { recursive: true });
    const id = await ask(broken, broken.revisionId);
    for (let n = 0; n < 3; n += 1) await expect(run(id)).rejects.toThrow();
    expect((await stateOf(broken, id)).state).toBe('waiting');
    await run(id);
    expect(await stateOf(broken, id)).toMatchObject({
      state: 'failed',
      message: expect.stringContaining('administrator'),
    });
    expect(readdirSync(path.join(app.storageDir, 'work'))).toEqual([]);
  });

  it('is queued again when the server starts, if it was still waiting', async () => {
    const id = await ask(place, place.revisionId, 'A3');
    app.jobs.queued.length = 0;
    await requeueCalculationSheets(readingDeps(app.deps));
    expect(app.jobs.queued.map((each) => each.rowId)).toContain(id);
  });
});

describe('the calculation sheet of a draft', () => {
  it('says so, and is no part of the ledger', async () => {
    const place = await addFinishedNet(app);
    await addTiles(place.sheetId);
    const id = await ask(place, null, 'A3');
    await run(id);
    const text = await textOf(await download(place, id));
    expect(text).toContain('DRAFT');
    const { sha256 } = await stateOf(place, id);
    expect(await app.db.query('SELECT 1 FROM artifact WHERE sha256 = $1', [sha256])).toEqual([]);
    const { body } = await place.caller.get(`/nets/${place.netId}/calculation-sheets`).expect(200);
    expect(body.items.map((each: CalculationSheetDto) => each.id)).toEqual([id]);
  });
});
