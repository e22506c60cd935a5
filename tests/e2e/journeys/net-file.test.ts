import type { Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { type FlowNetDocument, flowNetDocument } from '#shared/contract/document.ts';
import { allSaved, cell, scheduleRow } from '#tests/support/journey/desk-steps.ts';
import { type JourneyWorld, openWorld } from '#tests/support/journey/journey-world.ts';
import { finishedDocument } from '#tests/support/net-fixture.ts';

let world: JourneyWorld;
beforeAll(async () => {
  world = await openWorld();
});
afterAll(() => world.close());

const fileOf = (text: string) => ({
  name: 'net.json',
  mimeType: 'application/json',
  buffer: Buffer.from(text),
});

async function type(page: Page, form: string, label: RegExp | string, text: string): Promise<void> {
  const field = page.getByRole('region', { name: form, exact: true }).getByLabel(label);
  await field.fill(text);
  await field.press('Tab');
}

/** The document as the desk gives it out. */
async function downloaded(page: Page): Promise<FlowNetDocument> {
  const response = await page.request.get(`/api/v1${new URL(page.url()).pathname}/document`);
  return flowNetDocument.parse(await response.json());
}

const valuesOf = (document: FlowNetDocument, kind: string) =>
  Object.values(document.entities)
    .map(({ value }) => value)
    .filter((value) => value.kind === kind);

it('a net from a file: its faults are told, its datum is asked about, and it opens on an empty sheet', async () => {
  const page = await world.pageOf(world.engineer);
  world.browser.expectConsoleError(/status of 4(00|09)/);
  await page.goto(`/dams/${world.damId}`);
  await page.getByRole('button', { name: 'Net from a file on an empty sheet' }).click();
  const dialog = page.getByRole('dialog');
  const make = dialog.getByRole('button', { name: 'Make the net and open the desk' });
  await make.click();
  await dialog.getByText('Choose the file first.').waitFor();
  await dialog.getByLabel('Section', { exact: true }).fill('A–A');
  const text = JSON.stringify({ ...finishedDocument(1), name: 'Full supply' }, null, 2);
  await dialog.getByLabel('Net file (JSON)').setInputFiles(fileOf(text.replace('"SI"', '"metric"')));
  await dialog.getByLabel('Load case').fill('Full supply');
  await make.click();
  await dialog.getByText(/^Line \d+, unitSystem: /).waitFor();
  await dialog.getByLabel('Net file (JSON)').setInputFiles(fileOf(text));
  await make.click();
  await dialog.getByText('The elevations differ').waitFor();
  await dialog.getByRole('button', { name: 'Make the net all the same' }).click();
  await page.getByRole('application').waitFor();
  await expect.poll(() => cell(page, 'Drops').textContent(), { timeout: 15_000 }).toContain('10');
  await expect.poll(() => scheduleRow(page, 'P1').textContent(), { timeout: 15_000 }).toMatch(/\d+\.\d/);
  await page.context().close();
});

it('a measured value, permeabilities, a soil and doubts are typed and kept, and undo takes back', async () => {
  const page = await world.pageOf(world.engineer);
  await page.goto(`/dams/${world.damId}`);
  await page
    .getByRole('heading', { name: /^empty sheet/ })
    .getByRole('link')
    .click();
  await page.getByRole('heading', { name: 'Sections' }).waitFor();
  await page.getByRole('link', { name: 'Full supply', exact: true }).click();
  await page.getByRole('application').waitFor();

  await scheduleRow(page, 'P1')
    .getByRole('button', { name: /^How counted/ })
    .click();
  await page.getByRole('button', { name: 'Type what was measured' }).click();
  await type(page, 'Measured at P1', /^Total head/, '114');
  await page.getByText(/^Measured minus net \+/).waitFor();
  await page.getByRole('columnheader', { name: /^Measured − net/ }).waitFor();

  await cell(page, 'Permeability').click();
  await type(page, 'Permeability', 'Permeability k', '2e-7');
  await type(page, 'Permeability', /^Permeability across/, '-1');
  await page.getByText('It has to be greater than zero.').waitFor();
  await type(page, 'Permeability', /^Permeability across/, '5e-8');
  await type(page, 'Permeability', /^Dip of the bedding/, '95');
  await page.getByText('The dip lies between −90 and 90 degrees.').waitFor();
  await type(page, 'Permeability', /^Dip of the bedding/, '0');
  await type(page, 'Permeability', /^Saturated/, '19.5');
  await page.getByRole('button', { name: 'Add a soil' }).click();
  await page
    .getByRole('region', { name: 'Soil 1' })
    .getByText(/^Nowhere yet/)
    .waitFor();
  await page.getByRole('button', { name: 'Mark a place on the sheet' }).click();
  const sheet = page.getByRole('application', { name: / on drawing / });
  await sheet.click({ position: { x: 300, y: 200 } });
  await page.getByText(/^Place 1 at/).waitFor();
  await sheet.focus();
  await page.keyboard.press('Escape');
  await type(page, 'Soil 1', 'Name', 'Core');

  await cell(page, 'Headwater').click();
  await type(page, 'Water levels', /^Headwater ±/, '0.05');
  await type(page, 'Water levels', /^Datum ±/, '0.02');
  await cell(page, 'Drops').click();
  await page.getByLabel('Channels are counted in').selectOption({ label: 'Core' });
  await allSaved(page);

  const kept = await downloaded(page);
  expect(valuesOf(kept, 'permeability')).toMatchObject([
    { k: 2e-7, kv: 5e-8, dipDeg: 0, saturatedUnitWeight: 19.5 },
  ]);
  expect(valuesOf(kept, 'soil')).toMatchObject([
    { name: 'Core', places: [[expect.any(Number), expect.any(Number)]] },
  ]);
  expect(valuesOf(kept, 'waterLevels')).toMatchObject([{ headwaterPlusMinus: 0.05, datumPlusMinus: 0.02 }]);
  expect(valuesOf(kept, 'readingPoint')).toMatchObject([{ measured: { value: 114, as: 'totalHead' } }]);

  await sheet.focus();
  await page.keyboard.press('Control+z');
  await expect
    .poll(async () => valuesOf(await downloaded(page), 'netCount'))
    .toMatchObject([{ countedIn: null }]);
  await page.context().close();
});
