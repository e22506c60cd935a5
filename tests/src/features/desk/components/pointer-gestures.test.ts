import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { attachGestures } from '#client/features/desk/components/pointer-gestures.ts';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import { asksForLine, pressSets } from '#client/features/desk/model/press-meaning.ts';
import { selectOne } from '#client/features/desk/model/selection.ts';
import { createViewStore } from '#client/features/desk/model/view-store.ts';
import { sheetZoom, toSheet } from '#client/features/desk/model/viewport.ts';
import { createToolHost } from '#client/features/desk/tools/tool-host.ts';
import { type SheetPx, screenPx } from '#shared/compute/frames.ts';
import { entitiesOf } from '#shared/contract/document.ts';
import { countedIds, documentWith, LINE_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';

/** An element as far as gestures need one: listeners, a box at the window's corner, focus and capture. */
class Glass extends EventTarget {
  readonly clientLeft = 0;
  readonly clientTop = 0;
  getBoundingClientRect = () => ({ left: 0, top: 0 });
  focus() {}
  setPointerCapture() {}
}

type Kind = 'mouse' | 'touch' | 'pen';
type Told = {
  pointer: SheetPx | null;
  /** What an edit asked for would do there. */
  sketches: string[];
  finger: readonly [number, number] | null;
  panning: boolean;
};

function deskUnderGlass() {
  const glass = new Glass();
  const line = tracedLine([
    [200, 200],
    [300, 500],
  ]);
  const opened = { document: documentWith({ [LINE_A]: line }), changeNumber: 1 };
  const store = createDeskStore(opened, { newId: countedIds() });
  const views = createViewStore({ widthPx: 1000, heightPx: 700 }, null);
  views.resize(1032, 732);
  const told: Told = { pointer: null, sketches: [], finger: null, panning: false };
  const host = createToolHost(store);
  const end = attachGestures({
    element: glass as unknown as HTMLElement,
    views,
    host,
    balloons: () => [],
    places: () => pressSets(store.getState()),
    pointsAt: () => asksForLine(store.getState()),
    onPointer: (at, keys, view) => {
      told.pointer = at;
      told.sketches =
        at === null ? [] : (host.overlay(at, keys, view).sketches ?? []).map(({ kind }) => kind);
    },
    onPanning: (panning) => {
      told.panning = panning;
    },
    onFinger: (at) => {
      told.finger = at;
    },
  });
  let now = 0;
  const send = (type: string, kind: Kind, x: number, y: number, more: Record<string, unknown> = {}) => {
    const event = new Event(`pointer${type}`, { cancelable: true });
    const facts = {
      pointerType: kind,
      pointerId: kind === 'touch' ? 1 : 99,
      button: 0,
      width: 20,
      height: 20,
      clientX: x,
      clientY: y,
      shiftKey: false,
      altKey: false,
      ctrlKey: false,
      metaKey: false,
      timeStamp: now,
      ...more,
    };
    for (const [name, value] of Object.entries(facts)) Object.defineProperty(event, name, { value });
    glass.dispatchEvent(event);
  };
  const after = (ms: number) => {
    now += ms;
    vi.advanceTimersByTime(ms);
  };
  const points = () =>
    entitiesOf(store.getState().document, 'readingPoint').map(({ value }) =>
      value.place.on === 'sheet' ? value.place.at : null,
    );
  const lineOf = () => entitiesOf(store.getState().document, 'line')[0]?.value.points;
  const view = () => views.getState().view;
  const sheetAt = (x: number, y: number) => toSheet(view(), screenPx(x, y));
  return { store, views, told, end, send, after, points, lineOf, view, sheetAt };
}

let desk: ReturnType<typeof deskUnderGlass>;
beforeEach(() => {
  vi.useFakeTimers();
  desk = deskUnderGlass();
});
afterEach(() => {
  desk.end();
  vi.useRealTimers();
});

describe('one finger', () => {
  it('pans, and places nothing when it is lifted', () => {
    desk.store.setTool('readingPoint');
    desk.views.zoom(2);
    const before = desk.view().origin;
    desk.send('down', 'touch', 500, 300);
    desk.after(40);
    desk.send('move', 'touch', 540, 300);
    expect(desk.told.panning).toBe(true);
    desk.send('move', 'touch', 560, 310);
    desk.send('up', 'touch', 560, 310);
    expect(desk.view().origin[0] - before[0]).toBeCloseTo(-60 / desk.view().zoom, 0);
    expect(desk.told.panning).toBe(false);
    expect(desk.points()).toEqual([]);
  });

  it('places with a tap where it was lifted', () => {
    desk.store.setTool('readingPoint');
    const [x, y] = desk.sheetAt(400, 420);
    desk.send('down', 'touch', 401, 418);
    desk.after(80);
    desk.send('up', 'touch', 400, 420);
    expect(desk.points()).toEqual([[x, y].map((each) => Math.round(each * 100) / 100)]);
    expect(desk.told.finger).toBeNull();
  });

  it('does not move a vertex of the chosen line while it pans over it', () => {
    desk.store.select(selectOne('line', LINE_A));
    const before = desk.lineOf();
    const at = [16 + 200 * sheetZoom(desk.view()), 16 + 200 * sheetZoom(desk.view())] as const;
    desk.send('down', 'touch', at[0], at[1]);
    desk.after(50);
    desk.send('move', 'touch', at[0] + 60, at[1]);
    desk.send('up', 'touch', at[0] + 60, at[1]);
    expect(desk.lineOf()).toEqual(before);
  });
});

describe('a finger that rests', () => {
  it('shows the place above itself, follows slow movement finely, and sets it when lifted', () => {
    desk.store.setTool('readingPoint');
    const from = desk.sheetAt(600, 400);
    desk.send('down', 'touch', 600, 400);
    desk.after(400);
    expect(desk.told.finger).toEqual([600, 400]);
    expect(desk.told.pointer?.[0]).toBeCloseTo(from[0], 6);
    for (let step = 1; step <= 20; step += 1) {
      desk.after(50);
      desk.send('move', 'touch', 600 + step, 400);
    }
    expect(desk.told.finger).toEqual([620, 400]);
    desk.send('up', 'touch', 620, 400);
    const [placed] = desk.points();
    const moved = (placed![0] - from[0]) * sheetZoom(desk.view());
    expect(moved).toBeGreaterThan(2);
    expect(moved).toBeLessThan(5);
    expect(desk.told.finger).toBeNull();
  });

  it('takes a fast movement along whole', () => {
    desk.store.setTool('readingPoint');
    const to = desk.sheetAt(700, 400);
    desk.send('down', 'touch', 600, 400);
    desk.after(400);
    desk.after(16);
    desk.send('move', 'touch', 700, 400);
    desk.send('up', 'touch', 700, 400);
    expect(desk.points()[0]?.[0]).toBeCloseTo(to[0], 0);
  });

  it('moves a vertex of the chosen line', () => {
    desk.store.select(selectOne('line', LINE_A));
    const at = [16 + 200 * sheetZoom(desk.view()), 16 + 200 * sheetZoom(desk.view())] as const;
    desk.send('down', 'touch', at[0], at[1]);
    desk.after(400);
    desk.after(20);
    desk.send('move', 'touch', at[0] + 60, at[1]);
    desk.send('up', 'touch', at[0] + 60, at[1]);
    expect(desk.lineOf()?.[0]?.[0]).toBeCloseTo(260, 0);
  });

  it('shows what an edit asked for would do, and does it when it is lifted', () => {
    desk.store.select(selectOne('line', LINE_A));
    desk.store.setPendingEdit({ op: 'split', lineId: LINE_A });
    const zoom = sheetZoom(desk.view());
    const beside = [16 + 250 * zoom + 12, 16 + 350 * zoom] as const;
    desk.send('down', 'touch', ...beside);
    expect(desk.told.sketches).toEqual([]);
    desk.after(400);
    expect(desk.told.sketches).not.toEqual([]);
    expect(entitiesOf(desk.store.getState().document, 'line')).toHaveLength(1);
    desk.send('up', 'touch', ...beside);
    expect(entitiesOf(desk.store.getState().document, 'line')).toHaveLength(2);
  });

  it('lets go of what it held when a second finger comes', () => {
    desk.store.setTool('readingPoint');
    desk.send('down', 'touch', 600, 400);
    desk.after(400);
    desk.send('down', 'touch', 400, 400, { pointerId: 2 });
    expect(desk.told.finger).toBeNull();
    expect(desk.told.pointer).toBeNull();
    desk.send('up', 'touch', 400, 400, { pointerId: 2 });
    desk.send('up', 'touch', 600, 400);
    expect(desk.points()).toEqual([]);
  });
});

describe('two fingers', () => {
  it('zoom about the place between them, and the one that stays does not place', () => {
    desk.store.setTool('readingPoint');
    const zoom = desk.view().zoom;
    const between = desk.sheetAt(500, 300);
    desk.send('down', 'touch', 450, 300);
    desk.send('down', 'touch', 550, 300, { pointerId: 2 });
    desk.after(16);
    desk.send('move', 'touch', 400, 300);
    desk.send('move', 'touch', 600, 300, { pointerId: 2 });
    expect(desk.view().zoom).toBeCloseTo(zoom * 2, 6);
    const now = desk.sheetAt(500, 300);
    expect(Math.hypot(now[0] - between[0], now[1] - between[1])).toBeLessThan(2);
    desk.send('up', 'touch', 600, 300, { pointerId: 2 });
    desk.after(500);
    desk.send('up', 'touch', 400, 300);
    expect(desk.points()).toEqual([]);
  });
});

describe('a pen', () => {
  it('shows what it would snap to while it hovers', () => {
    desk.store.setTool('flowLine');
    desk.send('move', 'pen', 216, 214);
    expect(desk.told.pointer?.[0]).toBeCloseTo(desk.sheetAt(216, 214)[0], 6);
  });

  it('sets what it places where it is lifted, and never pans while it places', () => {
    desk.store.setTool('readingPoint');
    const before = desk.view().origin;
    const to = desk.sheetAt(700, 420);
    desk.send('down', 'pen', 600, 400);
    desk.after(30);
    desk.send('move', 'pen', 700, 420);
    expect(desk.told.panning).toBe(false);
    desk.send('up', 'pen', 700, 420);
    expect(desk.view().origin).toEqual(before);
    expect(desk.points()[0]?.[0]).toBeCloseTo(to[0], 1);
  });

  it('draws while the palm rests', () => {
    desk.store.setTool('readingPoint');
    const before = desk.view();
    desk.send('move', 'pen', 300, 300);
    desk.after(50);
    desk.send('down', 'touch', 420, 460);
    desk.send('down', 'touch', 460, 500, { pointerId: 2 });
    desk.send('down', 'pen', 300, 300);
    desk.after(60);
    desk.send('move', 'touch', 440, 480);
    desk.send('up', 'pen', 300, 300);
    desk.after(1000);
    desk.send('move', 'touch', 480, 480);
    desk.send('up', 'touch', 480, 480);
    desk.send('up', 'touch', 460, 500, { pointerId: 2 });
    expect(desk.points()).toHaveLength(1);
    expect(desk.view()).toEqual(before);
  });

  it('takes over from a palm that came down first', () => {
    desk.store.setTool('readingPoint');
    desk.send('down', 'touch', 420, 460);
    desk.after(400);
    expect(desk.told.finger).not.toBeNull();
    desk.send('move', 'pen', 300, 300);
    expect(desk.told.finger).toBeNull();
    desk.send('down', 'pen', 300, 300);
    desk.send('up', 'touch', 420, 460);
    desk.send('up', 'pen', 300, 300);
    const [placed] = desk.points();
    expect(desk.points()).toHaveLength(1);
    expect(placed?.[0]).toBeCloseTo(desk.sheetAt(300, 300)[0], 1);
  });

  it('gives the fingers back soon after it has left', () => {
    desk.store.setTool('readingPoint');
    desk.send('move', 'pen', 300, 300);
    desk.after(700);
    desk.send('down', 'touch', 420, 460);
    desk.after(60);
    desk.send('up', 'touch', 420, 460);
    expect(desk.points()).toHaveLength(1);
  });
});

describe('a broad contact', () => {
  it('is a palm, also without a pen', () => {
    desk.store.setTool('readingPoint');
    desk.send('down', 'touch', 420, 460, { width: 90, height: 110 });
    desk.after(60);
    desk.send('up', 'touch', 420, 460, { width: 90, height: 110 });
    expect(desk.points()).toEqual([]);
  });
});

describe('a mouse', () => {
  it('still pans when it is dragged and places when it is clicked', () => {
    desk.store.setTool('readingPoint');
    desk.send('down', 'mouse', 500, 300);
    desk.send('move', 'mouse', 530, 300);
    expect(desk.told.panning).toBe(true);
    desk.send('up', 'mouse', 530, 300);
    expect(desk.points()).toEqual([]);
    desk.send('down', 'mouse', 500, 300);
    desk.send('up', 'mouse', 502, 300);
    expect(desk.points()).toHaveLength(1);
  });
});
