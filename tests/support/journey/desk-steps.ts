import type { Locator, Page } from 'playwright-core';
import type { SheetPoint } from '#shared/contract/document.ts';
import { type DeskHand, takeDesk } from './desk-hand.ts';

export interface PlacedKnownPoint {
  at: SheetPoint;
  offset: string;
  elevation: string;
}

export const titleBlock = (page: Page): Locator => page.getByRole('region', { name: 'Title block' });

/** A cell of the title block, by the fact it shows. */
export const cell = (page: Page, name: string): Locator =>
  titleBlock(page).getByRole('button', { name: new RegExp(`^${name}`) });

/** Waits until the server has everything. */
export const allSaved = (page: Page) => page.getByText(/^Saved/).waitFor();

async function typeInto(field: Locator, text: string): Promise<void> {
  await field.fill(text);
  // A figure is taken when its field is left.
  await field.press('Tab');
}

/** Puts the section to scale: clicks the points with the tool, types what is known of them. */
export async function placeKnownPoints(page: Page, points: PlacedKnownPoint[]): Promise<DeskHand> {
  const hand = await takeDesk(page);
  await hand.sheet.focus();
  await page.keyboard.press('k');
  await page.keyboard.down('Control');
  for (const { at } of points) await hand.click(at);
  await page.keyboard.up('Control');
  await page.keyboard.press('Escape');
  for (const [index, { offset, elevation }] of points.entries()) {
    const row = page.getByRole('group', { name: `K${index + 1}`, exact: true });
    await typeInto(row.getByLabel(/^Offset/), offset);
    await typeInto(row.getByLabel(/^Elevation/), elevation);
  }
  return hand;
}

/** Traces one boundary of a kind. */
export async function traceBoundary(
  page: Page,
  hand: DeskHand,
  kind: string,
  points: SheetPoint[],
): Promise<void> {
  await hand.sheet.focus();
  await page.keyboard.press('b');
  await page.getByRole('button', { name: kind, exact: true }).click();
  await hand.trace(points);
  await page.keyboard.press('Escape');
}

/** Types the water levels into their form. */
export async function typeWaterLevels(page: Page, headwater: string, tailwater: string): Promise<void> {
  await cell(page, 'Headwater').click();
  const form = page.getByRole('region', { name: 'Water levels' });
  await typeInto(form.getByLabel(/^Headwater,/), headwater);
  await typeInto(form.getByLabel(/^Tailwater,/), tailwater);
  await form.getByRole('button', { name: 'Close' }).click();
}

/** Types a reading point's name and coordinates. */
export async function typeReadingPoint(
  page: Page,
  name: string,
  offset: string,
  elevation: string,
): Promise<void> {
  await page.getByRole('button', { name: 'Type a point' }).click();
  const form = page.getByRole('region', { name: 'Type a reading point' });
  await typeInto(form.getByLabel('Name'), name);
  await typeInto(form.getByLabel(/^Offset/), offset);
  await typeInto(form.getByLabel(/^Elevation/), elevation);
  await form.getByRole('button', { name: 'Add the point' }).click();
  await form.getByRole('button', { name: 'Close' }).click();
}

/** The row of a reading point in the schedule. */
export const scheduleRow = (page: Page, name: string): Locator =>
  page.getByRole('row', { name: new RegExp(`^${name}\\b`) });
