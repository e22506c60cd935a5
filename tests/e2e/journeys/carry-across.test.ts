import type { Page } from 'playwright-core';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { entitiesOf, type SheetPoint } from '#shared/contract/document.ts';
import { netDetailDto } from '#shared/contract/nets.ts';
import { axeFaults } from '#tests/support/axe.ts';
import { takeDesk } from '#tests/support/journey/desk-hand.ts';
import { allSaved } from '#tests/support/journey/desk-steps.ts';
import { addDrawings, openNewNet } from '#tests/support/journey/drawing-steps.ts';
import { type JourneyWorld, openWorld, realInput } from '#tests/support/journey/journey-world.ts';

const TURN = 2;
const SCALE = 1.25;
const PLACES: SheetPoint[] = [
  // Clear of the readout over the sheet's corner.
  [230, 480],
  [1200, 260],
  [700, 1150],
];
const LINE: SheetPoint[] = [
  [300, 400],
  [640, 700],
  [1000, 820],
];

let world: JourneyWorld;
let page: Page;
let onNewScan: (at: SheetPoint) => SheetPoint;

beforeAll(async () => {
  world = await openWorld();
  page = await world.pageOf(world.engineer);
});
afterAll(() => world.close());

/** A survey sheet of 1910; where it is absent a white sheet of its size. */
async function oldScan(): Promise<Buffer> {
  const real = realInput('drawings', 'eastriver-fig1.png');
  if (real !== null) return real;
  return sharp({ create: { width: 1426, height: 1382, channels: 3, background: '#f4f0e4' } })
    .png()
    .toBuffer();
}

/** The same sheet scanned anew: at a higher resolution, and askew. */
async function newScan(old: Buffer): Promise<Buffer> {
  const { width, height } = await sharp(old).metadata();
  const [wide, high] = [Math.round(width * SCALE), Math.round(height * SCALE)];
  const { data, info } = await sharp(old)
    .resize(wide, high, { fit: 'fill' })
    .rotate(TURN, { background: '#fff' })
    .png()
    .toBuffer({ resolveWithObject: true });
  const [c, s] = [Math.cos((TURN * Math.PI) / 180), Math.sin((TURN * Math.PI) / 180)];
  onNewScan = ([x, y]) => {
    const [u, v] = [(x * wide) / width - wide / 2, (y * high) / height - high / 2];
    return [info.width / 2 + c * u - s * v, info.height / 2 + s * u + c * v];
  };
  return data;
}

describe('a new scan of a drawing', () => {
  it('takes the section with its net over by places marked on both sheets', async () => {
    const old = await oldScan();
    await page.goto(`/dams/${world.damId}`);
    await addDrawings(page, [
      { name: 'old.png', mimeType: 'image/png', buffer: old },
      { name: 'new.png', mimeType: 'image/png', buffer: await newScan(old) },
    ]);
    await openNewNet(page, 'old.png', { name: 'C–C', chainage: '12' });
    const hand = await takeDesk(page);
    await hand.sheet.focus();
    await page.keyboard.press('e');
    await hand.trace(LINE);
    await allSaved(page);
    await page.locator('a[href^="/drawings/"]').first().click();

    await page.getByRole('link', { name: /^Carry .* to another sheet/ }).click();
    await page.getByLabel('Drawing to carry to').selectOption({ label: 'new.png, Sheet 1' });
    await page.getByText('Mark 2 more places on both sheets.').waitFor();
    for (const [sheet, at] of [
      ['From: old.png', (place: SheetPoint) => place],
      ['To: new.png', onNewScan],
    ] as const) {
      const side = await takeDesk(page, page.getByRole('application', { name: sheet }));
      await page.keyboard.down('Control');
      for (const place of PLACES) await side.click(at(place));
      await page.keyboard.up('Control');
    }
    await page.getByText(/is off the most, by \d+\.\d px/).waitFor();
    expect(await axeFaults(page, 'carry across, places marked')).toEqual([]);
    await page.getByRole('button', { name: 'Carry across' }).click();
    await page.getByText('C–C is on the new sheet.').waitFor();

    await page.locator('a[href^="/nets/"]').first().click();
    await page.getByRole('application').waitFor();
    const netId = /nets\/([0-9a-f-]+)/.exec(page.url())![1]!;
    const { document } = netDetailDto.parse(await (await page.request.get(`/api/v1/nets/${netId}`)).json());
    const line = entitiesOf(document, 'line')[0]!.value;
    const off = line.points.map((point, i) => {
      const [x, y] = onNewScan(LINE[i]!);
      return Math.hypot(point[0] - x, point[1] - y);
    });
    // A pixel of the screen is some three of the sheet here: the places were clicked that well.
    expect(Math.max(...off)).toBeLessThan(8);
  });
});
