import { mkdtempSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { DocumentEntity, SheetPoint } from '#shared/contract/document.ts';
import { apronScan, equipotential } from '#tests/support/journey/apron-sheet.ts';
import { takeDesk } from '#tests/support/journey/desk-hand.ts';
import { addDrawings, openNewNet } from '#tests/support/journey/drawing-steps.ts';
import { type JourneyWorld, openWorld, signIn } from '#tests/support/journey/journey-world.ts';
import { type KeptBrowser, openKeptBrowser } from '#tests/support/kept-browser.ts';

let world: JourneyWorld;
let browser: KeptBrowser;
let profile: string;
let page: Page;
let address: string;

beforeAll(async () => {
  world = await openWorld();
  profile = mkdtempSync(path.join(os.tmpdir(), 'tracehead-profile-'));
  browser = await openKeptBrowser(profile);
  page = await browser.context.newPage();
  await signIn(page, world.engineer, world.server.address);
  await page.goto(`${world.server.address}/dams/${world.damId}`);
  await addDrawings(page, [{ name: 'apron.png', mimeType: 'image/png', buffer: await apronScan() }]);
  await openNewNet(page, 'apron.png', { name: 'Spillway axis', chainage: '' });
  address = page.url();
});
afterAll(async () => {
  await browser.kill().catch(() => {});
  await world.close();
  rmSync(profile, { recursive: true, force: true, maxRetries: 5 });
});

/** Places clicked along a line that is not finished. */
async function begin(points: SheetPoint[]): Promise<void> {
  const hand = await takeDesk(page);
  await hand.sheet.focus();
  await page.keyboard.press('e');
  await page.keyboard.down('Control');
  for (const point of points) await hand.click(point);
  await page.keyboard.up('Control');
}

async function linesOnServer(): Promise<DocumentEntity[]> {
  const rows: Array<{ value: DocumentEntity }> = await world.server.db.query(
    "SELECT value FROM document_entity WHERE kind = 'line' AND NOT removed",
  );
  return rows.map((row) => row.value);
}

const WITHIN = { timeout: 20_000 };
const pointsOfLines = async () =>
  (await linesOnServer()).map((value) => (value.kind === 'line' ? value.points.length : 0));

describe('a browser that ends without warning while a line is being drawn without a connection', () => {
  it('has the unfinished line at the next opening, sends it, and can take its steps back', async () => {
    await browser.context.setOffline(true);
    await begin(equipotential(2).slice(0, 3));
    await page.getByText(/kept in this browser/).waitFor();
    await browser.kill();
    expect(await linesOnServer()).toEqual([]);

    browser = await openKeptBrowser(profile);
    page = await browser.context.newPage();
    // The browser writes its cookies only now and then, so that the sign-in may be gone with it.
    await page.goto(address);
    const sheet = page.getByRole('application', { name: / on drawing / });
    const password = page.getByLabel('Password');
    await sheet.or(password).first().waitFor();
    if (await password.isVisible()) {
      await signIn(page, world.engineer, world.server.address);
      await page.goto(address);
    }
    await expect.poll(pointsOfLines, WITHIN).toEqual([3]);
    expect(await linesOnServer()).toMatchObject([{ finished: false }]);

    await page.getByRole('button', { name: 'Undo', exact: true }).click();
    await expect.poll(pointsOfLines, WITHIN).toEqual([2]);
  });
});
