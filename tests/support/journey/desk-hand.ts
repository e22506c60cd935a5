import type { Locator, Page } from 'playwright-core';

/** A place as the desk's readout gives it: pixels of the sheet until it is set out, then offset and elevation. */
type Place = readonly [number, number];

/** Works on the sheet of the desk as a hand with a mouse does. */
export interface DeskHand {
  sheet: Locator;
  /** Clicks a place on the sheet. */
  click(at: Place): Promise<void>;
  moveTo(at: Place): Promise<void>;
  /** Clicks along a line and ends it with Enter; Ctrl is held, so that nothing snaps. */
  trace(points: readonly Place[]): Promise<void>;
}

const figure = (text: string): number => Number(text.replace('−', '-'));

/** What the readout says of a place on the screen. The pointer comes from a pixel away, because it has to move. */
async function placeAt(page: Page, sheet: Locator, x: number, y: number): Promise<Place> {
  await page.mouse.move(x - 1, y);
  await page.mouse.move(x, y);
  const readout = sheet.getByRole('status').filter({ hasText: /^x |^Offset / });
  await readout.waitFor();
  // What follows the pointer is written with the next frame.
  await page.evaluate(() => new Promise((done) => requestAnimationFrame(() => requestAnimationFrame(done))));
  const figures = (await readout.textContent())?.match(/−?\d+(\.\d+)?/g) ?? [];
  const [first, second] = figures.map(figure);
  if (first === undefined || second === undefined) throw new Error(`The readout says "${figures}".`);
  return [first, second];
}

/**
 * Takes the desk in hand: from two readouts it knows where the sheet lies on the screen. The view must stay as it is
 * from then on, and a section that is set out must not lie askew.
 */
export async function takeDesk(
  page: Page,
  // The magnifier is an application too, while it is shown.
  sheet: Locator = page.getByRole('application', { name: / on drawing / }),
): Promise<DeskHand> {
  await sheet.waitFor();
  const box = await sheet.boundingBox();
  if (!box) throw new Error('The sheet is not shown.');
  const [ax, ay] = [Math.round(box.x + box.width * 0.15), Math.round(box.y + box.height * 0.2)];
  const [bx, by] = [Math.round(box.x + box.width * 0.85), Math.round(box.y + box.height * 0.8)];
  const a = await placeAt(page, sheet, ax, ay);
  const b = await placeAt(page, sheet, bx, by);
  const onScreen = ([x, y]: Place): [number, number] => [
    ax + ((bx - ax) * (x - a[0])) / (b[0] - a[0]),
    ay + ((by - ay) * (y - a[1])) / (b[1] - a[1]),
  ];
  const click = async (at: Place) => page.mouse.click(...onScreen(at));
  return {
    sheet,
    click,
    moveTo: async (at) => page.mouse.move(...onScreen(at)),
    async trace(points) {
      await page.keyboard.down('Control');
      for (const point of points) await click(point);
      await page.keyboard.up('Control');
      await page.keyboard.press('Enter');
    },
  };
}
