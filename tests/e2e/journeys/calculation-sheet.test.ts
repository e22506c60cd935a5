import { readFileSync } from 'node:fs';
import type { Locator, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { randomReadings } from '#tests/support/exact-nets/random-readings.ts';
import { type JourneyWorld, openWorld } from '#tests/support/journey/journey-world.ts';
import { openNetFromFile } from '#tests/support/journey/net-from-file.ts';
import { sendForChecking } from '#tests/support/journey/send-steps.ts';

const { net, pxPerUnit } = EXACT_NETS[0]!;

let world: JourneyWorld;
let page: Page;
beforeAll(async () => {
  world = await openWorld();
  page = await world.pageOf(world.engineer);
  const document = exactNetDocument(net, { pxPerUnit, readings: randomReadings(net, 4, 3) });
  await openNetFromFile(world, page, document, { section: 'A–A', loadCase: 'Full supply' });
});
afterAll(() => world.close());

/** Asks for the sheet in the panel and gives the link to it once it is made. */
async function sheetLink(): Promise<Locator> {
  const panel = page.getByRole('region', { name: 'Calculation sheet' });
  await panel.getByLabel('Job number').fill('J-2207');
  await panel.getByRole('button', { name: 'Calculation sheet' }).click();
  const link = panel.getByRole('link', { name: /^Download PDF/ });
  await link.waitFor({ timeout: 60_000 });
  return link;
}

describe('the calculation sheet', () => {
  it('of a draft is asked for beside the revisions on the desk', async () => {
    await page.getByRole('button', { name: /^Calculation/ }).click();
    const link = await sheetLink();
    const [download] = await Promise.all([page.waitForEvent('download'), link.click()]);
    expect(download.suggestedFilename()).toBe('Calculation sheet draft A4.pdf');
    expect(
      readFileSync(await download.path())
        .subarray(0, 5)
        .toString(),
    ).toBe('%PDF-');
  });

  it('of a revision is asked for on the check page, and is read on the screen', async () => {
    await sendForChecking(page);
    await page.getByRole('link', { name: 'Revision A', exact: true }).click();
    // The desk, which has a panel of the same name, stays until the check page is there.
    await page.getByText('Revision A, shown here').waitFor();
    const answer = await page.request.get((await (await sheetLink()).getAttribute('href')) ?? '');
    expect(answer.headers()['content-disposition']).toContain('Calculation sheet revision A A4.pdf');
    expect((await answer.body()).subarray(0, 5).toString()).toBe('%PDF-');
    await page.getByRole('link', { name: 'Print view' }).click();
    await page.getByRole('heading', { name: 'Validity and assumptions' }).waitFor();
    await page.getByRole('table', { name: /^Schedule of points/ }).waitFor();
    await page.getByText(/^Revision A, SHA-256 [0-9a-f]{64}$/).waitFor();
    const picture = process.env.SHEET_PDF_FOLDER;
    if (picture) await page.screenshot({ path: `${picture}/print-view.png`, fullPage: true });
  });
});
