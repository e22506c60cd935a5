import type { Page } from 'playwright-core';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type DeskHand, takeDesk } from '#tests/support/journey/desk-hand.ts';
import { allSaved, cell } from '#tests/support/journey/desk-steps.ts';
import { addDrawings, openNewNet } from '#tests/support/journey/drawing-steps.ts';
import { type JourneyWorld, openWorld, realInput } from '#tests/support/journey/journey-world.ts';

/**
 * A long profile of 1910 (`eastriver-plate14.png`) is put to scale at the desk from printed stations and elevations, some
 * of which give one of the two only. The places are where a person clicks about; see `tests/support/plates-of-1910.ts`.
 */
let world: JourneyWorld;
let page: Page;
let hand: DeskHand;
beforeAll(async () => {
  world = await openWorld();
  page = await world.pageOf(world.engineer);
});
afterAll(() => world.close());

const PICKS = [
  { at: [484, 728], offset: '17500', elevation: '350' },
  { at: [4250, 726], offset: '11500', elevation: '350' },
  { at: [47, 1197], elevation: '200', sets: true },
  { at: [4663, 1195], elevation: '200', sets: true },
  { at: [4250, 1194], offset: '11500', sets: true },
  { at: [2682, 1195], offset: '14000', elevation: '200' },
] as const;

/** Where the shared inputs are absent, a profile ruled in code at the same places. */
async function ruledSheet(): Promise<Buffer> {
  const stations = [173, 484, 797, 1111, 1425, 1739, 2052, 2365, 2682, 2995, 3308, 3622, 3934, 4250, 4561];
  const lines = [
    ...[...stations, 47, 4663].map((x) => `M${x} 728 V1195`),
    ...[728, 821.4, 914.8, 1008.2, 1101.6, 1195].map((y) => `M47 ${y} H4663`),
  ];
  return sharp(
    Buffer.from(
      `<svg xmlns="http://www.w3.org/2000/svg" width="4740" height="1260"><rect width="100%" height="100%" fill="white"/><path d="${lines.join(' ')}" stroke="black" stroke-width="3" fill="none"/></svg>`,
    ),
  )
    .png()
    .toBuffer();
}

/** The place in the middle of the magnified view, sheet pixels. */
async function magnified(): Promise<[number, number]> {
  const words = await page
    .getByRole('group', { name: /^Magnified/ })
    .locator('[data-place]')
    .textContent();
  const [x, y] = (words?.match(/\d+(\.\d+)?/g) ?? []).map(Number);
  return [x ?? Number.NaN, y ?? Number.NaN];
}

/** Points at a place until the crossing found there is magnified, and clicks. */
async function placeOnCrossing(at: readonly [number, number]): Promise<void> {
  await hand.moveTo([at[0] - 6, at[1] - 6]);
  await hand.moveTo(at);
  let before = await magnified();
  await expect
    .poll(
      async () => {
        const now = await magnified();
        const isSteady = now[0] === before[0] && now[1] === before[1];
        before = now;
        // The readout gives the pointer to a tenth; a crossing lies elsewhere by more than rounding.
        const pointed = await page
          .getByRole('status')
          .filter({ hasText: /^x /, visible: true })
          .first()
          .textContent();
        return isSteady && pointed !== `x ${now[0].toFixed(1)}, y ${now[1].toFixed(1)} px`;
      },
      // The first crossing waits for the worker's code and the tile.
      { timeout: 30_000 },
    )
    .toBe(true);
  await hand.click(at);
}

const row = (n: number) => page.getByRole('group', { name: `K${n}`, exact: true });

async function typeInto(n: number, label: RegExp, text: string): Promise<void> {
  const field = row(n).getByLabel(label);
  await field.fill(text);
  await field.press('Tab');
}

describe('a plate of 1910', () => {
  it('is put to scale from crossings of its printed lines, some with one figure only', async () => {
    const buffer = realInput('drawings', 'eastriver-plate14.png') ?? (await ruledSheet());
    await page.getByRole('link', { name: 'Harrow Fen Dam' }).first().click();
    await addDrawings(page, [{ name: 'plate-14.png', mimeType: 'image/png', buffer }]);
    await openNewNet(page, 'plate-14.png', { name: 'Line A', chainage: '0' });
    hand = await takeDesk(page);
    await hand.sheet.focus();
    await page.keyboard.press('k');
    await page.getByLabel('Scales of the drawing').selectOption('plottingExaggeration');
    for (const { at } of PICKS) await placeOnCrossing(at);
    for (const [i, pick] of PICKS.entries()) {
      if ('offset' in pick) await typeInto(i + 1, /^Offset/, pick.offset);
      if ('elevation' in pick) await typeInto(i + 1, /^Elevation/, pick.elevation);
      if ('sets' in pick)
        await row(i + 1)
          .getByLabel('Use')
          .selectOption('fit');
    }
    await row(3).getByText('gives its elevation only').waitFor();
    await row(5).getByText('gives its offset only').waitFor();
    // 1.6 m to the pixel along, as the figures are typed into a dam in metres.
    await expect.poll(() => cell(page, 'Scale').textContent()).toMatch(/1\.(59|60)\d* m\/px/);
  }, 240_000);

  it('tells a labelled place that it was not given, within what its printing allows', async () => {
    await expect.poll(() => row(6).textContent()).toMatch(/Off by/);
    const said = (await row(6).textContent())!.replaceAll('−', '-');
    const [, offset, offsetPx, elevation] =
      /([-+\d.]+) m in offset \(([-+\d.]+) px\), ([-+\d.]+) m in elevation/.exec(said)!;
    expect(Math.abs(Number(offset))).toBeLessThan(8);
    expect(Math.abs(Number(offsetPx))).toBeLessThan(5);
    expect(Math.abs(Number(elevation))).toBeLessThan(1.5);
    const form = page.getByRole('region', { name: 'Known points' });
    expect(await form.textContent()).toMatch(/stretched (4\.9\d?|5) times/);
    expect(await form.textContent()).toMatch(/No point alone spoils the fit/);
    expect(await form.textContent()).toMatch(/at the worst corner: offset ± [\d.]+, elevation ± [\d.]+ m/);
    expect(await cell(page, 'Residual').textContent()).toMatch(/ m; places ± [\d.]+ to [\d.]+\sm/);
  });

  it('shows which point alone spoils the fit, and mends it', async () => {
    await typeInto(6, /^Elevation/, '230');
    await row(6).getByText('Suspect: it alone spoils the fit.').waitFor();
    await typeInto(6, /^Elevation/, '200');
    await row(6).getByText('Suspect: it alone spoils the fit.').waitFor({ state: 'detached' });
  });

  it('is checked by eye with the grid, and measured with the ruler in true lengths', async () => {
    await hand.sheet.focus();
    await page.keyboard.press('g');
    await page.locator('canvas[data-layer="grid"]').waitFor();
    expect(await page.getByRole('button', { name: 'Grid' }).getAttribute('aria-pressed')).toBe('true');
    await page.keyboard.press('m');
    await hand.click([484, 728]);
    await hand.click([4250, 726]);
    await page.keyboard.press('Enter');
    const ruler = page.getByRole('region', { name: 'Ruler' });
    const cells = await ruler.getByRole('row').nth(1).getByRole('cell').allTextContents();
    expect(Math.abs(Number(cells[1]) - 6000)).toBeLessThan(25);
    expect(await ruler.textContent()).toContain('the stretch of the drawing is taken out');
    await page.keyboard.press('Escape');
    await ruler.getByText('Click where to measure from.').waitFor();
    await allSaved(page);
  });
});
