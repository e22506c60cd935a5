import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { RenderJobEntity } from '#server/entities/drawing-entity.ts';
import { createRenderDrawingHandler } from '#server/jobs/handlers/render-drawing.ts';
import type { DrawingDto } from '#shared/contract/drawings.ts';
import { projectRoot } from '#tests/support/real-server.ts';
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

/** A file of the shared inputs, or where they are absent one of the test's own. */
async function scan(name: string, own: () => Promise<Buffer>): Promise<Buffer> {
  const file = path.resolve(projectRoot, '..', 'shared', 'inputs', name);
  if (existsSync(file)) return readFileSync(file);
  console.info(`The shared inputs are absent: ${name} is replaced by a file made in code.`);
  return own();
}

async function prepared(bytes: Buffer, name: string): Promise<DrawingDto> {
  const { body } = await caller.post(`/dams/${damId}/drawings`).attach('file', bytes, name).expect(201);
  const job = await app.db.getRepository(RenderJobEntity).findOneByOrFail({ drawingId: body.id });
  await createRenderDrawingHandler(app.deps)(job.id, never);
  return (await caller.get(`/drawings/${body.id}`).expect(200)).body;
}

const TILE = 512;
/** The sheet's finest tiles put together and made as small as a stamp, grey. */
async function stampOf({ id, widthPx, heightPx, tiles }: DrawingDto['sheets'][number]): Promise<Buffer> {
  const at: Array<[number, number]> = [];
  for (let y = 0; y * TILE < heightPx; y += 1) for (let x = 0; x * TILE < widthPx; x += 1) at.push([x, y]);
  const parts = await Promise.all(
    at.map(async ([x, y]) => {
      const { body } = await caller
        .get(`/sheets/${id}/tiles/${tiles.rendition}/${tiles.maxZoom}/${x}_${y}`)
        .expect(200);
      return { input: body as Buffer, left: x * TILE, top: y * TILE };
    }),
  );
  const whole = await sharp({
    create: { width: widthPx, height: heightPx, channels: 3, background: 'white' },
  })
    .composite(parts)
    .png()
    .toBuffer();
  return sharp(whole).resize(20, 15, { fit: 'fill' }).greyscale().raw().toBuffer();
}

const meanDifference = (a: Buffer, b: Buffer) =>
  a.reduce((sum, tone, index) => sum + Math.abs(tone - b[index]!), 0) / a.length;

describe('a fax of several pages', () => {
  const PAGE = { width: 3307, height: 4677 };
  const threePages = async () => {
    const page = sharp({ create: { ...PAGE, channels: 3, background: 'white' } })
      .png()
      .toBuffer();
    return sharp([await page, await page, await page], { join: { animated: true } })
      .toColourspace('b-w')
      .tiff({ compression: 'ccittfax4', bitdepth: 1, xres: 400 / 25.4, yres: 400 / 25.4 })
      .toBuffer();
  };

  it('has a sheet for each, with its size and the resolution it states', async () => {
    const { job, sheets } = await prepared(await scan('tiff/g4-multi.tiff', threePages), 'g4-multi.tiff');
    expect(job.state).toBe('done');
    const size = { widthPx: PAGE.width, heightPx: PAGE.height, dpi: 400 };
    expect(sheets).toMatchObject([1, 2, 3].map((pageNumber) => ({ pageNumber, ...size })));
  });
});

describe('a photograph taken with the telephone on its side', () => {
  it('stands upright, as the one taken upright', async () => {
    const upright = await scan('image/Landscape_1.jpg', ownPhotograph);
    const side = await scan('image/Landscape_6.jpg', async () =>
      sharp(await ownPhotograph())
        .rotate(-90)
        .withMetadata({ orientation: 6 })
        .jpeg()
        .toBuffer(),
    );
    expect(await sharp(side).metadata()).toMatchObject({ width: 450, height: 600, orientation: 6 });
    const [asTaken] = (await prepared(upright, 'upright.jpg')).sheets;
    const [turned] = (await prepared(side, 'side.jpg')).sheets;
    expect(turned).toMatchObject({ widthPx: 600, heightPx: 450 });
    expect(meanDifference(await stampOf(turned!), await stampOf(asTaken!))).toBeLessThan(8);
  });
});

/** Dark at the top left, so that no turn of it looks like another. */
function ownPhotograph(): Promise<Buffer> {
  const svg =
    '<svg xmlns="http://www.w3.org/2000/svg" width="600" height="450"><rect width="600" height="450" fill="#ddd"/><rect width="220" height="120" fill="#222"/></svg>';
  return sharp(Buffer.from(svg)).jpeg().toBuffer();
}
