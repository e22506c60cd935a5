import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import { type BrowserContext, chromium } from 'playwright-core';
import { ensureWholeChromium } from '#server/start/chromium.mjs';
import { BROWSER_ARGS } from './browser.ts';

/** A browser with a profile on the disk, which can be ended without warning and opened again. */
export interface KeptBrowser {
  context: BrowserContext;
  /** Ends the browser's process at once: no page of it hears of it. */
  kill(): Promise<void>;
}

const LISTENING = /DevTools listening on (ws:\/\/\S+)/;

export async function openKeptBrowser(profileDir: string): Promise<KeptBrowser> {
  const child = spawn(
    await ensureWholeChromium(),
    [
      '--headless=new',
      '--remote-debugging-port=0',
      `--user-data-dir=${profileDir}`,
      '--window-size=1440,900',
      ...BROWSER_ARGS,
    ],
    { stdio: ['ignore', 'ignore', 'pipe'] },
  );
  const browser = await chromium.connectOverCDP(await listening(child));
  const context = browser.contexts()[0];
  if (!context) throw new Error('The browser has no window.');
  context.setDefaultTimeout(20_000);
  return {
    context,
    async kill() {
      const ended = once(child, 'exit');
      child.kill('SIGKILL');
      await ended;
    },
  };
}

function listening(child: ChildProcess): Promise<string> {
  return new Promise((resolve, reject) => {
    let said = '';
    child.stderr?.on('data', (bytes: Buffer) => {
      said += bytes.toString();
      const address = LISTENING.exec(said)?.[1];
      if (address) resolve(address);
    });
    child.on('exit', () => reject(new Error(`The browser ended: ${said}`)));
  });
}
