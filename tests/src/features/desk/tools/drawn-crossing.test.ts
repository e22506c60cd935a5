import { afterEach, describe, expect, it, vi } from 'vitest';
import { createCrossingClient } from '#client/features/desk/model/crossing-client.ts';
import type { CrossingAnswer, CrossingQuestion } from '#client/features/desk/model/crossing-worker.ts';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import { changeSettingOutAids } from '#client/features/desk/model/setting-out-aids.ts';
import { createToolHost } from '#client/features/desk/tools/tool-host.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { entitiesOf } from '#shared/contract/document.ts';
import { countedIds, documentWith } from '#tests/support/desk/desk-fixture.ts';
import { NO_KEYS } from '#tests/support/desk/tool-hand.ts';

const SHEET = {
  id: 's',
  widthPx: 1000,
  heightPx: 700,
  tiles: { rendition: 'base', tileSizePx: 512, maxZoom: 1, format: 'webp' },
} as const;
const VIEW = { zoom: 1, reachPx: 8, balloons: [] };

/** A desk over a scan on which two lines cross at one place; the worker answers when told to. */
function deskOver(crossing: [number, number] | null) {
  const asked: CrossingQuestion[] = [];
  const worker = {
    onmessage: null as ((event: MessageEvent<CrossingAnswer>) => void) | null,
    onerror: null as ((event: ErrorEvent) => void) | null,
    postMessage: (question: CrossingQuestion) => void asked.push(question),
    terminate: () => {},
  };
  const crossings = createCrossingClient(SHEET, () => worker);
  const store = createDeskStore({ document: documentWith({}) }, { newId: countedIds() });
  const host = createToolHost(store, null, crossings);
  store.setTool('knownPoint');
  return {
    asked,
    crossings,
    answer: () =>
      worker.onmessage?.({ data: { number: asked.at(-1)!.number, at: crossing } } as MessageEvent),
    fail: () => worker.onerror?.({ preventDefault() {} } as ErrorEvent),
    move: (x: number, y: number) => host.overlay(sheetPx(x, y), NO_KEYS, VIEW),
    click(x: number, y: number, keys = NO_KEYS) {
      for (const type of ['press', 'release'] as const) host.handle({ type, at: sheetPx(x, y), keys }, VIEW);
      host.handle({ type: 'click', at: sheetPx(x, y), keys, count: 1 }, VIEW);
    },
    drag(from: [number, number], to: [number, number]) {
      host.handle({ type: 'press', at: sheetPx(...from), keys: NO_KEYS }, VIEW);
      host.handle({ type: 'move', at: sheetPx(...to), keys: NO_KEYS }, VIEW);
      host.overlay(sheetPx(...to), NO_KEYS, VIEW);
    },
    letGo: (x: number, y: number) => host.handle({ type: 'release', at: sheetPx(x, y), keys: NO_KEYS }, VIEW),
    points: () => entitiesOf(store.getState().document, 'knownPoint').map(({ value }) => value.at),
  };
}

afterEach(() => {
  changeSettingOutAids({ takesCrossings: true });
  vi.useRealTimers();
});

/** What waits for an answer is done in the turn after it. */
const nextTurn = () => new Promise((resolve) => setImmediate(resolve));

describe('a known point near two drawn lines', () => {
  it('waits for the crossing there when it is clicked before that is known', async () => {
    const desk = deskOver([204.37, 301.82]);
    desk.move(190, 290);
    desk.click(200, 300);
    // The mouse has gone on; what was clicked is asked about before what it is over now.
    desk.move(500, 500);
    expect(desk.points()).toEqual([]);
    desk.answer();
    expect(desk.asked.map(({ about }) => about)).toEqual([
      [190, 290],
      [200, 300],
    ]);
    desk.answer();
    await nextTurn();
    expect(desk.points()).toEqual([[204.37, 301.82]]);
  });

  it('is set where it was clicked where no lines cross, at once when that is known', async () => {
    const desk = deskOver(null);
    desk.click(200, 300);
    desk.answer();
    await nextTurn();
    expect(desk.points()).toEqual([[200, 300]]);
    desk.move(240, 300);
    desk.answer();
    desk.click(240, 300);
    expect(desk.points()).toHaveLength(2);
  });

  it('does not wait for ever, nor once the hand goes on', () => {
    vi.useFakeTimers();
    const desk = deskOver([204.37, 301.82]);
    desk.click(200, 300);
    desk.click(300, 300);
    expect(desk.points()).toEqual([[200, 300]]);
    return vi.advanceTimersByTimeAsync(1000).then(() =>
      expect(desk.points()).toEqual([
        [200, 300],
        [300, 300],
      ]),
    );
  });

  it('goes to their crossing, which is shown before the click', () => {
    const desk = deskOver([204.37, 301.82]);
    desk.move(200, 300);
    desk.answer();
    expect(desk.move(201, 300).drawnCrossing).toEqual([204.37, 301.82]);
    desk.click(201, 300);
    expect(desk.points()).toEqual([[204.37, 301.82]]);
  });

  it('stays where it was clicked with Alt, with the aid off, and beyond the reach', async () => {
    const desk = deskOver([204.37, 301.82]);
    desk.move(200, 300);
    desk.answer();
    desk.click(200, 300, { ...NO_KEYS, alt: true });
    desk.click(180, 300);
    desk.answer();
    await nextTurn();
    changeSettingOutAids({ takesCrossings: false });
    desk.click(206, 320);
    expect(desk.points()).toEqual([
      [200, 300],
      [180, 300],
      [206, 320],
    ]);
  });

  it('goes there too when it is dragged, known before or not', async () => {
    const desk = deskOver([204.37, 301.82]);
    desk.click(400, 400, { ...NO_KEYS, alt: true });
    desk.drag([401, 400], [202, 300]);
    desk.answer();
    desk.letGo(202, 300);
    expect(desk.points()).toEqual([[204.37, 301.82]]);

    const quick = deskOver([204.37, 301.82]);
    quick.click(400, 400, { ...NO_KEYS, alt: true });
    quick.drag([401, 400], [203, 300]);
    quick.letGo(202, 300);
    quick.answer();
    quick.answer();
    await nextTurn();
    expect(quick.points()).toEqual([[204.37, 301.82]]);
  });

  it('is asked about one place at a time, the newest next, and a worker that fails is no answer', () => {
    const desk = deskOver(null);
    desk.move(10, 10);
    desk.move(20, 20);
    desk.move(30, 30);
    expect(desk.asked.map(({ about }) => about)).toEqual([[10, 10]]);
    desk.answer();
    expect(desk.asked.map(({ about }) => about)).toEqual([
      [10, 10],
      [30, 30],
    ]);
    desk.fail();
    expect(desk.crossings.newest()!.at).toBeNull();
  });
});
