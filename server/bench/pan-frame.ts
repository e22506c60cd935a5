import { type Browser, type CDPSession, chromium, type Page } from 'playwright-core';
import { ensureChromium } from '#server/start/chromium.mjs';
import { a1GroupFour } from './a1-sheet.ts';
import { signInAtDam } from './api-client.ts';
import { type Bench, percentile, rowOf } from './bench.ts';
import { traceBenchNet } from './bench-net.ts';
import { type BenchStand, openBenchStand } from './bench-stand.ts';
import { mainThreadFrames, type TraceEvent } from './trace-frames.ts';
import { uploadSheet } from './upload-sheet.ts';

const VIEW = { width: 1440, height: 900 };
const STEPS = 120;
const RUNS = 3;

/**
 * The least such a frame can cost: the tiles of a view and 60 lines of 100 points on one plain canvas, moved with
 * the pointer, by script that does nothing else.
 */
const BARE_PAGE = `<!doctype html><body style="margin:0"><canvas width="${VIEW.width}" height="${VIEW.height}"></canvas><script>
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
    for (let line = 0; line < 60; line++) {
      view.beginPath();
      for (let point = 0; point < 100; point++) view.lineTo(point * 14, line * 15 + 40 * Math.sin(point / 9));
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

/** Pans to and fro with the middle of the view under the pointer. */
async function pan(page: Page): Promise<void> {
  const [x, y] = [VIEW.width / 2, VIEW.height / 2.6];
  await page.mouse.move(x, y);
  await page.mouse.down({ button: 'middle' });
  for (let step = 0; step < STEPS; step++) {
    const turn = (2 * Math.PI * step) / STEPS;
    await page.mouse.move(x + 300 * Math.sin(turn), y + 120 * Math.sin(2 * turn));
  }
  await page.mouse.up({ button: 'middle' });
}

/** From the whole sheet to a view that shows most lines and sharper tiles; then it must follow the pointer. */
async function zoomIn(page: Page): Promise<void> {
  const [x, y] = [VIEW.width / 2, VIEW.height / 2.6];
  await page.mouse.move(x, y);
  for (let notch = 0; notch < 8; notch++) await page.mouse.wheel(0, -100);
  await page.waitForLoadState('networkidle');
  const before = await page.screenshot();
  await page.mouse.down({ button: 'middle' });
  await page.mouse.move(x + 90, y + 60, { steps: 4 });
  const after = await page.screenshot();
  await page.mouse.move(x, y, { steps: 4 });
  await page.mouse.up({ button: 'middle' });
  if (after.equals(before)) throw new Error('The sheet did not follow the pointer.');
}

/** Main-thread milliseconds of a frame at the 95th percentile. */
async function panning(browser: Browser, page: Page): Promise<number> {
  const session = await browser.newBrowserCDPSession();
  const mainFrames = mainThreadFrames(await traced(session, () => pan(page)));
  await session.detach();
  if (mainFrames.length < STEPS / 4)
    throw new Error(`Only ${mainFrames.length} frames were drawn while panning.`);
  return percentile(mainFrames, 0.95);
}

async function openDesk(browser: Browser, stand: BenchStand): Promise<Page> {
  const client = await signInAtDam(stand);
  const sheet = await uploadSheet(client, await a1GroupFour(), 'a1.tif');
  const { netId } = await traceBenchNet(client, sheet.id);
  const context = await browser.newContext({ viewport: VIEW });
  const [name = '', value = ''] = client.cookie.split('=', 2);
  await context.addCookies([{ name, value, url: stand.address }]);
  const page = await context.newPage();
  await page.goto(`${stand.address}/nets/${netId}`, { waitUntil: 'networkidle' });
  await page.locator('canvas').first().waitFor();
  await zoomIn(page);
  return page;
}

export const panFrame: Bench = {
  name: 'pan-frame',
  about:
    'main thread for each frame, 95th percentile, panning an A1 sheet with 60 lines, beside a bare canvas',
  async run() {
    const stand = await openBenchStand({ pages: true });
    const browser = await chromium.launch({
      executablePath: await ensureChromium(),
      args: ['--no-sandbox', '--disable-gpu'],
    });
    try {
      const desk = await openDesk(browser, stand);
      const bare = await browser.newPage({ viewport: VIEW });
      await bare.setContent(BARE_PAGE);
      const [own, reference]: [number[], number[]] = [[], []];
      // The first of each is thrown away: it also fetches tiles and warms the compiler.
      for (let run = 0; run <= RUNS; run++) {
        await desk.bringToFront();
        own.push(await panning(browser, desk));
        await bare.bringToFront();
        reference.push(await panning(browser, bare));
      }
      return [rowOf('pan-frame', 'ms', own.slice(1), reference.slice(1))];
    } finally {
      await browser.close();
      await stand.close();
    }
  },
};
