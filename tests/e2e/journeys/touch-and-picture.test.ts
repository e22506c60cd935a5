import { readFile } from 'node:fs/promises';
import type { CDPSession, Page } from 'playwright-core';
import sharp, { type OutputInfo } from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { entitiesOf } from '#shared/contract/document.ts';
import type { NetDetailDto } from '#shared/contract/nets.ts';
import { PHONE } from '#tests/support/browser.ts';
import { allSaved } from '#tests/support/journey/desk-steps.ts';
import { type JourneyWorld, openWorld, signIn } from '#tests/support/journey/journey-world.ts';
import { openNetFromFile } from '#tests/support/journey/net-from-file.ts';
import { finishedDocument } from '#tests/support/net-fixture.ts';

type At = readonly [x: number, y: number];

/** The desk opens three times here, which a machine that is shared takes its time for. */
const PATIENCE_MS = 45_000;

let world: JourneyWorld;
let page: Page;
let netId: string;
beforeAll(async () => {
  world = await openWorld();
  page = await world.pageOf(world.engineer);
  page.setDefaultTimeout(PATIENCE_MS);
  await openNetFromFile(world, page, finishedDocument(3), { section: 'A–A', loadCase: 'Full supply' });
  netId = new URL(page.url()).pathname.split('/').at(-1) ?? '';
});
afterAll(() => world.close());

const sheetOf = (on: Page) => on.getByRole('application', { name: / on drawing / });

async function placeOn(on: Page, x: number, y: number): Promise<At> {
  const box = (await sheetOf(on).boundingBox())!;
  return [box.x + x * box.width, box.y + y * box.height];
}

const touch = (session: CDPSession, type: 'touchStart' | 'touchMove' | 'touchEnd', ...points: At[]) =>
  session.send('Input.dispatchTouchEvent', {
    type,
    touchPoints: points.map(([x, y], id) => ({ x, y, id })),
  });

describe('on a phone', () => {
  it('the schedule is read without sideways scrolling, and a note is written at a place by a held finger', async () => {
    const phone = await world.browser.newPage({ viewport: PHONE, hasTouch: true, isMobile: true });
    phone.setDefaultTimeout(PATIENCE_MS);
    await signIn(phone, world.colleague);
    await phone.goto(`/nets/${netId}`);
    await sheetOf(phone).waitFor();
    await phone.getByRole('button', { name: 'Schedule', exact: true }).tap();
    const rows = phone.getByRole('row').filter({ hasText: /\d ± .*kPa/ });
    await expect.poll(() => rows.count(), { timeout: 30_000 }).toBeGreaterThan(0);
    for (const row of await rows.all()) {
      const pressure = (await row
        .getByText(/\d ± .*kPa/)
        .first()
        .boundingBox())!;
      expect(pressure.x).toBeGreaterThanOrEqual(0);
      expect(pressure.x + pressure.width).toBeLessThanOrEqual(PHONE.width);
    }
    await phone.getByRole('button', { name: 'Sheet', exact: true }).tap();
    await phone.getByRole('button', { name: 'Note', exact: true }).tap();
    const at = await placeOn(phone, 0.5, 0.6);
    const session = await phone.context().newCDPSession(phone);
    await touch(session, 'touchStart', at);
    const magnified = phone.getByRole('group', { name: /^Magnified/ });
    await magnified.waitFor();
    const lens = (await magnified.boundingBox())!;
    expect(lens.y + lens.height).toBeLessThan(at[1] - 20);
    await touch(session, 'touchMove', [at[0] + 3, at[1]]);
    await touch(session, 'touchEnd');
    await phone
      .getByText(/^Write a note/)
      .first()
      .waitFor();
    await phone.getByRole('textbox', { name: /^Write a note/ }).fill('The blanket ends here.');
    await phone.getByRole('button', { name: 'Write note' }).tap();
    await phone.getByText('The blanket ends here.').waitFor();
    await phone.context().close();
  });
});

describe('with a pen', () => {
  it('a line is drawn while the palm rests on the sheet', async () => {
    const glass = await world.browser.newPage({
      hasTouch: true,
      storageState: await page.context().storageState(),
    });
    glass.setDefaultTimeout(PATIENCE_MS);
    // The page that was opened first is the one that writes.
    await page.goto('/');
    await glass.goto(`/nets/${netId}`);
    await sheetOf(glass).waitFor();
    await glass.getByRole('button', { name: 'Flow line', exact: true }).click();
    const session = await glass.context().newCDPSession(glass);
    const pen = (type: 'mouseMoved' | 'mousePressed' | 'mouseReleased', [x, y]: At) =>
      session.send('Input.dispatchMouseEvent', {
        type,
        x,
        y,
        pointerType: 'pen',
        button: type === 'mouseMoved' ? 'none' : 'left',
        buttons: type === 'mousePressed' ? 1 : 0,
        clickCount: type === 'mouseMoved' ? 0 : 1,
      });
    const shown = await glass.getByText(/^\d+(\.\d)? %$/).textContent();
    const palm = await placeOn(glass, 0.7, 0.85);
    await pen('mouseMoved', await placeOn(glass, 0.3, 0.2));
    await touch(session, 'touchStart', palm);
    for (const x of [0.3, 0.4, 0.5]) {
      const at = await placeOn(glass, x, 0.2);
      await pen('mouseMoved', at);
      await pen('mousePressed', at);
      await pen('mouseReleased', at);
    }
    await touch(session, 'touchMove', [palm[0] + 40, palm[1] - 30]);
    await touch(session, 'touchEnd');
    await glass.keyboard.press('Enter');
    await allSaved(glass);
    const response = await glass.request.get(`/api/v1/nets/${netId}`);
    const { document } = (await response.json()) as NetDetailDto;
    const drawn = entitiesOf(document, 'line').filter(({ value }) => value.line === 'flowLine');
    expect(drawn.at(-1)?.value).toMatchObject({ finished: true });
    expect(drawn.at(-1)?.value.points).toHaveLength(3);
    expect(await glass.getByText(/^\d+(\.\d)? %$/).textContent()).toBe(shown);
    await glass.context().close();
  });
});

/** Longest run of ink that begins at a column, over all rows of a picture. */
function longestRunFrom(column: number, { data, info }: { data: Buffer; info: OutputInfo }): Set<number> {
  const runs = new Set<number>();
  const isInk = (x: number, y: number) => {
    const i = (y * info.width + x) * info.channels;
    return data[i]! + data[i + 1]! + data[i + 2]! < 330;
  };
  for (let y = 0; y < info.height; y += 1) {
    if (isInk(column - 3, y) || !isInk(column + 2, y)) continue;
    let x = column + 2;
    while (x < info.width && isInk(x, y)) x += 1;
    runs.add(x - column);
  }
  return runs;
}

/** How many pixels have about a colour. */
function countOf(colour: number, { data, info }: { data: Buffer; info: OutputInfo }): number {
  const [r, g, b] = [colour >> 16, (colour >> 8) & 255, colour & 255];
  let count = 0;
  for (let i = 0; i < data.length; i += info.channels) {
    if (Math.abs(data[i]! - r) + Math.abs(data[i + 1]! - g) + Math.abs(data[i + 2]! - b) < 40) count += 1;
  }
  return count;
}

describe('a picture of the section', () => {
  it('is saved at its resolution and scale, and is printed at its size in millimetres', async () => {
    await page.goto(`/nets/${netId}`);
    await sheetOf(page).waitFor();
    await page.getByRole('button', { name: 'Print or save' }).click();
    const dialog = page.getByRole('dialog');
    const scale = dialog.getByLabel('Scale', { exact: true });
    await expect.poll(() => scale.locator('option').count()).toBeGreaterThan(1);
    await scale.selectOption({ index: 1 });
    const n = Number((await scale.locator('option').nth(1).textContent())?.replace('1:', ''));
    await dialog.getByText(/^1754 × \d+ px, 150 dots per inch$/).waitFor();
    const [download] = await Promise.all([
      page.waitForEvent('download', { timeout: 60_000 }),
      dialog.getByRole('button', { name: 'Save as PNG' }).click(),
    ]);
    expect(download.suggestedFilename()).toMatch(/A–A Full supply\.png$/);
    const png = await readFile(await download.path());
    expect(await sharp(png).metadata()).toMatchObject({ format: 'png', width: 1754, density: 150 });
    const raw = await sharp(png).raw().toBuffer({ resolveWithObject: true });
    for (const colour of [0x0f6b66, 0xa8472b, 0x2b5ea8, 0x6d2a78])
      expect(countOf(colour, raw), colour.toString(16)).toBeGreaterThan(30);
    // The bar begins at the margin of 8 mm; its length is the longest round one of no more than 56 mm at this scale.
    const mostMetres = (56 * n) / 1000;
    const power = 10 ** Math.floor(Math.log10(mostMetres));
    const metres = [5, 2, 1].map((step) => step * power).find((each) => each <= mostMetres)!;
    const barPx = (((metres * 1000) / n) * 150) / 25.4;
    const runs = [...longestRunFrom(Math.round((8 * 150) / 25.4), raw)];
    expect(runs.some((run) => Math.abs(run - barPx) <= 2)).toBe(true);

    await page.evaluate(() => {
      window.print = () => document.body.setAttribute('data-printing', '');
    });
    await dialog.getByRole('button', { name: 'Print', exact: true }).click();
    await page.locator('body[data-printing]').waitFor({ timeout: 60_000 });
    const pdf = (await page.pdf({ preferCSSPageSize: true, printBackground: true })).toString('latin1');
    const [, width, height] = /\/MediaBox \[0 0 ([\d.]+) ([\d.]+)\]/.exec(pdf) ?? [];
    expect(Number(width) / 72).toBeCloseTo(297 / 25.4, 1);
    expect(Number(height) / 72).toBeCloseTo(210 / 25.4, 1);
    expect(pdf.match(/\/Type \/Page\b/g)).toHaveLength(1);
  });
});
