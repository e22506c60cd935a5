import { spawn } from 'node:child_process';
import { once } from 'node:events';
import path from 'node:path';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoId } from '#server/demo/demo-ids.ts';
import { DEMO_PASSWORD, engineer } from '#server/demo/demo-people.ts';
import { axeFaults } from '#tests/support/axe.ts';
import { openBrowser, PHONE, type TestBrowser } from '#tests/support/browser.ts';
import { Caller } from '#tests/support/caller.ts';
import { pdfDrawing } from '#tests/support/drawing-files.ts';
import {
  faultsAt320,
  faultsAtTwiceTheText,
  faultsOfLargerLetters,
  focusFaults,
} from '#tests/support/layout-faults.ts';
import { projectRoot, type RealServer, startRealServer } from '#tests/support/real-server.ts';
import { PHONE_STATES, STATES, VECTORS } from '#tests/support/screen-states.ts';
import { PUBLIC_SCREENS, SCREENS_OF, type Screen, signInToDemo } from '#tests/support/screens.ts';

let server: RealServer;
let browser: TestBrowser;
/** One page for each person, so that the product is loaded once and not for every screen. */
const pages = new Map<string, Page>();

/** The demo's sheets are drawn and tiled here, which a shared machine takes its time for. */
const DEMO_MS = 300_000;

beforeAll(async () => {
  server = await startRealServer();
  await seedDemo();
  await addVectors();
  browser = await openBrowser(server.address);
  // Pages that are not there, and a sign-in that is refused, are screens too.
  browser.expectConsoleError(/status of 40[0134]/);
}, DEMO_MS);
afterAll(async () => {
  await browser?.close();
  await server?.close();
});

async function seedDemo(): Promise<void> {
  const seed = path.join(projectRoot, 'server', 'scripts', 'seed.ts');
  const child = spawn(process.execPath, ['--import', 'tsx', seed], { env: server.env, stdio: 'inherit' });
  const [code] = await once(child, 'exit');
  if (code !== 0) throw new Error('The demo was not made.');
}

async function addVectors(): Promise<void> {
  const caller = new Caller(server.address);
  await caller.signIn(engineer.email, DEMO_PASSWORD);
  const bytes = pdfDrawing([VECTORS.page]);
  const { body } = await caller
    .post(`/dams/${demoId(10)}/drawings`)
    .attach('file', bytes, VECTORS.name)
    .expect(201);
  const state = async () => (await caller.get(`/drawings/${body.id}`)).body.job.state;
  while ((await state()) !== 'done') await new Promise((resolve) => setTimeout(resolve, 200));
}

async function pageOf(person: string | null): Promise<Page> {
  const kept = pages.get(person ?? '');
  if (kept) return kept;
  const page = await browser.newPage();
  if (person !== null) await signInToDemo(page, person);
  pages.set(person ?? '', page);
  return page;
}

async function opened(person: string | null, screen: Screen): Promise<Page> {
  const page = await pageOf(person);
  if (!screen.goesOn) await page.goto(screen.path);
  await screen.open(page);
  return page;
}

const named = (screens: readonly Screen[]) => screens.map((screen) => [screen.name, screen] as const);
const all = [
  { person: null, screens: PUBLIC_SCREENS },
  ...SCREENS_OF,
  { person: engineer.email, screens: STATES },
];

async function layoutFaults(page: Page, { name, covers }: Screen): Promise<string[]> {
  // A dialog or menu that covers the page: the page below is gone through in a state of its own.
  if (covers) return [];
  return [
    ...(await faultsAt320(page, name)),
    ...(await faultsAtTwiceTheText(page, name)),
    ...(await focusFaults(page, name)),
  ];
}

describe.each(all)('to $person', ({ person, screens }) => {
  it.each(named(screens))('%s has no fault', async (_name, screen) => {
    const page = await opened(person, screen);
    const faults = [...(await axeFaults(page, screen.name)), ...(await layoutFaults(page, screen))];
    expect(faults).toEqual([]);
  });
});

/** The engineer's pages as they open; what is pressed in them stands elsewhere in another layout. */
const PAGES = SCREENS_OF.flatMap(({ person, screens }) =>
  person === engineer.email ? screens.filter(({ name, goesOn }) => !goesOn && !name.includes(',')) : [],
);

/** Set by the browser's own setting, letters do to a page what its zoom does: it is laid out for a narrower window. */
describe.each([24, 32])('with letters of %i px set in the browser', (lettersPx) => {
  it('nothing of a screen is cut off, covered or pushed aside, and the tools of the desk fit', async () => {
    const larger = await openBrowser(server.address, { lettersPx });
    const page = await larger.newPage();
    await signInToDemo(page, engineer.email);
    const faults: string[] = [];
    for (const screen of PAGES) {
      await page.goto(screen.path);
      await screen.open(page);
      // With a tool in hand that draws, the palette shows the ways of drawing as well.
      if (screen.name === 'desk') await page.keyboard.press('e');
      faults.push(...(await faultsOfLargerLetters(page, screen.name)));
    }
    await larger.browser.close();
    expect(faults).toEqual([]);
  });
});

describe('on a telephone', () => {
  it.each(named(PHONE_STATES))('%s has no fault', async (_name, screen) => {
    const page = await pageOf(engineer.email);
    await page.setViewportSize(PHONE);
    if (!screen.goesOn) await page.goto(screen.path);
    await screen.open(page);
    expect(await axeFaults(page, screen.name)).toEqual([]);
  });
});
