import type { Locator, Page } from 'playwright-core';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { pngDrawing } from '#tests/support/drawing-files.ts';
import { allSaved, cell, placeKnownPoints } from '#tests/support/journey/desk-steps.ts';
import { addDrawings, openNewNet } from '#tests/support/journey/drawing-steps.ts';
import { type JourneyWorld, openWorld, realInput } from '#tests/support/journey/journey-world.ts';

const TURN_DEG = 2;
type Place = readonly [number, number];
let world: JourneyWorld;
let scan: { bytes: Buffer; ends: readonly [Place, Place] };

beforeAll(async () => {
  scan = await skewed(realInput('drawings', 'eastriver-fig1.png') ?? (await bordered()));
  world = await openWorld();
});
afterAll(() => world?.close());

/** A drawing of the test's own, with a border along its foot. */
async function bordered(): Promise<Buffer> {
  const size = { width: 1400, height: 1300 };
  const line = { create: { width: 1340, height: 3, channels: 3, background: '#101010' } } as const;
  const border = await sharp(line).png().toBuffer();
  return sharp(await pngDrawing(size))
    .composite([{ input: border, left: 30, top: 1280 }])
    .png()
    .toBuffer();
}

/** The drawing put crooked on the scanner's glass, and where the longest level line of it lies then. */
async function skewed(plate: Buffer) {
  const { row, from, to, width, height } = await longestLine(plate);
  const bytes = await sharp(plate).flatten().rotate(TURN_DEG, { background: '#ffffff' }).png().toBuffer();
  const turned = await sharp(bytes).metadata();
  const angle = (TURN_DEG * Math.PI) / 180;
  const seen = (x: number): Place => {
    const [u, v] = [x - width / 2, row - height / 2];
    return [
      turned.width / 2 + u * Math.cos(angle) - v * Math.sin(angle),
      turned.height / 2 + u * Math.sin(angle) + v * Math.cos(angle),
    ];
  };
  const inset = (to - from) * 0.08;
  return { bytes, ends: [seen(from + inset), seen(to - inset)] as const };
}

async function longestLine(plate: Buffer) {
  const { data, info } = await sharp(plate).flatten().greyscale().raw().toBuffer({ resolveWithObject: true });
  const { width, height } = info;
  let best = { length: 0, row: 0, from: 0, to: 0 };
  for (let y = 0; y < height; y += 1)
    for (let x = 0, start = 0; x <= width; x += 1) {
      if (x < width && data[y * width + x]! < 140) continue;
      if (x - start > best.length) best = { length: x - start, row: y, from: start, to: x };
      start = x + 1;
    }
  const isDark = (y: number) => data[y * width + Math.round((best.from + best.to) / 2)]! < 140;
  let [top, bottom] = [best.row, best.row];
  while (isDark(top - 1)) top -= 1;
  while (isDark(bottom + 1)) bottom += 1;
  return { ...best, row: (top + bottom + 1) / 2, width, height };
}

/** The sheet with only its tiles, or only what is traced on it. */
async function layerOf(page: Page, sheet: Locator, hidden: string) {
  const style = await page.addStyleTag({ content: `${hidden} { visibility: hidden !important }` });
  const { data, info } = await sharp(await sheet.screenshot())
    .removeAlpha()
    .raw()
    .toBuffer({ resolveWithObject: true });
  await style.evaluate((element) => (element as HTMLElement).remove());
  return { data, width: info.width, height: info.height };
}

/** For each column that the traced line crosses: how far, in pixels of the screen, its middle lies from ink. */
async function distancesFromInk(page: Page, sheet: Locator): Promise<number[]> {
  const rest = '[role=application] > :not(:first-child)';
  const ink = await layerOf(page, sheet, `${rest}, canvas`);
  const trace = await layerOf(page, sheet, `${rest}, [role=application] img`);
  const distances: number[] = [];
  for (let x = 0; x < trace.width; x += 3) {
    const rows: number[] = [];
    for (let y = 0; y < trace.height; y += 1) {
      const [r, g, b] = trace.data.subarray((y * trace.width + x) * 3, (y * trace.width + x) * 3 + 3);
      // The tone of a flow line, #a8472b: at 2 px one row at least is all of it, however the line lies between rows.
      if (Math.abs(r! - 0xa8) < 30 && Math.abs(g! - 0x47) < 30 && Math.abs(b! - 0x2b) < 30) rows.push(y);
    }
    if (rows.length === 0) continue;
    const middle = rows.reduce((sum, y) => sum + y, 0) / rows.length;
    const isInk = (y: number) => (ink.data[(Math.round(y) * ink.width + x) * 3] ?? 255) < 150;
    let off = 0;
    while (off < 40 && !isInk(middle - off) && !isInk(middle + off)) off += 0.5;
    distances.push(off);
  }
  return distances.sort((a, b) => a - b);
}

/** Of a hundred columns or a few more that the line crosses, less its gaps and the marks at its ends. */
const LEAST_COLUMNS = 70;

/** The traced line lies on its ink once the tiles are there: within 2.5 px of the screen along nine tenths of it. */
async function liesOnInk(page: Page, sheet: Locator): Promise<void> {
  const worstOfMost = async () => {
    const distances = await distancesFromInk(page, sheet);
    return distances.length < LEAST_COLUMNS ? Infinity : distances[Math.floor(distances.length * 0.9)];
  };
  await expect.poll(worstOfMost, { timeout: 60_000 }).toBeLessThan(2.5);
}

describe('a crooked, grey scan', () => {
  it('is straightened and made black and white; the traced line stays on its ink, and the figures stay as they were', async () => {
    const page = await world.pageOf(world.engineer);
    await page.goto(`/dams/${world.damId}`);
    await addDrawings(page, [{ name: 'crooked.png', mimeType: 'image/png', buffer: scan.bytes }]);
    await openNewNet(page, 'crooked.png', { name: 'C–C', chainage: '10' });
    const [left, right] = scan.ends;
    const hand = await placeKnownPoints(page, [
      { at: [...left], offset: '0', elevation: '100' },
      { at: [...right], offset: '120', elevation: '100' },
    ]);
    const scale = cell(page, 'Scale').filter({ hasText: 'm/px' });
    const figures = await scale.textContent();
    const net = page.url();
    await hand.sheet.focus();
    await page.keyboard.press('f');
    await page.mouse.move(5, 5);
    await hand.trace([left, right]);
    await page.keyboard.press('Escape');
    await allSaved(page);
    await liesOnInk(page, hand.sheet);

    await page.goBack();
    await page.getByRole('button', { name: 'Clean up' }).click();
    const picture = page.getByRole('img', { name: 'Sheet 1 as it would become' });
    await picture.waitFor();
    await page.getByRole('button', { name: 'Straighten by a level line' }).click();
    for (const [name, end] of [
      ['First end', left],
      ['Second end', right],
    ] as const)
      await dragHandle(page, picture, name, end);
    await page.getByRole('button', { name: 'Make the line level' }).click();
    const turn = await page.getByLabel('Clockwise turn').inputValue();
    expect(Number(turn.replace('−', '-'))).toBeCloseTo(-TURN_DEG, 0);
    await page.getByLabel('Black and white only').check();
    await page.getByRole('button', { name: 'Use this picture' }).click();
    const row = page.getByRole('listitem').filter({ hasText: 'black and white' });
    await row.getByText('shown', { exact: true }).waitFor({ timeout: 60_000 });

    await page.goto(net);
    await page.getByRole('button', { name: 'Cleaned up' }).waitFor();
    const sheet = page.getByRole('application', { name: / on drawing / });
    await liesOnInk(page, sheet);
    expect(await scale.textContent()).toBe(figures);

    await page.getByRole('button', { name: 'Scan', exact: true }).click();
    await liesOnInk(page, sheet);
    await page.context().close();
  }, 400_000);
});

async function dragHandle(page: Page, picture: Locator, name: string, [x, y]: Place): Promise<void> {
  const size = await sharp(scan.bytes).metadata();
  const box = await picture.boundingBox();
  const handle = await page.getByRole('button', { name: new RegExp(`^${name} of the line`) }).boundingBox();
  if (!box || !handle) throw new Error('The handle is not shown.');
  await page.mouse.move(handle.x + handle.width / 2, handle.y + handle.height / 2);
  await page.mouse.down();
  await page.mouse.move(box.x + (x / size.width) * box.width, box.y + (y / size.height) * box.height, {
    steps: 4,
  });
  await page.mouse.up();
}
