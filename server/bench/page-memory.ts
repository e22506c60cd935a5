import { readFileSync } from 'node:fs';
import type { Browser, CDPSession, Page } from 'playwright-core';
import { type Bench, rowOf } from './bench.ts';
import { dragAbout, MIDDLE, turnWheel } from './desk-in-browser.ts';
import { chooseVertex, withE600Desk } from './e600-desk.ts';

/** Ten minutes of use: rounds of some 33 actions with a look of two seconds after each. */
const ROUNDS = 8;
const LOOK_MS = 2000;
/** The first rounds also compile and fill caches; what grows after the second grows for good. */
const SETTLED = 2;
/** Then the desk is left alone for so long: the browser clears away after its page when it pauses, and not before. */
const PAUSE_MS = 20_000;
const MEGABYTE = 1e6;
const KIBIBYTE = 1024;

type Memory = { readonly heapMB: number; readonly processMB: number };

/** Resident bytes of the process that shows the page, its share of what all processes map included. */
async function processBytes(browser: Browser): Promise<number> {
  const session = await browser.newBrowserCDPSession();
  const { processInfo } = await session.send('SystemInfo.getProcessInfo');
  await session.detach();
  const resident = processInfo
    .filter(({ type }) => type === 'renderer')
    .map(({ id }) => /^VmRSS:\s+(\d+)/m.exec(readFileSync(`/proc/${id}/status`, 'utf8'))?.[1] ?? 0);
  // Chromium keeps an empty process ready besides.
  return Math.max(...resident.map(Number)) * KIBIBYTE;
}

async function memoryOf(browser: Browser, session: CDPSession): Promise<Memory> {
  await session.send('HeapProfiler.collectGarbage');
  const { metrics } = await session.send('Performance.getMetrics');
  const heap = metrics.find(({ name }) => name === 'JSHeapUsedSize')?.value ?? Number.NaN;
  return { heapMB: heap / MEGABYTE, processMB: (await processBytes(browser)) / MEGABYTE };
}

/**
 * Goes to another part of the sheet, traces a line there, takes it back, reads every form and moves a vertex, at the pace
 * of somebody who looks at what has come of each.
 */
async function workForAWhile(desk: Page): Promise<void> {
  const [x, y] = MIDDLE;
  const then = async (action: Promise<unknown>) => {
    await action;
    await desk.waitForTimeout(LOOK_MS);
  };
  await then(desk.keyboard.press('0'));
  await then(turnWheel(desk, 8));
  await then(dragAbout(desk, 'middle'));
  await then(desk.keyboard.press('e'));
  for (let place = 0; place < 8; place++) await then(desk.mouse.click(x + 24 * place, y + 9 * place));
  await then(desk.keyboard.press('Enter'));
  await then(desk.keyboard.press('Control+z'));
  await then(desk.keyboard.press('v'));
  const cells = titleCells(desk);
  const count = await cells.count();
  if (count < 2) throw new Error('The desk shows no title block.');
  for (let cell = 0; cell < count; cell++) {
    if ((await cells.nth(cell).getAttribute('title')) === LEADS_AWAY) continue;
    await then(cells.nth(cell).click());
    await desk.keyboard.press('Escape');
  }
  await then(turnWheel(desk, -8));
  await then(desk.keyboard.press('0'));
  const vertex = await chooseVertex(desk);
  await then(dragAbout(desk, 'left', vertex, [50, 30]));
  await then(desk.keyboard.press('Control+z'));
  await then(desk.keyboard.press('Escape'));
}

const LEADS_AWAY = 'Go to the dam';

/**
 * Each opens a form in the margin, the next in its place; one leads to the dam. What they say changes while the net is
 * read again. The signs by which a note is written on a cell have names of their own.
 */
const titleCells = (desk: Page) =>
  desk.getByRole('region', { name: 'Title block' }).locator('button[title]:not([aria-label])');

type Measured = { readonly rounds: Memory[]; readonly rested: Memory };

async function measured(browser: Browser, desk: Page, rounds: number): Promise<Measured> {
  const session = await desk.context().newCDPSession(desk);
  await session.send('Performance.enable');
  const after: Memory[] = [];
  for (let round = 0; round < rounds; round++) {
    await workForAWhile(desk);
    after.push(await memoryOf(browser, session));
  }
  await desk.waitForTimeout(PAUSE_MS);
  const rested = await memoryOf(browser, session);
  await desk.context().close();
  return { rounds: after, rested };
}

export const pageMemory: Bench = {
  name: 'page-memory',
  about:
    'the desk with an E-size sheet, 200 lines and 5,000 vertices after ten minutes of use and a pause: resident memory of its process, beside the desk opened and left alone; -in-use: the most after any of the rounds, without a pause; -heap: script’s memory, beside that after the second round',
  run: () =>
    withE600Desk(async ({ browser, open }) => {
      const alone = await measured(browser, await open(), 0);
      const used = await measured(browser, await open(), ROUNDS);
      const settled = used.rounds[SETTLED - 1];
      if (!settled) throw new Error('The memory was not measured.');
      const most = Math.max(...used.rounds.map(({ processMB }) => processMB));
      return [
        rowOf('page-memory', 'MB', [used.rested.processMB], [alone.rested.processMB]),
        rowOf('page-memory-in-use', 'MB', [most], [alone.rested.processMB]),
        rowOf('page-memory-heap', 'MB', [used.rested.heapMB], [settled.heapMB]),
      ];
    }),
};
