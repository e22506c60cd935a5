import { readFile } from 'node:fs/promises';
import type { Page } from 'playwright-core';
import { v7 as uuidv7 } from 'uuid';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { openBrowser, PHONE, type TestBrowser } from '#tests/support/browser.ts';
import { Caller } from '#tests/support/caller.ts';
import {
  addFinishedNet,
  batchesOf,
  fillNet,
  finishedDocument,
  type NetPlaceFixture,
  openNet,
  putSingle,
} from '#tests/support/net-fixture.ts';
import { type RealServer, startRealServer } from '#tests/support/real-server.ts';
import { addPerson } from '#tests/support/test-people.ts';
import { signIn } from './support.ts';

let server: RealServer;
let browser: TestBrowser;
let page: Page;
/** Sections B–B at chainage 212 and C–C at 312 with a net of each, a net of C–C at a higher headwater, and one begun. */
let place: NetPlaceFixture;
const further = { section: uuidv7(), net: uuidv7(), flood: uuidv7(), axis: uuidv7(), begun: uuidv7() };

beforeAll(async () => {
  server = await startRealServer();
  browser = await openBrowser(server.address);
  place = await addFinishedNet({
    db: server.db,
    async signIn(name) {
      const person = await addPerson(server.db, name);
      const caller = new Caller(server.address);
      await caller.signIn(person.email, person.password);
      return { person, caller };
    },
  });
  const { caller, sheetId, engineer } = place;
  const section = { id: further.section, name: 'C–C', chainage: '312', frame: null };
  await caller.post(`/sheets/${sheetId}/sections`, section).expect(201);
  for (const [id, name] of [
    [further.net, 'Full supply'],
    [further.flood, 'Flood'],
  ] as const) {
    await caller.post(`/sections/${further.section}/nets`, { id, name }).expect(201);
    await fillNet(caller, id, withoutKnownPoints(id === further.net));
  }
  const axis = { id: further.axis, name: 'Spillway axis', chainage: '400', frame: null };
  await caller.post(`/sheets/${sheetId}/sections`, axis).expect(201);
  await caller.post(`/sections/${further.axis}/nets`, { id: further.begun, name: 'Begun' }).expect(201);
  await enter(place.netId, 'permeability', { k: 2e-6, unit: 'm/s', factor: 2 });
  await enter(further.net, 'permeability', { k: 4e-6, unit: 'm/s', factor: 3 });
  const { document } = await openNet(caller, further.flood);
  const levels = Object.values(document.entities).find(({ value }) => value.kind === 'waterLevels')?.value;
  const headwater = levels?.kind === 'waterLevels' ? (levels.headwater ?? 0) + 0.02 : 0;
  await enter(further.flood, 'waterLevels', { headwater });
  await enter(further.flood, 'permeability', { k: 4e-6, unit: 'm/s', factor: 3 });
  // The sheet of the fixture has no picture.
  browser.expectConsoleError(/status of 404.*\/thumbnail\)$/);
  page = await browser.newPage();
  await page.goto(`/dams/${place.damId}`);
  await signIn(page, engineer);
});
afterEach(() => browser.checkConsole());
afterAll(async () => {
  await browser.close();
  await server.close();
});

/** Known points belong to the section: its second net finds them there. */
function withoutKnownPoints(isFirst: boolean) {
  const document = finishedDocument();
  const kept = Object.entries(document.entities).filter(
    ([, { value }]) => isFirst || (value.kind !== 'knownPoint' && value.kind !== 'setOut'),
  );
  return { ...document, entities: Object.fromEntries(kept) };
}

async function enter(netId: string, kind: 'permeability' | 'waterLevels', change: object): Promise<void> {
  const { document } = await openNet(place.caller, netId);
  const batch = batchesOf()([putSingle(document, kind, change)]);
  await place.caller.post(`/nets/${netId}/commands`, batch).expect(200);
}

const picker = (section: string) => page.getByLabel(`Net for ${section}`);
const totalRow = () => page.getByRole('row', { name: /^Total/ });

describe('the seepage along a dam', () => {
  it('is opened from the dam, with nothing chosen and nothing added', async () => {
    await page.getByRole('link', { name: 'Seepage along the dam' }).click();
    await page.getByText('Nothing is chosen for you').waitFor();
    expect(await picker('Section C–C').inputValue()).toBe('');
    expect(await page.getByRole('button', { name: 'Download CSV' }).count()).toBe(0);
  });

  it('adds the nets that are picked, and keeps the choice in the address', async () => {
    await picker('Section B–B').selectOption({ label: 'Full supply' });
    await picker('Section C–C').selectOption({ label: 'Full supply' });
    await totalRow().waitFor();
    expect(await totalRow().textContent()).toContain('100.0');
    expect(await totalRow().textContent()).toContain('×/÷ 3.0');
    expect(new URL(page.url()).search).toBe(`?nets=${place.netId},${further.net}`);
    expect(await page.getByText(/headwaters of the chosen nets differ/).count()).toBe(0);
    const cubicMetres = await totalRow().textContent();
    await page.getByLabel('Shown in').selectOption('L/s');
    await expect.poll(() => totalRow().textContent()).not.toBe(cubicMetres);
  });

  it('follows a change of a net that is chosen, by whomever', async () => {
    const before = await totalRow().textContent();
    await enter(further.net, 'permeability', { k: 2e-5 });
    await expect.poll(() => totalRow().textContent(), { timeout: 15_000 }).not.toBe(before);
  });

  it('leaves out a net that is not finished, and leads to it', async () => {
    await picker('Spillway axis').selectOption({ label: 'Begun' });
    await page.getByText('The total is worked out without Spillway axis.').waitFor();
    const remark = page.getByRole('row', { name: /^Left out/ });
    const link = remark.getByRole('link', { name: 'Open the net' });
    expect(await link.getAttribute('href')).toBe(`/nets/${further.begun}`);
    await picker('Spillway axis').selectOption({ label: 'not chosen' });
    await remark.waitFor({ state: 'detached' });
  });

  it('is downloaded as CSV as it is shown', async () => {
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('button', { name: 'Download CSV' }).click(),
    ]);
    expect(download.suggestedFilename()).toBe('Harrow Fen Dam seepage along the dam.csv');
    const lines = (await readFile((await download.path()) ?? '', 'utf8')).split('\r\n');
    expect(lines.find((line) => line.startsWith('Total,'))).toMatch(/^Total,,100,/);
  });

  it('says when the water levels of the nets differ, and fits a phone', async () => {
    await picker('Section C–C').selectOption({ label: 'Flood' });
    await page.getByText(/headwaters of the chosen nets differ/).waitFor();
    await page.setViewportSize(PHONE);
    expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(PHONE.width);
  });

  it('opens for a shared address as it was chosen, and leads out of one that names something else', async () => {
    browser.expectConsoleError(/status of 404.*\/seepage\?nets=.*\)$/);
    await page.reload();
    await totalRow().waitFor();
    const flood = await picker('Section C–C').inputValue();
    expect(flood).toBe(further.flood);
    await page.goto(`/dams/${place.damId}/seepage?nets=${uuidv7()}`);
    await page.getByRole('link', { name: 'Start with no net chosen' }).click();
    await picker('Section C–C').waitFor();
  });
});
