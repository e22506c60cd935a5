import type { Page } from 'playwright-core';
import { type Bench, type BenchRow, rowOf } from './bench.ts';
import {
  dragAbout,
  everyP95,
  expectToFollow,
  MIDDLE,
  openBareCanvas,
  STEPS,
  turnWheel,
  watched,
  workP95,
} from './desk-in-browser.ts';
import { chooseVertex, withE600Desk } from './e600-desk.ts';
import type { MainThread } from './trace-frames.ts';

const RUNS = 3;
const LINES = 200;
const POINTS_PER_LINE = 25;

/** Both sides in turn; the first of each is thrown away: it also fetches tiles and warms the compiler. */
async function inTurn(
  own: () => Promise<MainThread>,
  reference: () => Promise<MainThread>,
): Promise<{ own: MainThread[]; reference: MainThread[] }> {
  const measured: { own: MainThread[]; reference: MainThread[] } = { own: [], reference: [] };
  for (let run = 0; run <= RUNS; run++) {
    measured.own.push(await own());
    measured.reference.push(await reference());
  }
  return { own: measured.own.slice(1), reference: measured.reference.slice(1) };
}

/** Work for each frame, how often frames came, and the longest task. */
function rowsOf(
  name: string,
  { own, reference }: { own: MainThread[]; reference: MainThread[] },
): BenchRow[] {
  const row = (ending: string, of: (thread: MainThread) => number) =>
    rowOf(`${name}${ending}`, 'ms', own.map(of), reference.map(of));
  return [row('', workP95), row('-every', everyP95), row('-longest-task', ({ longestTask }) => longestTask)];
}

/** Zooms in and out again by small steps, as a trackpad does. */
async function zoomAbout(desk: Page): Promise<void> {
  await desk.mouse.move(...MIDDLE);
  for (let step = 0; step < STEPS; step++) await desk.mouse.wheel(0, step < STEPS / 2 ? -25 : 25);
}

export const panFrameE600: Bench = {
  name: 'pan-frame-e600',
  about:
    'an E-size sheet at 600 dpi with 200 lines and 5,000 vertices, panned and (-zoom) zoomed: main thread for each frame and from frame to frame, 95th percentile, and longest task, beside a bare canvas',
  run: () =>
    withE600Desk(async ({ browser, open }) => {
      const desk = await open();
      await turnWheel(desk, 6);
      await expectToFollow(desk);
      const bare = await openBareCanvas(browser, LINES, POINTS_PER_LINE);
      const onBare = () => watched(bare, () => dragAbout(bare, 'middle'));
      return [
        ...rowsOf(
          'pan-frame-e600',
          await inTurn(() => watched(desk, () => dragAbout(desk, 'middle')), onBare),
        ),
        ...rowsOf('pan-frame-e600-zoom', await inTurn(() => watched(desk, () => zoomAbout(desk)), onBare)),
      ];
    }),
};

export const dragVertex: Bench = {
  name: 'drag-vertex',
  about:
    'a vertex in the midst of 5,000 dragged over the same sheet, the net read again in the worker when it is let go: as pan-frame-e600',
  run: () =>
    withE600Desk(async ({ browser, open }) => {
      const desk = await open();
      const at = await chooseVertex(desk);
      const bare = await openBareCanvas(browser, LINES, POINTS_PER_LINE);
      const dragged = () => watched(desk, () => dragAbout(desk, 'left', at, [60, 40]));
      await expectToBeChanged(desk, dragged);
      return rowsOf(
        'drag-vertex',
        await inTurn(dragged, () => watched(bare, () => dragAbout(bare, 'middle'))),
      );
    }),
};

/** What is dragged must be a vertex, or what is measured is nothing: letting go is then a step that can be undone. */
async function expectToBeChanged(desk: Page, drag: () => Promise<unknown>): Promise<void> {
  const undo = desk.getByRole('button', { name: 'Undo', exact: true });
  if (await undo.isEnabled()) throw new Error('There is something to undo before anything was dragged.');
  await drag();
  if (!(await undo.isEnabled())) throw new Error('No vertex was dragged.');
}
