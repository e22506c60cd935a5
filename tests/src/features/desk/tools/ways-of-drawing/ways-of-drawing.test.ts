import { afterEach, describe, expect, it } from 'vitest';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import { chooseDrawingWay, type DrawingWay } from '#client/features/desk/model/drawing-way.ts';
import type { InkClient, InkReach } from '#client/features/desk/model/ink-client.ts';
import { createToolHost } from '#client/features/desk/tools/tool-host.ts';
import type { Modifiers } from '#client/features/desk/tools/tool-types.ts';
import { drawingWayText } from '#client/text/drawing-ways.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import type { FollowedPath } from '#shared/compute/ink/follow-over-sheet.ts';
import { type DocumentEntity, entitiesOf } from '#shared/contract/document.ts';
import { countedIds, documentWith, LINE_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const NO_KEYS: Modifiers = { shift: false, alt: false, ctrl: false };

/** A desk with a hand on it that draws in some way. One sheet pixel is one screen pixel. */
function desk(way: DrawingWay, values: Record<string, DocumentEntity> = {}, ink: InkClient | null = null) {
  const store = createDeskStore({ document: documentWith(values) }, { newId: countedIds() });
  const host = createToolHost(store, ink);
  const view = { zoom: 1, reachPx: 8, balloons: [] };
  store.setTool('equipotential');
  chooseDrawingWay(way);
  const send = (type: 'press' | 'move' | 'release', x: number, y: number, keys = NO_KEYS) =>
    host.handle({ type, at: sheetPx(x, y), keys }, view);
  return {
    store,
    host,
    click(x: number, y: number, keys = NO_KEYS, count = 1) {
      send('press', x, y, keys);
      send('release', x, y, keys);
      host.handle({ type: 'click', at: sheetPx(x, y), keys, count }, view);
    },
    /** As the pointer's gestures tell a stroke: a press, moves and a release. */
    stroke(places: Array<[number, number]>) {
      const [first, ...others] = places;
      send('press', ...first!);
      for (const place of others) send('move', ...place);
      send('release', ...places.at(-1)!);
    },
    send,
    key: (type: 'finish' | 'takeBack' | 'cancel' | 'abandonDrag') => host.handle({ type }, view),
    overlay: (x: number, y: number) => host.overlay(sheetPx(x, y), NO_KEYS, view),
    points: () => entitiesOf(store.getState().document, 'line').map(({ value }) => value.points),
    line: (id: string) => {
      const value = store.getState().document.entities[id]?.value;
      return value?.kind === 'line' ? value.points : [];
    },
    lines: () => entitiesOf(store.getState().document, 'line'),
  };
}

const settled = () => new Promise((resolve) => setTimeout(resolve));
const CLICKS: Array<[number, number]> = [
  [100, 500],
  [220, 380],
  [380, 320],
  [560, 330],
];
afterEach(() => chooseDrawingWay('straight'));

describe('a smooth line', () => {
  it('runs through its clicks with many vertices, and its preview is what the click adds', () => {
    const hand = desk('smooth');
    for (const click of CLICKS.slice(0, 3)) hand.click(...click);
    const shown = hand.overlay(...CLICKS[3]!).path!;
    hand.click(...CLICKS[3]!);
    const [points] = hand.points();
    for (const click of CLICKS) expect(points).toContainEqual(click);
    expect(points!.length).toBeGreaterThan(15);
    expect(points!.slice(-shown.length)).toEqual(shown);
  });

  it('loses a click on Backspace, and is then what it was before that click', () => {
    const hand = desk('smooth');
    for (const click of CLICKS.slice(0, 3)) hand.click(...click);
    const before = hand.points();
    hand.click(...CLICKS[3]!);
    hand.key('takeBack');
    expect(hand.points()).toEqual(before);
    hand.key('takeBack');
    hand.key('takeBack');
    expect(hand.points()).toEqual([[CLICKS[0]]]);
    hand.key('takeBack');
    expect(hand.points()).toEqual([]);
  });

  it('is taken back click by click by undo, and goes on from there', () => {
    const hand = desk('smooth');
    for (const click of CLICKS) hand.click(...click);
    const whole = hand.points();
    hand.store.undo();
    expect(hand.points()[0]!.at(-1)).toEqual(CLICKS[2]);
    hand.click(...CLICKS[3]!);
    expect(hand.points()).toEqual(whole);
  });

  it('changes into a straight one and back in the middle', () => {
    const hand = desk('smooth');
    for (const click of CLICKS.slice(0, 3)) hand.click(...click);
    const smooth = hand.points()[0]!;
    chooseDrawingWay('straight');
    hand.click(600, 500);
    expect(hand.points()[0]).toEqual([...smooth, [600, 500]]);
    chooseDrawingWay('smooth');
    hand.click(700, 400);
    hand.click(800, 420);
    const points = hand.points()[0]!;
    expect(points.slice(0, smooth.length + 1)).toEqual([...smooth, [600, 500]]);
    expect(points.length).toBeGreaterThan(smooth.length + 8);
  });

  it('grows at its start as at its end', () => {
    const hand = desk('smooth', {
      [LINE_A]: tracedLine(
        [
          [600, 100],
          [700, 100],
        ],
        { finished: false },
      ),
    });
    hand.click(602, 101);
    expect(hand.store.getState().draft).toEqual({ lineId: LINE_A, atStart: true });
    hand.click(500, 160);
    hand.click(400, 300);
    const points = hand.line(LINE_A);
    expect(points[0]).toEqual([400, 300]);
    expect(points.slice(-2)).toEqual([
      [600, 100],
      [700, 100],
    ]);
    expect(points.length).toBeGreaterThan(8);
    hand.key('takeBack');
    expect(hand.line(LINE_A)[0]).toEqual([500, 160]);
  });

  it('goes back to a bend where its clicks are not known any more', () => {
    const first = desk('smooth');
    for (const click of CLICKS) first.click(...click);
    const points = first.points()[0]!;
    // Another visit: the document is the same, the memory of clicks is gone.
    const later = desk('smooth', { [LINE_A]: tracedLine([...points], { finished: false }) });
    later.store.setDraft({ lineId: LINE_A, atStart: false });
    later.key('takeBack');
    const left = later.line(LINE_A).length;
    expect(left).toBeLessThan(points.length - 2);
    expect(left).toBeGreaterThan(1);
  });
});

describe('a freehand line', () => {
  const arc = Array.from({ length: 80 }, (_, i): [number, number] => [
    100 + 5 * i,
    400 - 150 * Math.sin((Math.PI * i) / 79),
  ]);

  it('is drawn by a pointer held down, kept as few vertices near the stroke, and one step', () => {
    const hand = desk('freehand');
    hand.send('press', ...arc[0]!);
    expect(hand.host.grabs()).toBe(true);
    hand.send('move', ...arc[20]!);
    expect(hand.overlay(...arc[20]!).path).toHaveLength(2);
    hand.key('abandonDrag');
    expect(hand.points()).toEqual([]);
    hand.stroke(arc);
    const [points] = hand.points();
    expect(points!.length).toBeGreaterThan(6);
    expect(points!.length).toBeLessThan(30);
    expect(points!.at(-1)).toEqual([495, 400]);
    expect(hand.store.getState().history.undoLabel).toBe(drawingWayText.drewFreehand('equipotential'));
    hand.store.undo();
    expect(hand.points()).toEqual([]);
  });

  it('goes on from its end with a stroke or a click, and loses the last of them on Backspace', () => {
    const hand = desk('freehand');
    hand.stroke(arc.slice(0, 40));
    const once = hand.points()[0]!;
    hand.stroke(arc.slice(40));
    const twice = hand.points()[0]!;
    expect(twice.slice(0, once.length)).toEqual(once);
    hand.click(600, 500);
    expect(hand.points()[0]).toEqual([...twice, [600, 500]]);
    hand.key('takeBack');
    hand.key('takeBack');
    expect(hand.points()[0]).toEqual(once);
    hand.key('finish');
    expect(hand.lines()[0]!.value.finished).toBe(true);
  });

  it('a hand that hardly moves has clicked', () => {
    const hand = desk('freehand');
    hand.click(100, 100);
    hand.click(200, 100);
    expect(hand.points()).toEqual([
      [
        [100, 100],
        [200, 100],
      ],
    ]);
  });
});

/** Ink that answers when told to. */
function inkStand() {
  const asked: Array<{ reach: InkReach; answer: (path: FollowedPath | null) => void }> = [];
  const looked: InkReach[] = [];
  let newest: ReturnType<InkClient['newest']> = null;
  const client: InkClient = {
    look: (reach) => void looked.push(reach),
    newest: () => newest,
    onLook: () => {},
    follow: (reach) => new Promise((answer) => asked.push({ reach, answer })),
    close: () => {},
  };
  return {
    client,
    asked,
    looked,
    show(path: FollowedPath) {
      newest = { ...looked.at(-1)!, path };
    },
  };
}

const along = (...points: Array<[number, number]>): FollowedPath => ({ points, found: true, fine: true });

describe('a line along the ink', () => {
  it('runs where the ink was found, its first vertex moved onto the stroke', async () => {
    const ink = inkStand();
    const hand = desk('ink', {}, ink.client);
    hand.click(100, 100);
    hand.click(300, 100);
    expect(hand.points()).toEqual([[[100, 100]]]);
    ink.asked[0]!.answer(along([100.5, 102], [200, 130], [299.5, 101]));
    await settled();
    expect(hand.points()).toEqual([
      [
        [100.5, 102],
        [200, 130],
        [299.5, 101],
      ],
    ]);
    expect(hand.store.getState().history.undoLabel).toBe(drawingWayText.followedInk('equipotential'));
    hand.key('takeBack');
    expect(hand.points()).toEqual([[[100.5, 102]]]);
  });

  it('has what is clicked meanwhile wait its turn, and gives up on Escape', async () => {
    const ink = inkStand();
    const hand = desk('ink', {}, ink.client);
    hand.click(100, 100);
    hand.click(300, 100);
    hand.click(500, 100);
    hand.key('finish');
    expect(ink.asked).toHaveLength(1);
    ink.asked[0]!.answer(along([100, 100], [300, 100]));
    await settled();
    expect(ink.asked).toHaveLength(2);
    ink.asked[1]!.answer(along([300, 100], [500, 110]));
    await settled();
    expect(hand.points()).toEqual([
      [
        [100, 100],
        [300, 100],
        [500, 110],
      ],
    ]);
    expect(hand.lines()[0]!.value.finished).toBe(true);

    hand.click(100, 300);
    hand.click(300, 300);
    hand.key('cancel');
    ink.asked[2]!.answer(along([100, 300], [300, 300]));
    await settled();
    expect(hand.points()).toHaveLength(1);
  });

  it.each([
    [{ points: [], found: false, fine: true } as FollowedPath, drawingWayText.noInk],
    [null, drawingWayText.scanUnread],
  ])('joins straight and says why where there is none', async (path, notice) => {
    const ink = inkStand();
    const hand = desk('ink', {}, ink.client);
    hand.click(100, 100);
    hand.click(300, 100);
    ink.asked[0]!.answer(path);
    await settled();
    expect(hand.points()).toEqual([
      [
        [100, 100],
        [300, 100],
      ],
    ]);
    expect(hand.store.getState().notice).toBe(notice);
  });

  it('ends on the line that it snaps to, and begins on it', async () => {
    const ink = inkStand();
    const wall = tracedLine([
      [300, 50],
      [300, 400],
    ]);
    const hand = desk('ink', { [LINE_A]: wall }, ink.client);
    hand.click(303, 100);
    hand.click(100, 100);
    ink.asked[0]!.answer(along([302, 101], [200, 120], [101, 101]));
    await settled();
    hand.click(298, 200);
    ink.asked[1]!.answer(along([101, 101], [200, 190], [297, 202]));
    await settled();
    const points = hand.lines().find(({ id }) => id !== LINE_A)!.value.points;
    expect(points[0]).toEqual([300, 100]);
    expect(points.at(-1)).toEqual([300, 200]);
  });

  it('is shown before it is clicked, from the newest look', () => {
    const ink = inkStand();
    const hand = desk('ink', {}, ink.client);
    hand.click(100, 100);
    expect(hand.overlay(300, 100).path).toBeNull();
    hand.overlay(300, 100);
    expect(ink.looked).toHaveLength(1);
    ink.show(along([100, 100], [200, 120], [300, 100]));
    expect(hand.overlay(300, 100).path).toHaveLength(3);
    expect(hand.overlay(310, 100).path?.at(-1)).toEqual([310, 100]);
  });

  it('is nothing once the tool was laid down', async () => {
    const ink = inkStand();
    const hand = desk('ink', {}, ink.client);
    hand.click(100, 100);
    hand.click(300, 100);
    hand.store.setTool('select');
    ink.asked[0]!.answer(along([100, 100], [300, 100]));
    await settled();
    expect(hand.points()).toEqual([[[100, 100]]]);
  });
});

describe('dragging a vertex of a dense line', () => {
  it('bends a smooth line between the clicks beside it', () => {
    const hand = desk('smooth');
    for (const click of CLICKS) hand.click(...click);
    hand.key('finish');
    hand.store.setTool('select');
    const { id } = hand.lines()[0]!;
    hand.store.select({ kind: 'line', ids: [id] });
    const before = hand.line(id);
    hand.stroke([
      [220, 380],
      [225, 390],
      [230, 400],
    ]);
    const after = hand.line(id);
    expect(after).toHaveLength(before.length);
    expect(after).toContainEqual([230, 400]);
    const moved = after.flatMap((at, i) => (at[0] === before[i]![0] && at[1] === before[i]![1] ? [] : [i]));
    const [first, third] = [0, 2].map((k) =>
      before.findIndex(([x, y]) => x === CLICKS[k]![0] && y === CLICKS[k]![1]),
    );
    expect(moved.length).toBeGreaterThan(5);
    expect(Math.min(...moved)).toBe(first! + 1);
    expect(Math.max(...moved)).toBe(third! - 1);
  });

  it('moves one vertex alone of a line clicked straight', () => {
    const places: Array<[number, number]> = [
      [100, 100],
      [112, 101],
      [124, 101],
      [136, 100],
    ];
    const hand = desk('straight');
    // The places lie nearer than clicks usually do: they are still clicks.
    for (const place of places) hand.click(...place);
    hand.key('finish');
    hand.store.setTool('select');
    const { id } = hand.lines()[0]!;
    hand.store.select({ kind: 'line', ids: [id] });
    hand.stroke([
      [124, 101],
      [124, 120],
    ]);
    expect(hand.line(id)).toEqual([places[0], places[1], [124, 120], places[3]]);
  });
});
