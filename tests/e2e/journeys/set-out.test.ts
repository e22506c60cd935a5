import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { g4Drawing, pdfDrawing, pngDrawing } from '#tests/support/drawing-files.ts';
import { allSaved, cell, placeKnownPoints } from '#tests/support/journey/desk-steps.ts';
import { addDrawings, openNewNet } from '#tests/support/journey/drawing-steps.ts';
import { type JourneyWorld, openWorld, realInput } from '#tests/support/journey/journey-world.ts';

let world: JourneyWorld;
beforeAll(async () => {
  world = await openWorld();
});
afterAll(() => world.close());

/** Real scans where the shared inputs are there: a G4 TIFF, a JPEG plate of 1910 and a scanned PDF of five pages. */
async function scans() {
  const tiff = realInput('tiff', 'min-is-white-with-profile.tif') ?? (await g4Drawing({ seed: 11 }));
  const jpeg = realInput('drawings', 'northriver-plate5.jpg') ?? (await pngDrawing({ seed: 12 }));
  const letter = { width: 612, height: 792 };
  const pdf = realInput('pdf', '2_column_crop_input.pdf') ?? pdfDrawing(Array(5).fill(letter));
  return [
    { name: 'roll-7.tif', mimeType: 'image/tiff', buffer: tiff },
    { name: 'plate-5.jpg', mimeType: 'image/jpeg', buffer: jpeg },
    { name: 'report.pdf', mimeType: 'application/pdf', buffer: pdf },
  ];
}

describe('an engineer with legacy drawings', () => {
  it('uploads a scanned TIFF, a JPEG and a PDF of several pages, and sees their sheets', async () => {
    const page = await world.pageOf(world.engineer);
    await page.getByRole('link', { name: 'Harrow Fen Dam' }).first().click();
    await page.getByRole('heading', { name: 'Drawings' }).waitFor();
    await addDrawings(page, await scans());
    const report = page
      .getByRole('listitem')
      .filter({ has: page.getByRole('heading', { name: 'report.pdf' }) });
    expect(await report.textContent()).toContain('5 sheets');
    await page.getByRole('heading', { name: 'report.pdf' }).getByRole('link').click();
    await page
      .getByRole('link', { name: /3/ })
      .or(page.getByRole('button', { name: /3/ }))
      .first()
      .waitFor();
    await page.context().close();
  });

  it('puts a section of the JPEG to scale from two known points, which are there after a reload', async () => {
    const page = await world.pageOf(world.engineer);
    await page.goto(`/dams/${world.damId}`);
    await openNewNet(page, 'plate-5.jpg', { name: 'A–A', chainage: '40' });
    await placeKnownPoints(page, [
      { at: [400, 1200], offset: '-20', elevation: '96' },
      { at: [1400, 1200], offset: '30', elevation: '96' },
    ]);
    // 50 m over 1000 px.
    await expect.poll(() => cell(page, 'Scale').textContent()).toMatch(/0\.0(5|50\d+|49\d+) m\/px/);
    await expect.poll(() => cell(page, 'Residual').textContent()).toContain('None, two points only');
    await allSaved(page);
    await page.reload();
    await expect
      // The page is loaded and the net is read anew, for which a busy machine takes its time.
      .poll(() => cell(page, 'Scale').textContent(), { timeout: 15_000 })
      .toMatch(/0\.0(5|50\d+|49\d+) m\/px/);
    await page.context().close();
  });

  it('is told in a sentence why a file cannot be used, and nothing is kept of it', async () => {
    const page = await world.pageOf(world.engineer);
    await page.goto(`/dams/${world.damId}`);
    world.browser.expectConsoleError(/status of 4(15|22)/);
    await page.locator('input[type=file][aria-label="Add a drawing"]').setInputFiles([
      {
        name: 'sketch.svg',
        mimeType: 'image/svg+xml',
        buffer: Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"/>'),
      },
    ]);
    await page.getByText(/SVG/).first().waitFor();
    expect(await page.getByRole('heading', { name: 'sketch.svg' }).count()).toBe(0);
    await page.context().close();
  });
});
