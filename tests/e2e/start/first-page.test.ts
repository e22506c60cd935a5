import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openBrowser, PHONE, type TestBrowser } from '#tests/support/browser.ts';
import { type RealServer, startRealServer } from '#tests/support/real-server.ts';

let server: RealServer;
let browser: TestBrowser;

beforeAll(async () => {
  server = await startRealServer();
  browser = await openBrowser(server.address);
});
afterAll(async () => {
  await browser.close();
  await server.close();
});

describe('somebody who opens the address', () => {
  it.each([
    ['a desktop', {}],
    ['a phone', { viewport: PHONE, hasTouch: true, isMobile: true }],
  ])('is asked to sign in, on %s, without an error in the console', async (_where, options) => {
    const page = await browser.newPage(options);
    await page.goto('/');
    await page.getByRole('button', { name: 'Sign in' }).waitFor();
    expect(await page.title()).toMatch(/Tracehead/);
    const { scroll, client } = await page.evaluate(() => ({
      scroll: document.documentElement.scrollWidth,
      client: document.documentElement.clientWidth,
    }));
    expect(scroll).toBeLessThanOrEqual(client);
    browser.checkConsole();
  });

  it('finds the server and its page again after a restart', async () => {
    const page = await browser.newPage();
    // What is still being fetched when the server goes would rightly be an error.
    await page.goto('/sign-in', { waitUntil: 'networkidle' });
    await server.restart();
    await page.reload();
    await page.getByRole('button', { name: 'Sign in' }).waitFor();
    browser.checkConsole();
  });
});

describe('a script of an earlier build', () => {
  it('is answered with 404, and not with the page', async () => {
    const response = await fetch(`${server.address}/assets/gone-BfdP1DoR.js`);
    expect(response.status).toBe(404);
    expect(await response.json()).toMatchObject({ code: 'not-found' });
  });
});

describe('the watch over the console', () => {
  it('fails on an error that was not expected and lets an expected one pass', async () => {
    const page = await browser.newPage();
    await page.goto('/sign-in');
    const said = page.waitForEvent('console');
    await page.evaluate(() => console.error('something broke'));
    await said;
    expect(() => browser.checkConsole()).toThrow(/something broke/);
    browser.expectConsoleError(/is known to break/);
    const saidAgain = page.waitForEvent('console');
    await page.evaluate(() => console.error('this is known to break'));
    await saidAgain;
    expect(() => browser.checkConsole()).not.toThrow();
  });
});
