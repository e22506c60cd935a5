import type { Browser, Page } from 'playwright-core';
import { signInAtDam } from './api-client.ts';
import { E600_NET, traceBenchNet, vertexOnSheet } from './bench-net.ts';
import { openBenchStand } from './bench-stand.ts';
import { openChromium, openDesk } from './desk-in-browser.ts';
import { groupFour } from './large-sheet.ts';
import { E_600 } from './line-work.ts';
import { uploadSheet } from './upload-sheet.ts';

let scan: Promise<Buffer> | null = null;
/** Drawing 560 million pixels takes seconds; the benches of one run share the file. */
function e600Scan(): Promise<Buffer> {
  scan ??= groupFour(E_600);
  return scan;
}

export type E600Desk = {
  readonly browser: Browser;
  /** Opens the desk in a context of its own. */
  open(): Promise<Page>;
};

/** An E-size sheet at 600 dpi with 200 lines and 5,000 vertices, for as long as `work` takes. */
export async function withE600Desk<T>(work: (desk: E600Desk) => Promise<T>): Promise<T> {
  const stand = await openBenchStand({ pages: true });
  const browser = await openChromium();
  try {
    const client = await signInAtDam(stand);
    const sheet = await uploadSheet(client, await e600Scan(), 'e600.tif');
    const { netId } = await traceBenchNet(client, sheet.id, E600_NET);
    return await work({ browser, open: () => openDesk(browser, stand, client, netId) });
  } finally {
    await browser.close();
    await stand.close();
  }
}

/** Of 120 equipotentials and 25 vertices of each, one in the midst of the net. */
const CHOSEN = vertexOnSheet(E600_NET, 72, 13);
/** Zoom at which a vertex is dragged: a hundred lines are in sight and those beside the one dragged stand apart. */
const NEAR_NOTCHES = 9;

/** Goes near to a vertex in the midst of the net, chooses its line, and gives the vertex's place on screen. */
export async function chooseVertex(desk: Page): Promise<Place> {
  await desk.keyboard.press('v');
  for (let notch = 0; notch < NEAR_NOTCHES; notch++) {
    await desk.mouse.move(...(await onScreen(desk, CHOSEN)));
    await desk.mouse.wheel(0, -100);
    await nextFrames(desk);
  }
  const at = await onScreen(desk, CHOSEN);
  await desk.mouse.click(...at);
  await desk.waitForLoadState('networkidle');
  return at;
}

type Place = readonly [number, number];

/**
 * Where a place of the sheet is on screen. The sheet's layer tells, as the browser has it: the first child of the first
 * layer is the sheet's whole raster.
 */
async function onScreen(desk: Page, [x, y]: Place): Promise<Place> {
  const paper = await desk.evaluate(() => {
    const sheet = document.querySelector('[role=application] [aria-hidden=true] > div');
    const box = sheet?.getBoundingClientRect();
    return box ? [box.left, box.top, box.width, box.height] : null;
  });
  if (paper === null) throw new Error('The desk shows no sheet.');
  const [left = 0, top = 0, width = 0, height = 0] = paper;
  return [left + (x / E_600.width) * width, top + (y / E_600.height) * height];
}

const nextFrames = (desk: Page) =>
  desk.evaluate(() => new Promise((done) => requestAnimationFrame(() => requestAnimationFrame(done))));
