import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { RenderJobEntity } from '#server/entities/drawing-entity.ts';
import { refusals } from '#server/imaging/refusal.ts';
import { createRenderProcess, type RenderProcess } from '#server/imaging/render-process.ts';
import { createRenderDrawingHandler } from '#server/jobs/handlers/render-drawing.ts';
import type { JobHandler } from '#server/jobs/jobs-port.ts';
import { pdfDrawing, pngDrawing } from '#tests/support/drawing-files.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { addDam, addMember } from '#tests/support/test-people.ts';

let app: TestApp;
let caller: Awaited<ReturnType<TestApp['signIn']>>['caller'];
let damId: string;
beforeAll(async () => {
  app = await createTestApp();
  const engineer = await app.signIn('Nora Fell');
  caller = engineer.caller;
  damId = await addDam(app.db, engineer.person.id);
  await addMember(app.db, damId, engineer.person.id, 'engineer');
});
afterAll(() => app.close());

const never = new AbortController().signal;
/** 1191 × 1684 pt at 300 dpi: 4963 × 7017 px, of which the first view has an eighth of level 4. */
const A2 = { width: 1191, height: 1684 };

/** Uploads a page that takes long; `then` runs when its first view has been announced, before the rest is taken over. */
async function rendered(then: (drawingId: string) => Promise<void>) {
  const { body } = await caller
    .post(`/dams/${damId}/drawings?again=yes`)
    .attach('file', pdfDrawing([A2]), 'plan.pdf')
    .expect(201);
  const { id: jobId } = await app.db.getRepository(RenderJobEntity).findOneByOrFail({ drawingId: body.id });
  await createRenderDrawingHandler(app.deps, () => heldProcess(() => then(body.id)))(jobId, never);
  return { drawingId: body.id as string, jobId };
}

/** Draws as ever, and keeps what it has drawn until the first view has been looked at. */
function heldProcess(look: () => Promise<void>): RenderProcess {
  const real = createRenderProcess();
  return {
    probe: (file, options) => real.probe(file, options),
    peakBytes: () => real.peakBytes(),
    close: () => real.close(),
    async renderSheet(request, options) {
      const sheet = await real.renderSheet(request, options);
      await look();
      return sheet;
    },
  };
}

const drawing = async (drawingId: string) => (await caller.get(`/drawings/${drawingId}`).expect(200)).body;
/** The first view is entered in a transaction of its own, which the rendering does not wait for. */
async function shownSheet(drawingId: string) {
  return expect.poll(async () => (await drawing(drawingId)).sheets[0], { timeout: 5000 });
}

describe('the first view of a sheet', () => {
  it('can be seen and worked on while the rest is drawn, and is replaced by it', async () => {
    let firstId = '';
    const { drawingId } = await rendered(async (id) => {
      const size = { widthPx: 4963, heightPx: 7017, dpi: 300, isDrawn: true };
      const tiles = { rendition: 'base', tileSizePx: 512, maxZoom: 4, readyZoom: 3, format: 'png' };
      await (await shownSheet(id)).toMatchObject({ ...size, tiles });
      const { job, sheets } = await drawing(id);
      expect(job).toMatchObject({ state: 'running', pagesDone: 0 });
      firstId = sheets[0].id;
      // 7017 px at half the size: 3509 px, the last tile of 512 px is the seventh.
      await caller.get(`/sheets/${firstId}/tiles/base/3/0_6`).expect(200);
      await caller.get(`/sheets/${firstId}/tiles/base/4/0_0`).expect(404);
      await caller.get(`/sheets/${firstId}/thumbnail`).expect(200);
      await caller
        .post(`/sheets/${firstId}/sections`)
        .send({ id: '01890000-0000-7000-8000-00000000f001', name: 'A–A', chainage: '', frame: null })
        .expect(201);
    });
    const { job, sheets, sections } = await drawing(drawingId);
    expect(job.state).toBe('done');
    expect(sheets).toHaveLength(1);
    expect(sheets[0]).toMatchObject({ id: firstId, widthPx: 4963, heightPx: 7017 });
    expect(sheets[0].tiles).toEqual({ rendition: 'base', tileSizePx: 512, maxZoom: 4, format: 'png' });
    await caller.get(`/sheets/${firstId}/tiles/base/4/0_0`).expect(200);
    expect(sections).toHaveLength(1);
  });

  it('is taken back when the page turns out to be damaged', async () => {
    let sheetId = '';
    const { drawingId } = await rendered(async (id) => {
      await (await shownSheet(id)).toBeDefined();
      sheetId = (await drawing(id)).sheets[0].id;
      throw refusals.damagedPage('a picture');
    });
    const { job, sheets } = await drawing(drawingId);
    expect(job.state).toBe('refused');
    expect(sheets).toEqual([]);
    await caller.get(`/sheets/${sheetId}/tiles/base/0/0_0`).expect(404);
  });

  it('stays, and says what it is, when somebody works on it; prepared again it becomes whole', async () => {
    const { drawingId, jobId } = await rendered(async (id) => {
      await (await shownSheet(id)).toBeDefined();
      const [sheet] = (await drawing(id)).sheets;
      await caller
        .post(`/sheets/${sheet.id}/sections`)
        .send({ id: '01890000-0000-7000-8000-00000000f002', name: 'B–B', chainage: '', frame: null })
        .expect(201);
      throw refusals.damagedPage('a picture');
    });
    const { job, sheets } = await drawing(drawingId);
    expect(job.state).toBe('refused');
    expect(sheets[0].note).toMatch(/^Only a small picture of this page could be made\. /);
    expect(sheets[0].tiles.readyZoom).toBe(3);
    await caller.post(`/drawings/${drawingId}/prepare-again`).expect(200);
    await createRenderDrawingHandler(app.deps)(jobId, never);
    const whole = (await drawing(drawingId)).sheets[0];
    expect(whole).toMatchObject({ id: sheets[0].id, note: '' });
    expect(whole.tiles.readyZoom).toBeUndefined();
  });
});

describe('a page of vectors', () => {
  /** As the server has it: one rendering process for one drawing after the other. */
  let render: JobHandler;
  beforeAll(() => {
    render = createRenderDrawingHandler(app.deps);
  });
  const done = async (dpi: number, sheetId: string, who = caller) =>
    who.post(`/sheets/${sheetId}/draw-again`).send({ dpi });

  async function preparedPage(bytes: Buffer, name: string) {
    const { body } = await caller
      .post(`/dams/${damId}/drawings?again=yes`)
      .attach('file', bytes, name)
      .expect(201);
    const { id: jobId } = await app.db.getRepository(RenderJobEntity).findOneByOrFail({ drawingId: body.id });
    await render(jobId, never);
    const [sheet] = (await drawing(body.id)).sheets;
    return { drawingId: body.id as string, jobId, sheet };
  }

  it('is drawn again at the resolution chosen, as the same sheet under other tiles', async () => {
    const { drawingId, jobId, sheet } = await preparedPage(
      pdfDrawing([{ width: 144, height: 72 }]),
      'plan.pdf',
    );
    expect(sheet).toMatchObject({ widthPx: 600, heightPx: 300, dpi: 300, isDrawn: true });
    expect((await done(450, sheet.id)).status).toBe(200);
    expect((await done(450, sheet.id)).status).toBe(404);
    await render(jobId, never);
    const [again] = (await drawing(drawingId)).sheets;
    // 2 in × 1 in.
    expect(again).toMatchObject({ id: sheet.id, widthPx: 900, heightPx: 450, dpi: 450 });
    await caller.get(`/sheets/${sheet.id}/tiles/${again.tiles.rendition}/0/0_0`).expect(200);
    await caller.get(`/sheets/${sheet.id}/tiles/base/0/0_0`).expect(404);
    expect((await done(300, sheet.id)).status).toBe(200);
  });

  it('stays as it is once a section lies on it, out of the limits, and when it is a scan', async () => {
    const { sheet } = await preparedPage(pdfDrawing([{ width: 144, height: 72 }]), 'plan.pdf');
    expect((await done(100, sheet.id)).status).toBe(400);
    expect((await done(601, sheet.id)).status).toBe(400);
    await caller
      .post(`/sheets/${sheet.id}/sections`)
      .send({ id: '01890000-0000-7000-8000-00000000f003', name: 'C–C', chainage: '', frame: null })
      .expect(201);
    const refused = await done(450, sheet.id);
    expect(refused.status).toBe(409);
    expect(refused.body.title).toBe('Something lies on this sheet');
    const scan = await preparedPage(await pngDrawing({ seed: 77 }), 'scan.png');
    expect((await done(450, scan.sheet.id)).body.title).toBe('This page is a scan');
  });
});
