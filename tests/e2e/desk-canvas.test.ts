import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { entitiesOf } from '#shared/contract/document.ts';
import type { NetDetailDto } from '#shared/contract/nets.ts';
import { apronScan } from '#tests/support/journey/apron-sheet.ts';
import { type DeskHand, takeDesk } from '#tests/support/journey/desk-hand.ts';
import { allSaved } from '#tests/support/journey/desk-steps.ts';
import { addDrawings, openNewNet } from '#tests/support/journey/drawing-steps.ts';
import { type JourneyWorld, openWorld } from '#tests/support/journey/journey-world.ts';

let world: JourneyWorld;
let page: Page;
let hand: DeskHand;
let netId: string;
const tilesAsked: string[] = [];

beforeAll(async () => {
  world = await openWorld();
  page = await world.pageOf(world.engineer);
  page.on('request', (request) => {
    const tile = /\/tiles\/[^/]+\/(\d+)\//.exec(request.url());
    if (tile?.[1] !== undefined) tilesAsked.push(tile[1]);
  });
  await page.goto(`/dams/${world.damId}`);
  await addDrawings(page, [{ name: 'canvas.png', mimeType: 'image/png', buffer: await apronScan() }]);
  await openNewNet(page, 'canvas.png', { name: 'A–A', chainage: '10' });
  netId = new URL(page.url()).pathname.split('/').at(-1) ?? '';
  hand = await takeDesk(page);
});
afterAll(() => world.close());

/** The net as the server holds it. */
async function saved(): Promise<NetDetailDto> {
  await allSaved(page);
  const response = await page.request.get(`/api/v1/nets/${netId}`);
  return (await response.json()) as NetDetailDto;
}

async function savedLines() {
  const { document } = await saved();
  return entitiesOf(document, 'line').map(({ value }) => value);
}

const readout = async () => (await page.getByText(/^x .* px$/).textContent()) ?? '';
const zoomShown = async () => Number.parseFloat((await page.getByText(/^\d+(\.\d)? %$/).textContent()) ?? '');

async function pointerAt(): Promise<[number, number]> {
  const match = /x (\S+), y (\S+) px/.exec(await readout());
  return [Number(match?.[1]?.replace('−', '-')), Number(match?.[2]?.replace('−', '-'))];
}

const MOVES = 24;

/** How often the page was laid out, painted and shown while `work` went on; each of the moves comes in two steps. */
async function pageWork(work: () => Promise<void>) {
  const session = await page.context().browser()!.newBrowserCDPSession();
  const names: string[] = [];
  session.on('Tracing.dataCollected', ({ value }) => {
    names.push(
      ...(value as { name: string; ph: string }[]).flatMap(({ name, ph }) => (ph === 'X' ? [name] : [])),
    );
  });
  await session.send('Tracing.start', {
    transferMode: 'ReportEvents',
    traceConfig: { includedCategories: ['devtools.timeline'] },
  });
  await work();
  const complete = new Promise((resolve) => session.once('Tracing.tracingComplete', resolve));
  await session.send('Tracing.end');
  await complete;
  await session.detach();
  const count = (name: string) => names.filter((each) => each === name).length;
  return { layouts: count('Layout'), paints: count('Paint'), frames: count('Layerize') };
}

describe('the sheet', () => {
  it('is shown from tiles, finer ones once they are needed', async () => {
    await page.locator('[role=application] img').first().waitFor();
    const before = new Set(tilesAsked);
    expect(before.has('0')).toBe(true);
    await page.getByRole('button', { name: 'Zoom in' }).click({ clickCount: 5 });
    await expect.poll(() => page.locator('[role=application] img').count()).toBeGreaterThan(1);
    await page.getByRole('button', { name: 'Fit', exact: true }).click();
  });

  it('stays under the pointer while the wheel zooms', async () => {
    await hand.moveTo([500, 400]);
    const [x, y] = await pointerAt();
    const zoom = await zoomShown();
    for (let i = 0; i < 4; i += 1) await page.mouse.wheel(0, -200);
    await expect.poll(zoomShown).toBeGreaterThan(zoom * 2);
    await page.mouse.move(0, 0);
    await hand.moveTo([500, 400]);
    const [nextX, nextY] = await pointerAt();
    // The sheet is kept on whole device pixels, so each step may move it by half a screen pixel.
    expect(Math.abs(nextX - x)).toBeLessThan(4);
    expect(Math.abs(nextY - y)).toBeLessThan(4);
    await hand.sheet.focus();
    await page.keyboard.press('0');
    await expect.poll(zoomShown).toBe(zoom);
  });

  it('is dragged by the mouse and moved by the arrow keys', async () => {
    await hand.moveTo([500, 400]);
    const [x] = await pointerAt();
    await hand.sheet.focus();
    await page.keyboard.press('ArrowRight');
    await hand.moveTo([500, 401]);
    await expect.poll(async () => (await pointerAt())[0]).toBeGreaterThan(x + 20);
    await page.keyboard.press('ArrowLeft');
    await hand.moveTo([500, 400]);
    await expect.poll(async () => Math.abs((await pointerAt())[0] - x)).toBeLessThan(2);
  });

  it('draws nothing while nothing happens', async () => {
    await page.mouse.move(0, 0);
    await page.waitForTimeout(500);
    const draws = await page.evaluate(async () => {
      let count = 0;
      const { clearRect } = CanvasRenderingContext2D.prototype;
      CanvasRenderingContext2D.prototype.clearRect = function counted(...box) {
        count += 1;
        clearRect.apply(this, box);
      };
      await new Promise((done) => setTimeout(done, 1000));
      CanvasRenderingContext2D.prototype.clearRect = clearRect;
      return count;
    });
    expect(draws).toBe(0);
  });
});

describe('what follows the pointer', () => {
  it('neither lays the page out nor paints it', async () => {
    // The ring of the focus is shown, and the magnified view with its words.
    await hand.sheet.focus();
    await page.keyboard.press('k');
    await hand.moveTo([500, 300]);
    await page.getByRole('group', { name: /^Magnified/ }).waitFor();
    const done = await pageWork(async () => {
      for (let step = 1; step <= MOVES; step += 1) await hand.moveTo([500 + step, 300 + step]);
    });
    expect(done.frames).toBeGreaterThan(MOVES);
    // A few for what appears or changes its side while the pointer moves.
    expect(done.layouts).toBeLessThan(MOVES / 4);
    expect(done.paints).toBeLessThan(MOVES / 4);
    // Nothing of it is left behind: readout and magnified view tell the place of the last move.
    const places = page.getByText(`x ${500 + MOVES}.0, y ${300 + MOVES}.0 px`);
    await expect.poll(() => places.count()).toBe(2);
    await page.keyboard.press('Escape');
    await page.keyboard.press('v');
  });
});

describe('tracing by hand', () => {
  it('keeps an unfinished line through a reload and goes on with it', async () => {
    await hand.sheet.focus();
    await page.keyboard.press('e');
    await hand.click([300, 300]);
    await hand.click([320, 400]);
    await expect
      .poll(savedLines)
      .toMatchObject([{ line: 'equipotential', finished: false, points: [{}, {}] }]);
    await page.reload();
    hand = await takeDesk(page);
    await hand.sheet.focus();
    await page.keyboard.press('e');
    await hand.click([320, 400]);
    await hand.click([350, 500]);
    await page.keyboard.press('Enter');
    await expect.poll(savedLines).toMatchObject([{ finished: true, points: [{}, {}, {}] }]);
    const [line] = await savedLines();
    expect(line?.points.map(([x, y]) => [Math.round(x / 5) * 5, Math.round(y / 5) * 5])).toEqual([
      [300, 300],
      [320, 400],
      [350, 500],
    ]);
  });

  it('moves a vertex by dragging it, and takes that back', async () => {
    await page.keyboard.press('Escape');
    await hand.click([310, 350]);
    const [before] = await savedLines();
    await hand.moveTo([320, 400]);
    await page.mouse.down();
    await hand.moveTo([380, 410]);
    await page.mouse.up();
    const distance = async () => Math.abs(((await savedLines())[0]?.points[1]?.[0] ?? 0) - 380);
    await expect.poll(distance).toBeLessThan(3);
    await page.keyboard.press('Control+z');
    await expect.poll(async () => (await savedLines())[0]?.points).toEqual(before?.points);
  });

  it('places a known point to a tenth of a pixel in the magnified view', async () => {
    await hand.sheet.focus();
    await page.keyboard.press('k');
    await hand.click([700, 250]);
    const known = async () => entitiesOf((await saved()).document, 'knownPoint')[0]?.value.at;
    // It is set once it is known whether drawn lines cross there.
    await expect.poll(known).toBeDefined();
    const before = await known();
    const magnifier = page.getByRole('group', { name: /Magnified eight times/ });
    await magnifier.focus();
    for (let i = 0; i < 3; i += 1) await page.keyboard.press('ArrowRight');
    const tenth = (value: number | undefined) => Math.round((value ?? 0) * 10) / 10;
    await expect.poll(async () => (await known())?.[0]).toBeCloseTo(tenth(before?.[0]) + 0.3, 1);
  });
});

describe('by finger', () => {
  it('pans with one finger, pinches with two and places with a tap', async () => {
    const phone = await world.browser.newPage({
      hasTouch: true,
      storageState: await page.context().storageState(),
    });
    await page.goto('/');
    await phone.goto(`/nets/${netId}`);
    const touched = await takeDesk(phone);
    const box = await touched.sheet.boundingBox();
    const [x, y] = [box!.x + box!.width / 2, box!.y + box!.height / 2];
    const session = await phone.context().newCDPSession(phone);
    const touch = (type: 'touchStart' | 'touchMove' | 'touchEnd', ...points: Array<[number, number]>) =>
      session.send('Input.dispatchTouchEvent', {
        type,
        touchPoints: points.map(([px, py], id) => ({ x: px, y: py, id })),
      });
    const zoom = async () => Number.parseFloat((await phone.getByText(/^\d+(\.\d)? %$/).textContent()) ?? '');
    const before = await zoom();
    await touch('touchStart', [x - 50, y], [x + 50, y]);
    await touch('touchMove', [x - 75, y], [x + 75, y]);
    await touch('touchMove', [x - 100, y], [x + 100, y]);
    await touch('touchEnd');
    await expect.poll(zoom).toBeCloseTo(before * 2, -1);
    // A tap right after a pinch may be swallowed as a part of it; until the tool is in hand, the next one would choose.
    const tool = phone.getByRole('button', { name: 'Reading point', exact: true });
    const inHand = async () => (await tool.getAttribute('aria-pressed')) === 'true';
    const takenUp = async () => {
      if (!(await inHand())) await tool.tap();
      return inHand();
    };
    await expect.poll(takenUp, { timeout: 15_000, interval: 1000 }).toBe(true);
    await touch('touchStart', [x, y]);
    await touch('touchMove', [x + 60, y + 10]);
    await touch('touchEnd');
    await touch('touchStart', [x + 20, y + 40]);
    await touch('touchEnd');
    const points = async () => {
      const response = await phone.request.get(`/api/v1/nets/${netId}`);
      return entitiesOf(((await response.json()) as NetDetailDto).document, 'readingPoint').length;
    };
    await expect.poll(points, { timeout: 10_000 }).toBe(1);
    await phone.context().close();
  });
});
