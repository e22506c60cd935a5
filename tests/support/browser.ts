import { type Browser, type BrowserContextOptions, chromium, type Page } from 'playwright-core';
import { ensureChromium } from '#server/start/chromium.mjs';

export const BROWSER_ARGS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

export const DESKTOP = { width: 1440, height: 900 };
export const PHONE = { width: 390, height: 844 };

export interface TestBrowser {
  browser: Browser;
  /** A page in a browser profile of its own, as for another person. */
  newPage(options?: BrowserContextOptions): Promise<Page>;
  /** From now on a console error that matches is not a fault. */
  expectConsoleError(pattern: RegExp): void;
  /** Fails when a page wrote an unexpected error to its console or threw one; forgets what it has reported. */
  checkConsole(): void;
  /** Closes the browser, after `checkConsole`. */
  close(): Promise<void>;
}

/**
 * Debian's Chromium, headless. `baseURL` lets pages be opened by path; `lettersPx` are letters as somebody has set them in
 * the browser, which has 16 of itself.
 */
export async function openBrowser(
  baseURL: string,
  { lettersPx }: { lettersPx?: number } = {},
): Promise<TestBrowser> {
  const browser = await chromium.launch({
    executablePath: await ensureChromium(),
    args: lettersPx === undefined ? BROWSER_ARGS : [...BROWSER_ARGS, settingsWith(lettersPx)],
  });
  const watch = consoleWatch();
  return {
    browser,
    async newPage(options = {}) {
      const context = await browser.newContext({ baseURL, viewport: DESKTOP, locale: 'en-GB', ...options });
      context.setDefaultTimeout(15_000);
      const page = await context.newPage();
      watch.follow(page);
      // Further pages of the same profile, such as a second tab, are watched too.
      context.on('page', (other) => watch.follow(other));
      return page;
    },
    expectConsoleError: watch.expect,
    checkConsole: watch.check,
    async close() {
      await browser.close();
      watch.check();
    },
  };
}

/** The last of several such arguments holds: a headless browser is given its mouse by the same one. */
function settingsWith(lettersPx: number): string {
  const mouse = 'primaryHoverType=2,availableHoverTypes=2,primaryPointerType=4,availablePointerTypes=4';
  return `--blink-settings=${mouse},defaultFontSize=${lettersPx}`;
}

function consoleWatch() {
  const errors: string[] = [];
  const expected: RegExp[] = [];
  return {
    follow(page: Page) {
      page.on('console', (message) => {
        if (message.type() === 'error') errors.push(`${message.text()} (${message.location().url})`);
      });
      page.on('pageerror', (error) => errors.push(`uncaught: ${error.message}`));
    },
    expect(pattern: RegExp) {
      expected.push(pattern);
    },
    check() {
      const faults = errors.splice(0).filter((error) => !expected.some((pattern) => pattern.test(error)));
      if (faults.length > 0) throw new Error(`The browser's console has errors:\n${faults.join('\n')}`);
    },
  };
}
