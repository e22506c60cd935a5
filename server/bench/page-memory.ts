import { readFileSync } from 'node:fs';
import type { Browser, CDPSession, Page } from 'playwright-core';
import { type Bench, rowOf } from './bench.ts';
import { dragAbout, MIDDLE, turnWheel } from './desk-in-browser.ts';
import { chooseVertex, withE600Desk } from './e600-desk.ts';

/** Ten minutes of use: an action about every two seconds, one after the other without rest. */
const CYCLES = 12;
/** The first cycles also compile and fill caches; what grows after the second grows for good. */
const SETTLED = 2;
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

/** Goes to another part of the sheet, traces a line there, takes it back, moves a vertex and reads every form. */
async function workForAWhile(desk: Page): Promise<void> {
  const [x, y] = MIDDLE;
  await desk.keyboard.press('0');
  await turnWheel(desk, 8);
  await dragAbout(desk, 'middle');
  await desk.keyboard.press('e');
  for (let place = 0; place < 8; place++) await desk.mouse.click(x + 24 * place, y + 9 * place);
  await desk.keyboard.press('Enter');
  await desk.keyboard.press('Control+z');
  await desk.keyboard.press('v');
  await openEveryForm(desk);
  await turnWheel(desk, -8);
  await desk.keyboard.press('0');
  await dragAbout(desk, 'left', await chooseVertex(desk), [50, 30]);
  await desk.keyboard.press('Control+z');
  await desk.keyboard.press('Escape');
}

const LEADS_AWAY = 'Go to the dam';

/**
 * Each cell of the title block opens a form in the margin, the next in its place; one leads to the dam. The signs by
 * which a note is written on a cell have names of their own.
 */
async function openEveryForm(desk: Page): Promise<void> {
  const block = desk.getByRole('region', { name: 'Title block' });
  const cells = block.locator('button[title]:not([aria-label])');
  // Cells are drawn anew while the net is read again, so that each is found by what it opens.
  const titles = await cells.evaluateAll((all) => all.map((cell) => cell.getAttribute('title') ?? ''));
  if (titles.length < 2) throw new Error('The desk shows no title block.');
  for (const title of new Set(titles.filter((each) => each !== LEADS_AWAY))) {
    await block.getByTitle(title, { exact: true }).first().click();
    await desk.keyboard.press('Escape');
  }
}

export async function measured(browser: Browser, desk: Page, cycles: number): Promise<Memory[]> {
  const session = await desk.context().newCDPSession(desk);
  await session.send('Performance.enable');
  const samples: Memory[] = [];
  for (let cycle = 0; cycle < cycles; cycle++) {
    await workForAWhile(desk);
    samples.push(await memoryOf(browser, session));
  }
  if (cycles === 0) samples.push(await memoryOf(browser, session));
  await desk.context().close();
  return samples;
}

export const pageMemory: Bench = {
  name: 'page-memory',
  about:
    'the desk with an E-size sheet, 200 lines and 5,000 vertices after as many actions as ten minutes bring: resident memory of its process, beside the desk opened and left alone; -heap: script’s memory, beside that after the second of twelve rounds',
  run: () =>
    withE600Desk(async ({ browser, open }) => {
      const [alone] = await measured(browser, await open(), 0);
      const used = await measured(browser, await open(), CYCLES);
      const last = used.at(-1);
      const settled = used[SETTLED - 1];
      if (!alone || !last || !settled) throw new Error('The memory was not measured.');
      return [
        rowOf('page-memory', 'MB', [last.processMB], [alone.processMB]),
        rowOf('page-memory-heap', 'MB', [last.heapMB], [settled.heapMB]),
      ];
    }),
};
