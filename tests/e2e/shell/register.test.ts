import { v7 as uuidv7 } from 'uuid';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { openBrowser, PHONE, type TestBrowser } from '#tests/support/browser.ts';
import { Caller } from '#tests/support/caller.ts';
import { addNet, type NetPlaceFixture } from '#tests/support/net-fixture.ts';
import { type RealServer, startRealServer } from '#tests/support/real-server.ts';
import { addDam, addPerson } from '#tests/support/test-people.ts';
import { answered, signIn } from './support.ts';

let server: RealServer;
let browser: TestBrowser;
let place: NetPlaceFixture;

beforeAll(async () => {
  server = await startRealServer();
  browser = await openBrowser(server.address);
  place = await addNet({
    db: server.db,
    async signIn(name) {
      const person = await addPerson(server.db, name);
      const caller = new Caller(server.address);
      await caller.signIn(person.email, person.password);
      return { person, caller };
    },
  });
  await addDam(server.db, place.engineer.id, { name: 'A Dam of Others' });
  const note = { id: uuidv7(), anchor: { on: 'drawing' }, text: 'The toe drain was cleaned in October.' };
  await place.caller.post(`/nets/${place.netId}/notes`, note).expect(201);
});
afterEach(() => browser.checkConsole());
afterAll(async () => {
  await browser.close();
  await server.close();
});

describe('the register', () => {
  it('is searched, gone through and left by keys, and the address brings it back as it was', async () => {
    // The fixture's sheet has no picture.
    browser.expectConsoleError(answered(404));
    const page = await browser.newPage();
    await page.goto('/');
    await signIn(page, place.engineer);
    await page.getByRole('link', { name: 'Register of all drawings' }).click();
    const rows = page.getByRole('row').filter({ has: page.getByRole('link') });
    await page.getByText('3 found').waitFor();
    expect(await rows.getByRole('link').allTextContents()).toEqual([
      'HF-114 rev C',
      'Section B–B, chainage 212',
      'Full supply',
    ]);
    await page.keyboard.press('/');
    await page.keyboard.type('toe octo');
    await page.getByText('1 found').waitFor();
    expect(await page.locator('mark').allTextContents()).toEqual(['toe', 'October']);
    expect(new URL(page.url()).search).toBe('?q=toe+octo');
    await page.keyboard.press('ArrowDown');
    await page.keyboard.press('Enter');
    await page.waitForURL(`**/nets/${place.netId}`);
    await page.goBack();
    await page.getByText('1 found').waitFor();
    expect(await page.getByRole('searchbox').inputValue()).toBe('toe octo');
    await page.getByLabel('State').selectOption('accepted');
    await page.getByText('Nothing matches the search and the filters.').waitFor();
    await page.getByRole('button', { name: 'Clear search and filters' }).click();
    await page.getByText('3 found').waitFor();
    expect(await page.getByLabel('Dam').getByRole('option').allTextContents()).toEqual([
      'all',
      'Harrow Fen Dam',
    ]);
    await page.setViewportSize(PHONE);
    const [content, window] = await page.evaluate(() => {
      const { scrollWidth, clientWidth } = document.documentElement;
      return [scrollWidth, clientWidth];
    });
    expect(content).toBe(window);
    await page.context().close();
  });
});
