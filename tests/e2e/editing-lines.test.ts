import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { entitiesOf, type SheetPoint } from '#shared/contract/document.ts';
import type { NetDetailDto } from '#shared/contract/nets.ts';
import { apronScan } from '#tests/support/journey/apron-sheet.ts';
import { type DeskHand, takeDesk } from '#tests/support/journey/desk-hand.ts';
import { allSaved, traceBoundary } from '#tests/support/journey/desk-steps.ts';
import { addDrawings, openNewNet } from '#tests/support/journey/drawing-steps.ts';
import { type JourneyWorld, openWorld } from '#tests/support/journey/journey-world.ts';

let world: JourneyWorld;
let page: Page;
let hand: DeskHand;
let netId: string;

/** A plumb equipotential, and two level boundaries that it shall reach and no more. */
const PLUMB: SheetPoint[] = [
  [400, 300],
  [400, 420],
  [400, 640],
];
const FLOOR: SheetPoint[] = [
  [200, 560],
  [760, 560],
];
const ROOF: SheetPoint[] = [
  [200, 200],
  [760, 200],
];

beforeAll(async () => {
  world = await openWorld();
  page = await world.pageOf(world.engineer);
  await page.goto(`/dams/${world.damId}`);
  await addDrawings(page, [{ name: 'edit.png', mimeType: 'image/png', buffer: await apronScan() }]);
  await openNewNet(page, 'edit.png', { name: 'C–C', chainage: '20' });
  netId = new URL(page.url()).pathname.split('/').at(-1) ?? '';
  hand = await takeDesk(page);
  await traceBoundary(page, hand, 'Impervious', FLOOR);
  await traceBoundary(page, hand, 'Ground', ROOF);
  await hand.sheet.focus();
  await page.keyboard.press('e');
  await hand.trace(PLUMB);
  await page.keyboard.press('Escape');
});
afterAll(() => world.close());

async function savedLines() {
  await allSaved(page);
  const response = await page.request.get(`/api/v1/nets/${netId}`);
  const { document } = (await response.json()) as NetDetailDto;
  return entitiesOf(document, 'line').map(({ value }) => value);
}

/** Both ends of each saved equipotential, to the five pixels that a click on screen can be told. */
async function plumbEnds(): Promise<number[][]> {
  const near = (value: number) => Math.round(value / 5) * 5;
  const lines = (await savedLines()).filter(({ line }) => line === 'equipotential');
  const ends = lines.map(({ points }) =>
    [near(points[0]![1]), near(points.at(-1)![1])].sort((a, b) => a - b),
  );
  return ends.sort((a, b) => a[0]! - b[0]!);
}

async function choosePlumb(): Promise<void> {
  await page.keyboard.press('v');
  await hand.click([400, 480]);
  await page.getByRole('region', { name: 'Equipotential', exact: true }).waitFor();
}

const prompt = (words: RegExp) => hand.sheet.locator('p').filter({ hasText: words });

describe('the chosen line', () => {
  it('is trimmed at one boundary and extended to another', async () => {
    await choosePlumb();
    await page.keyboard.press('t');
    await prompt(/line to trim at/).waitFor();
    await hand.click([600, 560]);
    await expect.poll(plumbEnds).toEqual([[300, 560]]);
    await page.getByRole('button', { name: 'Extend', exact: true }).click();
    await prompt(/line to extend to/).waitFor();
    await page.keyboard.press('Escape');
    await expect.poll(() => prompt(/line to extend to/).count()).toBe(0);
    await page.keyboard.press('x');
    await hand.click([600, 200]);
    await expect.poll(plumbEnds).toEqual([[200, 560]]);
  });

  it('is split where it is clicked and joined again', async () => {
    await page.keyboard.press('s');
    await hand.click([400, 350]);
    await expect.poll(plumbEnds).toEqual([
      [200, 350],
      [350, 560],
    ]);
    await page.keyboard.press('j');
    await hand.click([400, 280]);
    await expect.poll(plumbEnds).toEqual([[200, 560]]);
  });

  it('has its points typed, with a decimal comma, in the row of the point chosen on the sheet', async () => {
    await choosePlumb();
    await hand.click([400, 420]);
    const form = page.getByRole('region', { name: 'Equipotential', exact: true });
    const row = form.locator('tr[aria-current]');
    const field = row.getByLabel(/^x, px, point/);
    await field.fill('412,25');
    await field.press('Enter');
    await expect
      .poll(async () => (await savedLines()).flatMap(({ points }) => points.map(([x]) => x)))
      .toContain(412.25);
    await page.getByRole('button', { name: /^Remove point/ }).click();
    await expect
      .poll(async () => (await savedLines()).flatMap(({ points }) => points.map(([x]) => x)))
      .not.toContain(412.25);
  });
});

describe('several at once', () => {
  it('are chosen, moved by the arrow keys and removed, each as one step; all of it can be taken back', async () => {
    await hand.sheet.focus();
    await page.keyboard.press('Control+a');
    const form = page.getByRole('region', { name: '3 lines chosen' });
    await form.waitFor();
    const before = await savedLines();
    for (let i = 0; i < 3; i += 1) await page.keyboard.press('Shift+ArrowRight');
    const xs = (lines: typeof before) => lines.map(({ points }) => points[0]![0]);
    const moved = xs(before).map((x) => expect.closeTo(x + 30, 1));
    await expect.poll(async () => xs(await savedLines())).toEqual(moved);
    await page.keyboard.press('Delete');
    await expect.poll(async () => (await savedLines()).length).toBe(0);
    for (let i = 0; i < 4; i += 1) await page.keyboard.press('Control+z');
    await expect.poll(savedLines).toEqual(before);
    // Back past the typed point, the join, the split, both ends: as the lines were traced.
    for (let i = 0; i < 6; i += 1) await page.keyboard.press('Control+z');
    await expect.poll(plumbEnds).toEqual([[300, 640]]);
  });

  it('are chosen by a rectangle drawn with Shift, and one is left out by a click', async () => {
    await page.keyboard.press('v');
    await hand.click([300, 720]);
    await page.keyboard.down('Shift');
    await hand.moveTo([180, 180]);
    await page.mouse.down();
    await hand.moveTo([780, 600]);
    await page.mouse.up();
    await page.keyboard.up('Shift');
    await page.getByRole('region', { name: '2 lines chosen' }).waitFor();
    await page.keyboard.down('Shift');
    await hand.click([700, 560]);
    await page.keyboard.up('Shift');
    await page.getByRole('region', { name: 'Ground', exact: true }).waitFor();
  });
});
