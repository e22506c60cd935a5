import type { Page } from 'playwright-core';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { distanceToSegment } from '#shared/compute/geometry/thin.ts';
import { entitiesOf, type SheetPoint, type TracedLine } from '#shared/contract/document.ts';
import { netDetailDto } from '#shared/contract/nets.ts';
import { type DeskHand, takeDesk } from '#tests/support/journey/desk-hand.ts';
import { allSaved } from '#tests/support/journey/desk-steps.ts';
import { addDrawings, openNewNet } from '#tests/support/journey/drawing-steps.ts';
import { type JourneyWorld, openWorld, realInput } from '#tests/support/journey/journey-world.ts';

/** Three places on the third of the rings, clockwise from its top. */
const ON_RING: SheetPoint[] = [
  [563, 222],
  [991, 587],
  [575, 1037],
];

let world: JourneyWorld;
let page: Page;
let hand: DeskHand;
let scan: { dark: Uint8Array; width: number };

/** Rings drawn by hand, closed contours in black on white; where the file is absent one circle through the same places. */
async function rings(): Promise<Buffer> {
  const real = realInput('drawings', 'topotest.png');
  if (real !== null) return real;
  const circle = '<circle cx="562" cy="630" r="408" fill="none" stroke="#111" stroke-width="3"/>';
  const svg = `<svg xmlns="http://www.w3.org/2000/svg" width="1224" height="1290"><rect width="100%" height="100%" fill="#fff"/>${circle}</svg>`;
  return sharp(Buffer.from(svg)).png().toBuffer();
}

beforeAll(async () => {
  world = await openWorld();
});
afterAll(() => world.close());

/** The lines of the net as the server has them. */
async function savedLines(): Promise<TracedLine[]> {
  await allSaved(page);
  const netId = /nets\/([0-9a-f-]+)/.exec(page.url())![1]!;
  const answer = await page.request.get(`/api/v1/nets/${netId}`);
  const { document } = netDetailDto.parse(await answer.json());
  return entitiesOf(document, 'line').map(({ value }) => value);
}

const way = (name: string) => page.getByRole('button', { name, exact: true, pressed: true });

/** Distance of a place from the nearest dark pixel of the scan, no farther looked than 8 px. */
function offInk([x, y]: readonly [number, number]): number {
  let least = 8;
  for (let v = Math.floor(y) - 8; v <= y + 8; v += 1) {
    for (let u = Math.floor(x) - 8; u <= x + 8; u += 1) {
      if (scan.dark[v * scan.width + u] === 1) least = Math.min(least, Math.hypot(u + 0.5 - x, v + 0.5 - y));
    }
  }
  return least;
}

/** Places along a line, two pixels apart. */
function along(points: readonly SheetPoint[]): Array<readonly [number, number]> {
  return points.slice(1).flatMap(([bx, by], i) => {
    const [ax, ay] = points[i]!;
    const steps = Math.max(1, Math.round(Math.hypot(bx - ax, by - ay) / 2));
    return Array.from({ length: steps }, (_, k) => {
      const t = k / steps;
      return [ax + t * (bx - ax), ay + t * (by - ay)] as const;
    });
  });
}

describe('drawing on a real scan', () => {
  it('its sheet is uploaded and opened on the desk', async () => {
    page = await world.pageOf(world.engineer);
    const buffer = await rings();
    const { data, info } = await sharp(buffer)
      .greyscale()
      .toColourspace('b-w')
      .raw()
      .toBuffer({ resolveWithObject: true });
    scan = {
      width: info.width,
      dark: Uint8Array.from({ length: info.width * info.height }, (_, i) =>
        data[i * info.channels]! < 128 ? 1 : 0,
      ),
    };
    await page.goto(`/dams/${world.damId}`);
    await addDrawings(page, [{ name: 'topotest.png', mimeType: 'image/png', buffer }]);
    await openNewNet(page, 'topotest.png', { name: 'C–C', chainage: '12' });
    hand = await takeDesk(page);
  });

  it('a contour is followed along its ink in three clicks, and the line lies on dark pixels', async () => {
    await hand.sheet.focus();
    await page.keyboard.press('f');
    for (const name of ['Curve', 'Freehand', 'Follow ink']) {
      await page.keyboard.press('d');
      await way(name).waitFor();
    }
    await page.keyboard.down('Control');
    for (const at of ON_RING) await hand.click(at);
    await page.keyboard.up('Control');
    await page.keyboard.press('Enter');
    await page.getByText(/^Tracing/).waitFor({ state: 'detached', timeout: 45_000 });
    const [line] = await savedLines();
    const places = along(line!.points);
    // Half of a ring of some 410 px radius; a straight join of the clicks would be 1,150 px long.
    expect(places.length * 2).toBeGreaterThan(1250);
    const off = places.map(offInk).sort((a, b) => a - b);
    expect(off[Math.floor(0.95 * off.length)]).toBeLessThan(1);
    expect(off.at(-1)).toBeLessThan(4);
    for (const click of ON_RING) {
      const far = line!.points.slice(1).map((end, i) => distanceToSegment(click, line!.points[i]!, end));
      expect(Math.min(...far)).toBeLessThan(8);
    }
  });

  it('a click goes back on Backspace, the way is kept over a reload, and a smooth line runs through its clicks', async () => {
    await page.reload();
    hand = await takeDesk(page);
    await hand.sheet.focus();
    await page.keyboard.press('e');
    await way('Follow ink').waitFor();
    await page.getByRole('button', { name: 'Curve', exact: true }).click();
    await hand.sheet.focus();
    const clicks: SheetPoint[] = [
      [300, 1180],
      [500, 1120],
      [700, 1120],
      [900, 1200],
    ];
    await page.keyboard.down('Control');
    for (const at of clicks) await hand.click(at);
    await page.keyboard.up('Control');
    await page.getByText('Tracing: equipotential, 4 points.').waitFor();
    await page.keyboard.press('Backspace');
    await page.getByText('Tracing: equipotential, 3 points.').waitFor();
    await page.keyboard.press('Enter');
    const line = (await savedLines()).find(({ line }) => line === 'equipotential')!;
    expect(line.points.length).toBeGreaterThan(12);
    const [end] = line.points.slice(-1);
    expect(Math.hypot(end![0] - 700, end![1] - 1120)).toBeLessThan(3);
  });

  it('a stroke is drawn with the pointer held down', async () => {
    await hand.sheet.focus();
    await page.keyboard.press('p');
    await page.getByRole('button', { name: 'Freehand', exact: true }).click();
    await hand.moveTo([150, 1230]);
    await page.mouse.down();
    for (let i = 1; i <= 30; i += 1) await hand.moveTo([150 + 30 * i, 1230 - 40 * Math.sin(i / 6)]);
    await page.mouse.up();
    await hand.sheet.focus();
    await page.keyboard.press('Enter');
    const line = (await savedLines()).find(({ line }) => line === 'phreaticLine')!;
    expect(line.finished).toBe(true);
    expect(line.points.length).toBeGreaterThan(5);
    expect(line.points.length).toBeLessThan(30);
  });
});
