import { existsSync, readdirSync } from 'node:fs';
import path from 'node:path';
import sharp from 'sharp';
import { v7 as uuidv7 } from 'uuid';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { EventEntity } from '#server/entities/dam-entity.ts';
import { RenderJobEntity } from '#server/entities/drawing-entity.ts';
import { RenditionEntity } from '#server/entities/rendition-entity.ts';
import { RenderRefusal } from '#server/imaging/refusal.ts';
import { createRenderProcess, type RenditionProcess } from '#server/imaging/render-process.ts';
import { createRenditionHandler } from '#server/jobs/handlers/make-rendition.ts';
import { createRenderDrawingHandler } from '#server/jobs/handlers/render-drawing.ts';
import { requeueRenditions } from '#server/services/rendition-job-service.ts';
import { readingDeps } from '#server/services/service-deps.ts';
import type { DrawingDto } from '#shared/contract/drawings.ts';
import { AS_SCANNED, type RenditionDto, type RenditionSettings } from '#shared/contract/renditions.ts';
import type { Caller } from '#tests/support/caller.ts';
import { pngDrawing } from '#tests/support/drawing-files.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addDam, addMember } from '#tests/support/test-people.ts';

let app: TestApp;
let caller: Caller;
let drawingId: string;
let sheetId: string;
const never = new AbortController().signal;

beforeAll(async () => {
  app = await createTestApp();
  const engineer = await app.signIn('Nora Fell');
  caller = engineer.caller;
  const damId = await addDam(app.db, engineer.person.id);
  await addMember(app.db, damId, engineer.person.id, 'engineer');
  const bytes = await pngDrawing({ width: 700, height: 500 });
  const { body } = await caller.post(`/dams/${damId}/drawings`).attach('file', bytes, 'a.png').expect(201);
  drawingId = body.id;
  const job = await app.db.getRepository(RenderJobEntity).findOneByOrFail({ drawingId });
  await createRenderDrawingHandler(app.deps)(job.id, never);
  sheetId = (await drawing()).sheets[0]!.id;
});
afterAll(() => app.close());
afterEach(async () => {
  await show(null).expect(200);
  expect(leftovers()).toEqual([]);
});

const drawing = async (): Promise<DrawingDto> =>
  (await caller.get(`/drawings/${drawingId}`).expect(200)).body;
const list = async (): Promise<RenditionDto[]> =>
  (await caller.get(`/sheets/${sheetId}/renditions`).expect(200)).body.items;
const leftovers = () => {
  const folder = path.join(app.storageDir, 'work');
  return existsSync(folder) ? readdirSync(folder) : [];
};
const ask = (change: Partial<RenditionSettings>, id = uuidv7()) =>
  caller.post(`/sheets/${sheetId}/renditions`, { id, settings: { ...AS_SCANNED, ...change } });
const show = (renditionId: string | null) =>
  caller.post(`/sheets/${sheetId}/show-rendition`, { renditionId });
const makeWith = (id: string, process?: RenditionProcess) =>
  createRenditionHandler(app.deps, process && (() => process))(id, never);

async function made(change: Partial<RenditionSettings>): Promise<string> {
  const { body } = await ask(change).expect(202);
  await makeWith(body.id);
  return body.id;
}

const failing = (error: Error): RenditionProcess => ({
  renderRendition: () => Promise.reject(error),
  peakBytes: () => 0,
  close: () => undefined,
});

describe('a cleaned-up picture', () => {
  it('that cannot be is refused in words', async () => {
    const { body } = await ask({ black: 200, white: 100 }).expect(400);
    expect(body.detail).toContain('White must be lighter than black');
    const crossed = [
      [0, 0],
      [700, 500],
      [700, 0],
      [0, 500],
    ] as unknown as RenditionSettings['corners'];
    expect((await ask({ corners: crossed }).expect(400)).body.detail).toContain('leave no picture');
    await ask({ specksPx: 1000 }).expect(400);
    expect(await list()).toEqual([]);
  });

  it('waits, is made by a job, and then stands for the sheet', async () => {
    const { body } = await ask({ turnDeg: 90, threshold: 128 }).expect(202);
    expect(body).toMatchObject({ state: 'waiting', widthPx: 500, heightPx: 700, shown: false });
    expect(body.madeBy.name).toBe('Nora Fell');
    expect(app.jobs.queued.at(-1)).toMatchObject({ name: 'make-rendition', rowId: body.id });
    expect((await drawing()).sheets[0]!.shown).toBeUndefined();
    await show(body.id).expect(409);

    await makeWith(body.id);
    const [rendition] = await list();
    expect(rendition).toMatchObject({ id: body.id, state: 'done', progress: 1, shown: true });
    const sheet = (await drawing()).sheets[0]!;
    expect(sheet).toMatchObject({ widthPx: 700, heightPx: 500, tiles: { rendition: 'base' } });
    expect(sheet.shown).toMatchObject({ id: body.id, widthPx: 500, tiles: { rendition: body.id } });
    // The picture's top right pixel is the sheet's top left one.
    expect(sheet.shown!.toBase).toEqual(
      [0, 1, 0, -1, 0, 500, 0, 0, 1].map((entry) => expect.closeTo(entry, 9)),
    );

    const tiles = `/sheets/${sheetId}/tiles/${body.id}`;
    const { body: bytes } = await caller.get(`${tiles}/${sheet.shown!.tiles.maxZoom}/0_0`).expect(200);
    expect(await sharp(bytes).metadata()).toMatchObject({ format: 'png', width: 500, height: 512 });
    await caller.get(`${tiles}/9/0_0`).expect(404);
    await caller.get(`/sheets/${sheetId}/tiles/base/0/0_0`).expect(200);
    const { body: small } = await caller.get(`/sheets/${sheetId}/thumbnail`).expect(200);
    const thumbnail = await sharp(small).metadata();
    expect(thumbnail.height).toBeGreaterThan(thumbnail.width);
  });

  it('gives way to the original and comes back; all are kept, and each step is written down', async () => {
    const [first, second] = [await made({ turnDeg: 2 }), await made({ invert: true })];
    const shown = async () => (await list()).filter((each) => each.shown).map((each) => each.id);
    expect(await shown()).toEqual([second]);
    await show(first).expect(200);
    expect(await shown()).toEqual([first]);
    app.live.published.length = 0;
    const { body } = await show(null).expect(200);
    expect(body.items.every((each: RenditionDto) => !each.shown)).toBe(true);
    expect((await drawing()).sheets[0]!.shown).toBeUndefined();
    expect(app.live.published).toContainEqual(expect.objectContaining({ type: 'drawing', drawingId }));
    const events = await app.db.getRepository(EventEntity).findBy({ drawingId });
    const types = events.map((event) => event.type);
    for (const type of ['rendition.asked', 'rendition.shown', 'rendition.original'])
      expect(types).toContain(type);
  });

  it('asked for twice with the same id is one', async () => {
    const id = uuidv7();
    await ask({ turnDeg: 1 }, id).expect(202);
    await ask({ turnDeg: 5 }, id).expect(202);
    expect((await list()).filter((each) => each.id === id)).toMatchObject([{ settings: { turnDeg: 1 } }]);
    await makeWith(id);
  });

  it('that the process refuses says why and changes nothing that is shown', async () => {
    const { body } = await ask({ turnDeg: 3 }).expect(202);
    await makeWith(body.id, failing(new RenderRefusal('too-slow', 'It took too long.')));
    const [rendition] = await list();
    expect(rendition).toMatchObject({ state: 'refused', message: 'It took too long.', shown: false });
  });

  it('is tried again after a fault of the server, three times in all, and after a start', async () => {
    const { body } = await ask({ turnDeg: 4 }).expect(202);
    for (const state of ['waiting', 'waiting', 'failed']) {
      await makeWith(body.id, failing(new Error('no room')));
      expect((await list())[0]).toMatchObject({ id: body.id, state });
    }
    const other = (await ask({ turnDeg: 6 }).expect(202)).body.id;
    app.jobs.queued.length = 0;
    await requeueRenditions(readingDeps(app.deps));
    expect(app.jobs.queued.map(({ rowId }) => rowId)).toEqual([other]);
    await makeWith(other);
  });

  it('whose run died is taken over once its lease has ended, and not before', async () => {
    const { body } = await ask({ turnDeg: 7 }).expect(202);
    const rows = app.db.getRepository(RenditionEntity);
    const dead = { state: 'running', runId: uuidv7(), leaseUntil: new Date(Date.now() + 60_000) } as const;
    await rows.update({ id: body.id }, dead);
    await makeWith(body.id);
    expect((await list())[0]).toMatchObject({ id: body.id, state: 'running' });
    await rows.update({ id: body.id }, { leaseUntil: new Date(Date.now() - 1000) });
    await makeWith(body.id);
    expect((await list())[0]).toMatchObject({ id: body.id, state: 'done' });
  });

  it('goes back to wait, unharmed, when the server stops', async () => {
    const { body } = await ask({ turnDeg: 8 }).expect(202);
    const stopping = new AbortController();
    const slow: RenditionProcess = {
      ...failing(new Error()),
      renderRendition: (_request, options) => {
        stopping.abort(new Error('stop'));
        return Promise.reject(options?.signal?.reason);
      },
    };
    await createRenditionHandler(app.deps, () => slow)(body.id, stopping.signal);
    const row = await app.db.getRepository(RenditionEntity).findOneByOrFail({ id: body.id });
    expect(row).toMatchObject({ state: 'waiting', attempts: 0, runId: null });
    await createRenditionHandler(app.deps, createRenderProcess)(body.id, never);
  });

  it('cannot be made while the drawing is put away', async () => {
    await caller.post(`/drawings/${drawingId}/archive`).expect(200);
    const answer = await ask({ turnDeg: 9 });
    await caller.post(`/drawings/${drawingId}/restore`).expect(200);
    expect(answer.status).toBe(409);
  });
});
