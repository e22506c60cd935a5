import { existsSync, readdirSync } from 'node:fs';
import path from 'node:path';
import sharp from 'sharp';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { RenderJobEntity, SheetEntity } from '#server/entities/drawing-entity.ts';
import { createRenderProcess, type RenderProcess } from '#server/imaging/render-process.ts';
import { createRenderDrawingHandler } from '#server/jobs/handlers/render-drawing.ts';
import type { JobHandler } from '#server/jobs/jobs-port.ts';
import { requeueRenderJobs } from '#server/services/render-job-service.ts';
import { readingDeps } from '#server/services/service-deps.ts';
import { g4Drawing, pdfDrawing, pngDrawing } from '#tests/support/drawing-files.ts';
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
  render = rendering();
});
afterAll(() => app.close());

const never = new AbortController().signal;
const rendering = (createProcess?: () => RenderProcess) =>
  createRenderDrawingHandler(app.deps, createProcess);
/** As the server has it: one handler for all jobs. */
let render: JobHandler;
const jobs = () => app.db.getRepository(RenderJobEntity);

async function uploaded(bytes: Buffer, name = 'scan'): Promise<{ drawingId: string; jobId: string }> {
  const { body } = await caller
    .post(`/dams/${damId}/drawings?again=yes`)
    .attach('file', bytes, name)
    .expect(201);
  const job = await jobs().findOneByOrFail({ drawingId: body.id });
  return { drawingId: body.id, jobId: job.id };
}
const drawing = async (drawingId: string) => (await caller.get(`/drawings/${drawingId}`).expect(200)).body;
const tileFolders = () => {
  const folder = path.join(app.storageDir, 'sheets');
  return existsSync(folder) ? readdirSync(folder) : [];
};
const leftovers = () => {
  const folder = path.join(app.storageDir, 'work');
  return existsSync(folder) ? readdirSync(folder) : [];
};

/** A process that counts what it draws, and does as it is told before it draws a page. */
function watchedProcess(before: (pageNumber: number) => void | Promise<void> = () => undefined) {
  const real = createRenderProcess();
  const drawn: number[] = [];
  const watched: RenderProcess = {
    probe: (file, options) => real.probe(file, options),
    peakBytes: () => real.peakBytes(),
    close: () => real.close(),
    async renderSheet(request, options) {
      await before(request.pageNumber);
      drawn.push(request.pageNumber);
      return real.renderSheet(request, options);
    },
  };
  return { drawn, create: () => watched };
}

afterEach(() => expect(leftovers()).toEqual([]));

describe('the job that makes sheets', () => {
  it('does nothing for a row that is not there', async () => {
    await render('01890000-0000-7000-8000-000000000000', never);
  });

  it.each([
    ['a truncated PNG', async () => (await pngDrawing()).subarray(0, 900), /damaged or cut short/],
    ['a PDF without a page tree', async () => Buffer.from('%PDF-1.4\n%%EOF\n'), /The PDF is damaged/],
    [
      'a PDF whose only picture is broken',
      async () => pdfDrawing([{ width: 72, height: 72, brokenPicture: true }]),
      /A picture on the page is damaged/,
    ],
  ])('refuses %s in a sentence and leaves no sheet and no tile', async (_name, bytes, words) => {
    const tiles = tileFolders().length;
    const { drawingId, jobId } = await uploaded(await bytes());
    await render(jobId, never);
    const { job, sheets } = await drawing(drawingId);
    expect(job.state).toBe('refused');
    expect(job.message).toMatch(words);
    expect(sheets).toEqual([]);
    expect(tileFolders().length).toBe(tiles);
    const events = await app.db.query('SELECT type FROM event WHERE drawing_id = $1 ORDER BY id', [
      drawingId,
    ]);
    expect(events.map((event: { type: string }) => event.type)).toEqual([
      'drawing.uploaded',
      'drawing.refused',
    ]);
  });

  it('makes one sheet of a scan, in its own pixels', async () => {
    const { drawingId, jobId } = await uploaded(await g4Drawing({ width: 1300, height: 900, dpi: 300 }));
    await render(jobId, never);
    const { job, sheets } = await drawing(drawingId);
    expect(job).toEqual({ state: 'done', pagesTotal: 1, pagesDone: 1, pageProgress: 0, message: '' });
    expect(sheets).toHaveLength(1);
    expect(sheets[0]).toMatchObject({
      pageNumber: 1,
      widthPx: 1300,
      heightPx: 900,
      dpi: 300,
      // 1300 px need three tiles of 512: levels of one, two and three tiles.
      tiles: { rendition: 'base', tileSizePx: 512, maxZoom: 2, format: 'png' },
      note: '',
    });
    expect(app.live.published).toContainEqual({ type: 'drawing', damId, drawingId });
  });

  it('makes a sheet of each page of a PDF, turned as the page says, at 300 dots per inch', async () => {
    const pages = [
      { width: 144, height: 72 },
      { width: 144, height: 72, rotate: 90 },
    ];
    const { drawingId, jobId } = await uploaded(pdfDrawing(pages));
    await render(jobId, never);
    const { job, sheets } = await drawing(drawingId);
    expect(job).toMatchObject({ state: 'done', pagesTotal: 2, pagesDone: 2 });
    // 2 in × 1 in at 300 dpi.
    expect(sheets).toMatchObject([
      { pageNumber: 1, widthPx: 600, heightPx: 300, dpi: 300 },
      { pageNumber: 2, widthPx: 300, heightPx: 600, dpi: 300 },
    ]);
  });

  it('leaves out the page that cannot be drawn and says so', async () => {
    const pages = [
      { width: 144, height: 72 },
      { width: 144, height: 72, brokenPicture: true },
    ];
    const { drawingId, jobId } = await uploaded(pdfDrawing(pages));
    await render(jobId, never);
    const { job, sheets } = await drawing(drawingId);
    expect(job).toMatchObject({ state: 'done', pagesTotal: 2 });
    expect(job.message).toMatch(/^Page 2 of 2 was left out\. A picture/);
    expect(sheets).toHaveLength(1);
  });

  it('says on its sheet that a picture without data is left blank', async () => {
    const size = { width: 144, height: 72 };
    const { drawingId, jobId } = await uploaded(pdfDrawing([{ ...size, emptyPicture: true }, size]));
    await render(jobId, never);
    const { job, sheets } = await drawing(drawingId);
    expect(job).toMatchObject({ state: 'done', message: '' });
    expect(sheets.map((sheet: { note: string }) => sheet.note)).toEqual([
      expect.stringContaining('A picture on this page has no data in the file and is left blank.'),
      '',
    ]);
  });

  it('is asked for again by an engineer when pages are missing, and draws only those', async () => {
    const page = { width: 144, height: 72 };
    const { drawingId, jobId } = await uploaded(pdfDrawing([page, { ...page, brokenPicture: true }]));
    const again = (who = caller) => who.post(`/drawings/${drawingId}/prepare-again`);
    await again().expect(409);
    await render(jobId, never);
    const first = (await drawing(drawingId)).sheets;
    const queued = await again().expect(200);
    expect(queued.body.job).toMatchObject({ state: 'waiting', message: '' });
    await again().expect(409);
    const { drawn, create } = watchedProcess();
    await rendering(create)(jobId, never);
    expect(drawn).toEqual([2]);
    const { job, sheets } = await drawing(drawingId);
    expect(job.message).toMatch(/^Page 2 of 2 was left out\. A picture/);
    expect(sheets).toEqual(first);
    const events = await app.db.query('SELECT text FROM event WHERE drawing_id = $1 AND type = $2', [
      drawingId,
      'drawing.again',
    ]);
    expect(events).toEqual([{ text: expect.stringMatching(/^asked for .+ to be prepared again$/) }]);
  });

  it('is asked for again after a refusal, but not by who only reads, nor when nothing is missing', async () => {
    const refused = await uploaded((await pngDrawing()).subarray(0, 900));
    await render(refused.jobId, never);
    const reader = await app.signIn('Ola Reed');
    await addMember(app.db, damId, reader.person.id, 'reviewer', 'colleague');
    await reader.caller.post(`/drawings/${refused.drawingId}/prepare-again`).expect(403);
    await caller.post(`/drawings/${refused.drawingId}/prepare-again`).expect(200);
    await render(refused.jobId, never);
    expect((await drawing(refused.drawingId)).job.state).toBe('refused');
    const whole = await uploaded(await pngDrawing({ seed: 31 }));
    await render(whole.jobId, never);
    await caller.post(`/drawings/${whole.drawingId}/prepare-again`).expect(409);
    await caller.post(`/drawings/${refused.drawingId}/archive`).expect(200);
    await caller.post(`/drawings/${refused.drawingId}/prepare-again`).expect(409);
  });

  it('is done once, however often it is asked for', async () => {
    const { drawingId, jobId } = await uploaded(await pngDrawing({ seed: 2 }));
    const { drawn, create } = watchedProcess();
    await Promise.all([rendering(create)(jobId, never), rendering(create)(jobId, never)]);
    await rendering(create)(jobId, never);
    expect(drawn).toEqual([1]);
    expect((await drawing(drawingId)).sheets).toHaveLength(1);
  });

  it('is given back when the server stops, and the next run draws only what is missing', async () => {
    const pages = [1, 2, 3].map(() => ({ width: 72, height: 72 }));
    const { drawingId, jobId } = await uploaded(pdfDrawing(pages));
    const stopping = new AbortController();
    const first = watchedProcess((page) => {
      if (page === 2) stopping.abort();
    });
    await rendering(first.create)(jobId, stopping.signal);
    expect((await drawing(drawingId)).job).toMatchObject({ state: 'waiting', pagesTotal: 3, pagesDone: 1 });
    expect((await jobs().findOneByOrFail({ id: jobId })).attempts).toBe(0);
    const second = watchedProcess();
    await rendering(second.create)(jobId, never);
    expect(second.drawn).toEqual([2, 3]);
    expect((await drawing(drawingId)).job).toMatchObject({ state: 'done', pagesDone: 3 });
  });

  it('is left alone while another run holds it, and taken over when that one shows no sign of life', async () => {
    const { drawingId, jobId } = await uploaded(await pngDrawing({ seed: 3 }));
    const runId = '01890000-0000-7000-8000-000000000001';
    await jobs().update(
      { id: jobId },
      { state: 'running', runId, attempts: 1, leaseUntil: new Date(Date.now() + 20_000) },
    );
    await render(jobId, never);
    expect((await drawing(drawingId)).sheets).toEqual([]);
    app.jobs.queued.length = 0;
    await requeueRenderJobs(readingDeps(app.deps));
    const queued = app.jobs.queued.find((each) => each.rowId === jobId);
    expect(queued?.afterSeconds).toBeGreaterThan(15);
    await jobs().update({ id: jobId }, { leaseUntil: new Date(Date.now() - 1000) });
    await render(jobId, never);
    expect((await drawing(drawingId)).job.state).toBe('done');
    app.jobs.queued.length = 0;
    await requeueRenderJobs(readingDeps(app.deps));
    expect(app.jobs.queued.map((each) => each.rowId)).not.toContain(jobId);
  });

  it('waits out a fault of the server twice and gives up the third time', async () => {
    const { drawingId, jobId } = await uploaded(await pngDrawing({ seed: 4 }));
    app.jobs.queued.length = 0;
    const broken = watchedProcess(() => {
      throw new Error('the process ended');
    });
    for (const state of ['waiting', 'waiting', 'failed']) {
      await rendering(broken.create)(jobId, never);
      expect((await drawing(drawingId)).job.state).toBe(state);
    }
    expect(app.jobs.queued.map((each) => each.afterSeconds)).toEqual([5, 20]);
    expect((await drawing(drawingId)).job.message).toContain('The file is kept');
    expect((await drawing(drawingId)).sheets).toEqual([]);
  });

  it('waits when the disk is nearly full, before it writes tiles', async () => {
    const { drawingId, jobId } = await uploaded(await pngDrawing({ seed: 6 }));
    const config = { ...app.deps.config, minFreeBytes: Number.MAX_SAFE_INTEGER };
    await createRenderDrawingHandler({ ...app.deps, config })(jobId, never);
    expect((await drawing(drawingId)).job.state).toBe('waiting');
    await render(jobId, never);
    expect((await drawing(drawingId)).job.state).toBe('done');
  });

  it('gives up a file that ended the whole server three times', async () => {
    const { drawingId, jobId } = await uploaded(await pngDrawing({ seed: 5 }));
    const dead = { state: 'running', attempts: 3, leaseUntil: new Date(0) } as const;
    await jobs().update({ id: jobId }, { ...dead, runId: '01890000-0000-7000-8000-000000000002' });
    await render(jobId, never);
    expect((await drawing(drawingId)).job.state).toBe('failed');
  });
});

describe('the files of a sheet', () => {
  let sheetId: string;
  let drawingId: string;
  beforeAll(async () => {
    const png = await pngDrawing({ width: 700, height: 500, seed: 9 });
    const ids = await uploaded(png, 'Schnitt B–B "alt".png');
    drawingId = ids.drawingId;
    await render(ids.jobId, never);
    const sheet = await app.db.getRepository(SheetEntity).findOneByOrFail({ drawingId });
    sheetId = sheet.id;
  });

  it('are tiles a browser may keep for this person alone', async () => {
    const whole = await caller.get(`/sheets/${sheetId}/tiles/base/0/0_0`).expect(200);
    expect(whole.headers['content-type']).toBe('image/png');
    expect(whole.headers['cache-control']).toBe('private, max-age=31536000, immutable');
    expect(whole.headers['x-content-type-options']).toBe('nosniff');
    // 700 × 500 px: level 0 is half size, level 1 has a tile of 512 and one of 188 px.
    expect(await sharp(whole.body).metadata()).toMatchObject({ width: 350, height: 250 });
    const right = await caller.get(`/sheets/${sheetId}/tiles/base/1/1_0`).expect(200);
    expect(await sharp(right.body).metadata()).toMatchObject({ width: 188, height: 500 });
  });

  it('show the very pixels of the scan', async () => {
    const tile = await caller.get(`/sheets/${sheetId}/tiles/base/1/0_0`).expect(200);
    const original = await sharp(await pngDrawing({ width: 700, height: 500, seed: 9 }))
      .extract({ left: 0, top: 0, width: 512, height: 500 })
      .removeAlpha()
      .raw()
      .toBuffer();
    expect(
      (await sharp(tile.body).toColourspace('srgb').removeAlpha().raw().toBuffer()).equals(original),
    ).toBe(true);
  });

  it.each(['base/2/0_0', 'base/1/2_0', 'base/1/0_1', 'base/0/1_0', 'other/0/0_0', 'base/0/0_999999'])(
    'are not there at %s',
    async (address) => {
      await caller.get(`/sheets/${sheetId}/tiles/${address}`).expect(404);
    },
  );

  it.each(['base/0/..%2f..', 'base/-1/0_0', 'base/1.5/0_0', 'base/0/0_0.png'])(
    'refuse the address %s',
    async (address) => {
      const { status } = await caller.get(`/sheets/${sheetId}/tiles/${address}`);
      expect([400, 404]).toContain(status);
    },
  );

  it('have a thumbnail of at most 480 pixels', async () => {
    const { body, headers } = await caller.get(`/sheets/${sheetId}/thumbnail`).expect(200);
    expect(headers['content-type']).toBe('image/webp');
    const { width = 0, height = 0 } = await sharp(body).metadata();
    expect(Math.max(width, height)).toBeLessThanOrEqual(480);
  });

  it('are nothing to somebody who does not belong to the dam', async () => {
    const stranger = await app.signIn('Olaf Reed');
    for (const address of [
      `/sheets/${sheetId}/tiles/base/0/0_0`,
      `/sheets/${sheetId}/thumbnail`,
      `/drawings/${drawingId}/original`,
      `/drawings/${drawingId}`,
    ])
      await stranger.caller.get(address).expect(404);
    await app.caller().get(`/sheets/${sheetId}/thumbnail`).expect(401);
  });

  it('come with the original, byte for byte, always as a download under its own name', async () => {
    const { body, headers } = await caller.get(`/drawings/${drawingId}/original`).expect(200);
    expect(body).toEqual(await pngDrawing({ width: 700, height: 500, seed: 9 }));
    expect(headers['content-disposition']).toMatch(/^attachment; filename=/);
    expect(headers['content-disposition']).toContain(
      "filename*=UTF-8''Schnitt%20B%E2%80%93B%20%22alt%22.png",
    );
    expect(headers['content-security-policy']).toContain('sandbox');
    const part = await caller.get(`/drawings/${drawingId}/original`).set('Range', 'bytes=1-3').expect(206);
    expect(part.body.toString()).toBe('PNG');
    await caller.get(`/drawings/${drawingId}/original`).set('Range', 'bytes=99999999-').expect(416);
  });
});
