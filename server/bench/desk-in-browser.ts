import { type Browser, type BrowserContext, type CDPSession, chromium, type Page } from 'playwright-core';
import { ensureChromium } from '#server/start/chromium.mjs';
import type { ApiClient } from './api-client.ts';
import { percentile } from './bench.ts';
import type { BenchStand } from './bench-stand.ts';
import { type MainThread, mainThreadOf, type TraceEvent } from './trace-frames.ts';

export const VIEW = { width: 1440, height: 900 };
/** Over the sheet, clear of what lies on it. */
export const MIDDLE: readonly [number, number] = [VIEW.width / 2, VIEW.height / 2.6];
export const STEPS = 120;
/** A shared machine may be slow; what is measured is processor time. */
const PATIENCE_MS = 120_000;

/** Chromium with software rendering, as most virtual machines have it. */
export const openChromium = async (): Promise<Browser> =>
  chromium.launch({ executablePath: await ensureChromium(), args: ['--no-sandbox', '--disable-gpu'] });

/** A context in which the client is signed in. */
export async function signedInContext(
  browser: Browser,
  stand: Pick<BenchStand, 'address'>,
  client: Pick<ApiClient, 'cookie'>,
): Promise<BrowserContext> {
  const context = await browser.newContext({ viewport: VIEW });
  const [name = '', value = ''] = client.cookie.split('=', 2);
  await context.addCookies([{ name, value, url: stand.address }]);
  return context;
}

/** The desk with a net, the whole section in sight and everything fetched. */
export async function openDesk(
  browser: Browser,
  stand: Pick<BenchStand, 'address'>,
  client: Pick<ApiClient, 'cookie'>,
  netId: string,
): Promise<Page> {
  const page = await (await signedInContext(browser, stand, client)).newPage();
  await page.goto(`${stand.address}/nets/${netId}`, { waitUntil: 'networkidle', timeout: PATIENCE_MS });
  await page.locator('canvas').first().waitFor({ timeout: PATIENCE_MS });
  return page;
}

/**
 * The least a frame can cost: the tiles of a view and lines on one plain canvas, moved with the pointer, by script that
 * does nothing else.
 */
export async function openBareCanvas(browser: Browser, lines: number, points: number): Promise<Page> {
  const page = await browser.newPage({ viewport: VIEW });
  await page.setContent(barePage(lines, points));
  return page;
}

const barePage = (
  lines: number,
  points: number,
) => `<!doctype html><body style="margin:0"><canvas width="${VIEW.width}" height="${VIEW.height}"></canvas><script>
  const view = document.querySelector('canvas').getContext('2d');
  const tile = document.createElement('canvas');
  tile.width = tile.height = 512;
  const ink = tile.getContext('2d');
  ink.fillStyle = '#fff'; ink.fillRect(0, 0, 512, 512);
  for (let n = 0; n < 200; n++) { ink.moveTo((n * 83) % 512, (n * 47) % 512); ink.lineTo((n * 31) % 512, (n * 97) % 512); }
  ink.stroke();
  let [x, y, asked] = [0, 0, false];
  function draw() {
    asked = false;
    view.setTransform(1, 0, 0, 1, x % 512, y % 512);
    for (let column = -1; column < 4; column++) for (let row = -1; row < 3; row++) view.drawImage(tile, column * 512, row * 512);
    view.setTransform(1, 0, 0, 1, x, y);
    for (let line = 0; line < ${lines}; line++) {
      view.beginPath();
      for (let point = 0; point < ${points}; point++) view.lineTo(point * ${1400 / points}, line * ${900 / lines} + 40 * Math.sin(point / 9));
      view.stroke();
    }
  }
  addEventListener('pointermove', (event) => { x += event.movementX; y += event.movementY; if (!asked) { asked = true; requestAnimationFrame(draw); } });
  draw();
</script>`;

async function traced(session: CDPSession, work: () => Promise<void>): Promise<TraceEvent[]> {
  const events: TraceEvent[] = [];
  session.on('Tracing.dataCollected', ({ value }) => events.push(...(value as unknown as TraceEvent[])));
  await session.send('Tracing.start', {
    transferMode: 'ReportEvents',
    traceConfig: { includedCategories: ['devtools.timeline', 'toplevel', '__metadata'] },
  });
  await work();
  const complete = new Promise((resolve) => session.once('Tracing.tracingComplete', resolve));
  await session.send('Tracing.end');
  await complete;
  return events;
}

/** What the page's main thread did while `work` went on, which must have brought frames. */
export async function watched(page: Page, work: () => Promise<void>): Promise<MainThread> {
  await page.bringToFront();
  const browser = page.context().browser();
  if (browser === null) throw new Error('The page has no browser.');
  const session = await browser.newBrowserCDPSession();
  const thread = mainThreadOf(await traced(session, work));
  await session.detach();
  if (thread.work.length < STEPS / 4) throw new Error(`Only ${thread.work.length} frames were drawn.`);
  return thread;
}

/** Of each frame at the 95th percentile. */
export const workP95 = ({ work }: MainThread) => percentile(work, 0.95);
export const everyP95 = ({ every }: MainThread) => percentile(every, 0.95);

/** Moves a pressed pointer to and fro, in a lying figure of eight. */
export async function dragAbout(
  page: Page,
  button: 'left' | 'middle',
  [x, y] = MIDDLE,
  [across, down] = [300, 120],
): Promise<void> {
  await page.mouse.move(x, y);
  await page.mouse.down({ button });
  // It ends where it began, so that the next drag meets the same place.
  for (let step = 0; step <= STEPS; step++) {
    const turn = (2 * Math.PI * step) / STEPS;
    await page.mouse.move(x + across * Math.sin(turn), y + down * Math.sin(2 * turn));
  }
  await page.mouse.up({ button });
}

/** Turns the wheel over the middle of the sheet; `notches` towards the sheet, or with a minus away from it. */
export async function turnWheel(page: Page, notches: number): Promise<void> {
  await page.mouse.move(...MIDDLE);
  for (let notch = 0; notch < Math.abs(notches); notch++)
    await page.mouse.wheel(0, -100 * Math.sign(notches));
}

/** The sheet must follow the pointer, or what is measured is nothing. */
export async function expectToFollow(page: Page): Promise<void> {
  const [x, y] = MIDDLE;
  await page.waitForLoadState('networkidle');
  const before = await page.screenshot();
  await page.mouse.move(x, y);
  await page.mouse.down({ button: 'middle' });
  await page.mouse.move(x + 90, y + 60, { steps: 4 });
  const after = await page.screenshot();
  await page.mouse.move(x, y, { steps: 4 });
  await page.mouse.up({ button: 'middle' });
  if (after.equals(before)) throw new Error('The sheet did not follow the pointer.');
}
