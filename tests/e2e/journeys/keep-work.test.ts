import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { SheetPoint } from '#shared/contract/document.ts';
import { axeFaults } from '#tests/support/axe.ts';
import { apronScan, equipotential, flowLine } from '#tests/support/journey/apron-sheet.ts';
import { takeDesk } from '#tests/support/journey/desk-hand.ts';
import { allSaved } from '#tests/support/journey/desk-steps.ts';
import { addDrawings, openNewNet } from '#tests/support/journey/drawing-steps.ts';
import { type JourneyWorld, openWorld } from '#tests/support/journey/journey-world.ts';

let world: JourneyWorld;
let page: Page;
let netAddress: string;
beforeAll(async () => {
  world = await openWorld();
  page = await world.pageOf(world.engineer);
  await page.goto(`/dams/${world.damId}`);
  await addDrawings(page, [{ name: 'apron.png', mimeType: 'image/png', buffer: await apronScan() }]);
  await openNewNet(page, 'apron.png', { name: 'Spillway axis', chainage: '' });
  netAddress = new URL(page.url()).pathname;
  // The browser writes what it could not reach to its console.
  world.browser.expectConsoleError(/Failed to load resource|net::ERR/);
});
afterAll(() => world.close());

async function linesOnServer(): Promise<number> {
  const [{ count }] = await world.server.db.query(
    "SELECT count(*)::int FROM document_entity WHERE kind = 'line' AND NOT removed AND value ->> 'finished' = 'true'",
  );
  return count;
}

async function traceLine(key: string, points: SheetPoint[]): Promise<void> {
  const hand = await takeDesk(page);
  await hand.sheet.focus();
  await page.keyboard.press(key);
  await hand.trace(points);
  await page.keyboard.press('Escape');
}

describe('what is traced is kept', () => {
  it('through a lost connection: it stays in the browser and is sent when the connection is back', async () => {
    await page.context().setOffline(true);
    await traceLine('e', equipotential(1));
    await page.getByText(/kept in this browser/).waitFor();
    expect(await axeFaults(page, 'desk, without a connection')).toEqual([]);
    expect(await linesOnServer()).toBe(0);
    await page.context().setOffline(false);
    await allSaved(page);
    expect(await linesOnServer()).toBe(1);
  });

  it('through a server that is stopped and started again', async () => {
    await world.server.stop();
    await traceLine('e', equipotential(2));
    await page.getByText(/kept in this browser/).waitFor();
    await world.server.restart();
    await expect.poll(linesOnServer, { timeout: 45_000 }).toBe(2);
  });

  it('through a tab closed without a connection: it is sent when the net is opened again', async () => {
    await page.context().setOffline(true);
    await traceLine('f', flowLine(1));
    await page.getByText(/kept in this browser/).waitFor();
    await page.close({ runBeforeUnload: false });
    await page.context().setOffline(false);
    page = await page.context().newPage();
    await page.goto(netAddress);
    await expect.poll(linesOnServer, { timeout: 20_000 }).toBe(3);
  });

  it('with its steps: after a reload all of them are taken back at once, and done again', async () => {
    await page.reload();
    await page.getByRole('button', { name: 'Steps to take back' }).click();
    const steps = page.getByRole('dialog', { name: 'Choose how far to take back' });
    await steps.getByRole('listitem').first().waitFor();
    const count = await steps.getByRole('listitem').count();
    await steps.getByRole('listitem').last().getByRole('button').click();
    await expect.poll(linesOnServer, { timeout: 20_000 }).toBe(0);
    await page.getByRole('button', { name: 'Steps to do again' }).click();
    const again = page.getByRole('dialog', { name: 'Choose how far to do again' });
    await expect.poll(() => again.getByRole('listitem').count()).toBe(count);
    await again.getByRole('listitem').last().getByRole('button').click();
    await expect.poll(linesOnServer, { timeout: 20_000 }).toBe(3);
  });

  it('through a sign-in that has ended: it goes out after signing in again', async () => {
    await page.getByRole('application', { name: / on drawing / }).waitFor();
    await allSaved(page);
    await world.server.db.query('DELETE FROM session');
    // A short line: it has to be drawn before the first of it is sent, since the dialog then lies over the sheet.
    await traceLine(
      'f',
      flowLine(2).filter((_, i) => i % 7 === 0),
    );
    await page.getByRole('dialog', { name: 'Sign in again' }).waitFor();
    expect(await axeFaults(page, 'desk, signing in again')).toEqual([]);
    await page.getByLabel('Password').fill(world.engineer.password);
    await page.getByRole('button', { name: 'Sign in', exact: true }).click();
    await expect.poll(linesOnServer, { timeout: 20_000 }).toBe(4);
  });
});
