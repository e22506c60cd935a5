import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { entitiesOf } from '#shared/contract/document.ts';
import type { NetDetailDto } from '#shared/contract/nets.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { type DeskHand, takeDesk } from '#tests/support/journey/desk-hand.ts';
import { allSaved } from '#tests/support/journey/desk-steps.ts';
import { type JourneyWorld, openWorld } from '#tests/support/journey/journey-world.ts';
import { openNetFromFile } from '#tests/support/journey/net-from-file.ts';

/** The basic parabola on a small empty sheet, made here: its base is level, and a right angle to it upright. */
const { net } = EXACT_NETS[0]!;
const BASE = 98;
const SHEET = { widthPx: 1800, heightPx: 1200, dpi: 100 };

let world: JourneyWorld;
let page: Page;
let hand: DeskHand;

beforeAll(async () => {
  world = await openWorld();
  page = await world.pageOf(world.engineer);
  // The empty sheet has to be rendered first, which waits its turn on a busy machine.
  page.setDefaultTimeout(60_000);
  const drawn = exactNetDocument(net, { pxPerUnit: 40, turnDeg: 0, centre: [900, 600] });
  const setOut = entitiesOf(drawn, 'setOut')[0]!;
  // Without a side of its own the readout gives offsets with their sign, by which the hand finds its way.
  const value = { ...setOut.value, upstream: null };
  const entities = { ...drawn.entities, [setOut.id]: { id: setOut.id, version: 1, value } };
  const document = { ...drawn, sheet: SHEET, entities };
  await openNetFromFile(world, page, document, { section: 'A–A', loadCase: 'Full supply' });
  hand = await takeDesk(page);
});
afterAll(() => world.close());

async function savedLines() {
  await allSaved(page);
  const response = await page.request.get(`/api/v1/nets/${new URL(page.url()).pathname.split('/').at(-1)}`);
  const { document } = (await response.json()) as NetDetailDto;
  return entitiesOf(document, 'line').map(({ value }) => value);
}

const help = () => page.locator('[data-live-help]');

describe('a line drawn with the help of the sheet', () => {
  it('meets the base at a right angle, which is told beside the pointer with head and cell', async () => {
    const before = (await savedLines()).length;
    const top = net.placeAt(4.5, 0.3);
    await hand.sheet.focus();
    await page.keyboard.press('e');
    await page.keyboard.down('Control');
    await hand.click(top);
    await page.keyboard.up('Control');
    await hand.moveTo([top[0] + 0.08, BASE + 3]);
    await hand.moveTo([top[0] + 0.05, BASE + 0.05]);
    await expect.poll(() => help().textContent()).toContain('Right angle');
    await expect.poll(() => help().textContent()).toContain('90° at impervious boundary, a right angle');
    await expect.poll(() => help().textContent()).toMatch(/Cell B\/L [0-9.]+/);
    await expect.poll(() => help().textContent()).toMatch(/Head 1\d\d\.\d\d m/);
    // What a screen reader is told is asked for by a key.
    await page.keyboard.press('q');
    await page
      .getByRole('status')
      .filter({ hasText: /Elevation .* Head / })
      .waitFor({ state: 'attached' });
    await hand.click([top[0] + 0.05, BASE + 0.05]);
    await page.keyboard.press('Enter');
    await expect.poll(async () => (await savedLines()).length).toBe(before + 1);
    const drawn = (await savedLines()).at(-1)!;
    const [[fromX], [toX]] = [drawn.points[0]!, drawn.points.at(-1)!];
    expect(Math.abs(toX - fromX)).toBeLessThan(0.05);
    await page.keyboard.press('Control+z');
    await page.keyboard.press('Escape');
    await page.keyboard.press('Escape');
  });
});

describe('the list of what is on the sheet', () => {
  const list = () => page.getByRole('region', { name: 'Lines', exact: true });
  const onLine = net.placeAt(5, 1.5);

  it('hides kinds, says so on the sheet, and keeps it for the next visit', async () => {
    await hand.sheet.focus();
    await page.keyboard.press('h');
    const row = list().getByRole('row', { name: /^Equipotentials 9 / });
    await row.waitFor();
    await list().getByLabel('Show equipotentials').uncheck();
    await page.getByText('Hidden: equipotentials').waitFor();
    await page.keyboard.press('Escape');
    await hand.click(onLine);
    await page.reload();
    await page.getByText('Hidden: equipotentials').waitFor();
    hand = await takeDesk(page);
    expect(await page.getByRole('region', { name: 'Equipotential' }).count()).toBe(0);
    await page.getByRole('button', { name: 'Show all' }).click();
    await hand.click(onLine);
    await page.getByRole('region', { name: 'Equipotential' }).waitFor();
  });

  it('locks kinds, which are then not chosen', async () => {
    await hand.sheet.focus();
    await page.keyboard.press('h');
    await list().getByLabel('Lock equipotentials').check();
    await page.keyboard.press('Escape');
    await page.getByRole('region', { name: 'Equipotential' }).waitFor({ state: 'detached' });
    await hand.click(onLine);
    await hand.moveTo([onLine[0] + 1, onLine[1] + 1]);
    expect(await page.getByRole('region', { name: 'Equipotential' }).count()).toBe(0);
  });
});
