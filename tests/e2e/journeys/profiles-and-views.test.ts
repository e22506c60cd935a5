import type { Locator, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { PHONE } from '#tests/support/browser.ts';
import { damDocument } from '#tests/support/exact-nets/dam-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { allSaved, cell, titleBlock } from '#tests/support/journey/desk-steps.ts';
import { type JourneyWorld, openWorld } from '#tests/support/journey/journey-world.ts';
import { openNetFromFile } from '#tests/support/journey/net-from-file.ts';
import { finishedDocument } from '#tests/support/net-fixture.ts';

const { net } = EXACT_NETS[0]!;

let world: JourneyWorld;
let page: Page;
let sheet: Locator;
beforeAll(async () => {
  world = await openWorld();
  page = await world.pageOf(world.engineer);
  await openNetFromFile(world, page, finishedDocument(1), { section: 'A–A', loadCase: 'Full supply' });
  sheet = page.getByRole('application', { name: / on drawing / });
});
afterAll(() => world.close());

const profiles = () => page.getByRole('region', { name: 'Profiles', exact: true });
const figuresIn = async (row: Locator): Promise<number[]> =>
  (await row.getByRole('cell').allTextContents()).map((text) =>
    Number(text.replace('−', '-').replace(/ ±.*/, '')),
  );

/** Clicks places of the sheet's view, in parts of its width and height, without snapping. */
async function clickAlong(parts: ReadonlyArray<readonly [number, number]>): Promise<void> {
  const box = (await sheet.boundingBox())!;
  await page.keyboard.down('Control');
  for (const [x, y] of parts) await page.mouse.click(box.x + x * box.width, box.y + y * box.height);
  await page.keyboard.up('Control');
}

describe('a net read along lines', () => {
  it('a profile is drawn by its key, shows heads of the closed form, and its use and name are taken', async () => {
    await sheet.focus();
    await page.keyboard.press('l');
    await profiles().getByText('No profiles yet.').waitFor();
    await clickAlong([
      [0.45, 0.62],
      [0.6, 0.62],
    ]);
    await page.keyboard.press('Enter');
    const rows = profiles().getByRole('row').filter({ hasText: '±' });
    await expect.poll(() => rows.count()).toBeGreaterThan(10);
    for (const row of await rows.all()) {
      const [, offset, elevation, head, pressureHead, pressure] = await figuresIn(row);
      // Kozeny 1931: a fortieth of a drop of 2 m.
      expect(Math.abs(head! - net.headAt(offset!, elevation!))).toBeLessThan(0.05);
      expect(pressureHead!).toBeCloseTo(head! - elevation!, 1);
      expect(Math.abs(pressure! - 9.81 * (head! - elevation!))).toBeLessThan(0.2);
    }
    await page.keyboard.press('Escape');
    await profiles().getByLabel('Use').selectOption({ label: 'Base of a structure' });
    await profiles().getByRole('heading', { name: 'Water pressure on the base' }).waitFor();
    await profiles().getByText('There is no tailwater').waitFor();
    const name = profiles().getByLabel('Name');
    await name.fill('Gallery floor');
    await name.press('Tab');
    const spacing = profiles().getByLabel(/^Spacing/);
    await spacing.fill('');
    await spacing.press('Tab');
    await expect.poll(() => rows.count()).toBeLessThan(5);
    await sheet.focus();
    await page.keyboard.press('Control+z');
    await expect.poll(() => rows.count()).toBeGreaterThan(10);
  });

  it('is taken away as a file for a stability program', async () => {
    const waited = page.waitForEvent('download');
    await profiles().getByRole('button', { name: 'Download CSV' }).click();
    const download = await waited;
    expect(download.suggestedFilename()).toMatch(/Gallery floor\.csv$/);
    const stream = await download.createReadStream();
    const chunks: Buffer[] = [];
    for await (const chunk of stream) chunks.push(chunk as Buffer);
    const [head, first] = Buffer.concat(chunks).toString('utf8').split('\r\n');
    expect(head).toContain('"Pore pressure, kPa"');
    expect(first).toMatch(/^Gallery floor,0,-?\d/);
  });

  it('places pasted from a spreadsheet are refused by line, then taken; a grid is typed and removed', async () => {
    await profiles().getByRole('button', { name: 'Paste places' }).click();
    const form = page.getByRole('region', { name: 'Profile from places' });
    const places = form.getByLabel(/^Offset, m, and elevation/);
    await places.fill('Offset\tElevation\n0\t130\nzero\t100');
    await form.getByRole('button', { name: 'Add the profile' }).click();
    await form.getByText('Line 3: The offset “zero” is no number.').waitFor();
    await places.fill('Offset\tElevation\n0\t130\n0\t100,5');
    await form.getByRole('button', { name: 'Add the profile' }).click();
    await form.waitFor({ state: 'detached' });
    const above = profiles().getByRole('row').filter({ hasText: '130.00' });
    await above.getByText('above the phreatic line').waitFor();
    expect((await figuresIn(above))[5]).toBe(0);

    await profiles().getByRole('button', { name: 'Type a grid' }).click();
    const grid = page.getByRole('region', { name: 'Grid of places' });
    const corners = ['First corner', 'Opposite corner'].map((corner) =>
      grid.getByRole('group', { name: corner }),
    );
    for (const [corner, [offset, elevation]] of [
      [corners[0]!, ['-4', '99']],
      [corners[1]!, ['4', '103']],
    ] as const) {
      await corner.getByLabel(/^Offset/).fill(offset);
      await corner.getByLabel(/^Elevation/).fill(elevation);
    }
    await grid.getByRole('button', { name: 'Add the grid' }).click();
    // 8 m by 4 m with a step of a twentieth of 8 m: 21 by 11 nodes, and the head of the table.
    await expect.poll(() => profiles().getByRole('row').count()).toBe(21 * 11 + 1);
    await profiles().getByRole('button', { name: 'Remove', exact: true }).click();
    await expect.poll(() => profiles().getByRole('row').count()).toBeLessThan(100);
    await allSaved(page);
    await page.reload();
    await page.getByRole('button', { name: 'Profiles', exact: true }).click();
    await profiles().getByLabel('Profile', { exact: true }).waitFor();
    expect(
      await profiles().getByLabel('Profile', { exact: true }).locator('option').allTextContents(),
    ).toEqual(['Gallery floor', 'Profile 1']);
  });

  it('exits are listed below, and the seepage is shown in the unit chosen', async () => {
    await cell(page, 'Permeability').click();
    const form = page.getByRole('region', { name: 'Permeability' });
    await form.getByLabel('Permeability k').fill('2e-7');
    await form.getByLabel('Permeability k').press('Tab');
    await page.getByRole('button', { name: 'Exits and quantities' }).click();
    const exits = page.getByRole('region', { name: 'Exits and quantities' });
    await exits.getByRole('button', { name: /^Show: exit 1$/ }).click();
    await exits.getByLabel('Shown in').selectOption('L/s');
    await titleBlock(page)
      .getByRole('button', { name: /^Seepage per metre.+ L\/s/ })
      .waitFor();
    await exits.getByText('What books and manuals give').click();
    await exits
      .getByText(/Venkatramaiah/)
      .first()
      .waitFor();
  });
});

describe('a section seen otherwise than drawn', () => {
  it('anisotropic ground is seen transformed, and a point clicked there lies where the readout says', async () => {
    const form = page.getByRole('region', { name: 'Permeability' });
    await form.getByLabel(/^Permeability across/).fill('5e-8');
    await form.getByLabel(/^Permeability across/).press('Tab');
    const transformed = page.getByRole('button', { name: 'Transformed', exact: true });
    await transformed.click();
    expect(await transformed.getAttribute('aria-pressed')).toBe('true');
    await sheet.focus();
    await page.keyboard.press('r');
    const box = (await sheet.boundingBox())!;
    const at = [box.x + 0.5 * box.width, box.y + 0.6 * box.height] as const;
    await page.mouse.move(at[0] - 1, at[1]);
    await page.mouse.move(...at);
    const readout = await page
      .getByRole('status')
      .filter({ hasText: /^Offset / })
      .textContent();
    const [offset, elevation] = readout!.match(/\d+\.\d+/g)!.map(Number);
    await page.mouse.click(...at);
    await page.keyboard.press('Escape');
    const rows = page.getByRole('region', { name: 'Reading points' }).getByRole('row');
    // The head of the table, the point of the file and the one just placed.
    await expect.poll(() => rows.count()).toBe(3);
    const typed = rows.last().getByRole('textbox');
    const kept = await Promise.all([typed.nth(1).inputValue(), typed.nth(2).inputValue()]);
    const figures = kept.map((text) => Math.abs(Number(text.replace('−', '-'))));
    expect(Math.abs(figures[0]! - offset!)).toBeLessThan(0.11);
    expect(Math.abs(figures[1]! - elevation!)).toBeLessThan(0.02);
    await page.getByRole('button', { name: 'As drawn' }).click();
  });

  it('stands on a phone too, table and switch', async () => {
    await page.setViewportSize(PHONE);
    await page.getByRole('button', { name: 'Sheet', exact: true }).click();
    await sheet.getByRole('button', { name: 'More', exact: true }).click();
    await page.getByRole('button', { name: 'Transformed', exact: true }).waitFor();
    const over = await page.evaluate(() => document.documentElement.scrollWidth - innerWidth);
    expect(over).toBeLessThanOrEqual(0);
    await page.setViewportSize({ width: 1440, height: 900 });
    await page.context().close();
  });
});

it('a first guess of the phreatic line is drawn, says that it is one, and is taken as traced', async () => {
  page = await world.pageOf(world.engineer);
  await openNetFromFile(world, page, damDocument({ outlet: 'face' }), { section: 'C–C', loadCase: 'Guess' });
  sheet = page.getByRole('application', { name: / on drawing / });
  await sheet.focus();
  await page.keyboard.press('p');
  await page.getByRole('button', { name: 'Draw a first guess' }).click();
  await page.getByText(/^Basic parabola \(Kozeny\), entry after Casagrande/).waitFor();
  await cell(page, 'Net check').click();
  const check = page.getByRole('region', { name: 'Net check' });
  await check
    .getByText(/still a first guess/)
    .first()
    .waitFor();
  await check.getByRole('heading', { name: 'Phreatic line' }).waitFor();
  await check.getByText(/^Entry: /).waitFor();
  await sheet.focus();
  await page.keyboard.press('Escape');
  await page.keyboard.press('Escape');
  await check
    .getByRole('listitem')
    .filter({ hasText: /is still a first guess from the geometry/ })
    .getByRole('button')
    .click();
  await page.getByRole('button', { name: 'Take as traced' }).click();
  await cell(page, 'Net check').click();
  await expect.poll(() => check.getByText(/still a first guess/).count()).toBe(0);
  await page.context().close();
});
