import { describe, expect, it } from 'vitest';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import type { DeskIntent } from '#client/features/desk/model/intents.ts';
import type { BoundaryKind, ToolId } from '#client/features/desk/model/tool-choice.ts';
import { createToolHost } from '#client/features/desk/tools/tool-host.ts';
import type { Modifiers } from '#client/features/desk/tools/tool-types.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { type DocumentEntity, entitiesOf, type TracedLine, UNSAID } from '#shared/contract/document.ts';
import {
  countedIds,
  documentWith,
  LINE_A,
  LINE_B,
  POINT_A,
  tracedLine,
} from '#tests/support/desk/desk-fixture.ts';

const NO_KEYS: Modifiers = { shift: false, alt: false, ctrl: false };

/** A desk with a hand on it. One sheet pixel is one screen pixel, and things are met within 8 px. */
function desk(
  values: Record<string, DocumentEntity>,
  tool: ToolId,
  boundary?: BoundaryKind,
  readOnly = false,
) {
  const store = createDeskStore({ document: documentWith(values) }, { newId: countedIds(), readOnly });
  const host = createToolHost(store);
  const view = { zoom: 1, reachPx: 8, balloons: [{ id: 'note-1', at: sheetPx(900, 600) }] };
  const intents: DeskIntent[] = [];
  store.onIntent((intent) => intents.push(intent));
  store.setTool(tool, boundary);
  const send = (type: 'press' | 'move' | 'release', x: number, y: number, keys: Partial<Modifiers> = {}) =>
    host.handle({ type, at: sheetPx(x, y), keys: { ...NO_KEYS, ...keys } }, view);
  return {
    store,
    host,
    intents,
    click(x: number, y: number, keys: Partial<Modifiers> = {}, count = 1) {
      send('press', x, y, keys);
      send('release', x, y, keys);
      host.handle({ type: 'click', at: sheetPx(x, y), keys: { ...NO_KEYS, ...keys }, count }, view);
    },
    drag(from: [number, number], to: [number, number], keys: Partial<Modifiers> = {}) {
      send('press', ...from, keys);
      send('move', ...to, keys);
      send('release', ...to, keys);
    },
    key: (type: 'finish' | 'takeBack' | 'cancel' | 'remove') => host.handle({ type }, view),
    overlay: (x: number, y: number) => host.overlay(sheetPx(x, y), NO_KEYS, view),
    lines: () => entitiesOf(store.getState().document, 'line').map(({ value }) => value),
    line: (id: string) => {
      const value = store.getState().document.entities[id]?.value;
      if (value?.kind !== 'line') throw new Error('no such line');
      return value;
    },
  };
}

describe('tracing', () => {
  it('draws nothing on a net that may only be looked at', () => {
    const hand = desk({}, 'equipotential', undefined, true);
    hand.click(100, 100);
    expect(hand.lines()).toEqual([]);
  });

  it('keeps each point at once, unfinished, and finishes on Enter', () => {
    const hand = desk({}, 'equipotential');
    hand.click(100, 100);
    hand.click(110, 200);
    expect(hand.lines()).toMatchObject([
      {
        finished: false,
        points: [
          [100, 100],
          [110, 200],
        ],
      },
    ]);
    hand.key('finish');
    expect(hand.lines()).toMatchObject([{ line: 'equipotential', finished: true }]);
    expect(hand.store.getState().draft).toBeNull();
    expect(hand.store.getState().selection.kind).toBe('line');
  });

  it('finishes on a double click without a second point in its place', () => {
    const hand = desk({}, 'flowLine');
    hand.click(100, 100);
    hand.click(200, 100);
    hand.click(300, 100);
    hand.click(300, 100, {}, 2);
    expect(hand.lines()).toMatchObject([
      {
        line: 'flowLine',
        finished: true,
        points: [
          [100, 100],
          [200, 100],
          [300, 100],
        ],
      },
    ]);
  });

  it('leaves nothing behind when a line of one point is finished or the line is cancelled', () => {
    const hand = desk({}, 'phreaticLine');
    hand.click(100, 100);
    hand.key('finish');
    expect(hand.lines()).toEqual([]);
    hand.click(100, 100);
    hand.click(200, 100);
    hand.key('cancel');
    expect(hand.lines()).toEqual([]);
    expect(hand.store.getState().tool).toBe('phreaticLine');
    hand.key('cancel');
    expect(hand.store.getState().tool).toBe('select');
  });

  it('takes the last point back, and the line with the last one', () => {
    const hand = desk({}, 'equipotential');
    hand.click(100, 100);
    hand.click(110, 200);
    hand.key('takeBack');
    expect(hand.lines()).toMatchObject([{ points: [[100, 100]] }]);
    hand.key('takeBack');
    expect(hand.lines()).toEqual([]);
  });

  it('takes points back by undo and goes on with the line', () => {
    const hand = desk({}, 'equipotential');
    hand.click(100, 100);
    hand.click(110, 200);
    hand.key('finish');
    hand.store.undo();
    hand.click(120, 300);
    expect(hand.lines()).toMatchObject([
      {
        finished: false,
        points: [
          [100, 100],
          [110, 200],
          [120, 300],
        ],
      },
    ]);
  });

  it('goes on with an unfinished line at the end that is clicked', () => {
    const open = tracedLine(
      [
        [100, 100],
        [200, 100],
      ],
      { finished: false },
    );
    const hand = desk({ [LINE_A]: open }, 'equipotential');
    hand.click(101, 101);
    hand.click(50, 100);
    expect(hand.line(LINE_A).points).toEqual([
      [50, 100],
      [100, 100],
      [200, 100],
    ]);
  });

  it('snaps to an end before a line, and not while Ctrl is held', () => {
    const base = tracedLine(
      [
        [0, 300],
        [500, 300],
      ],
      { line: 'impervious' },
    );
    const hand = desk({ [LINE_A]: base }, 'equipotential');
    expect(hand.overlay(250, 305).snap).toMatchObject({ kind: 'boundary', at: [250, 300] });
    expect(hand.overlay(497, 304).snap).toMatchObject({ kind: 'end', at: [500, 300] });
    hand.click(250, 305);
    hand.click(250, 106);
    hand.click(254, 304, { ctrl: true });
    expect(hand.lines()[0]?.points).toEqual([
      [250, 300],
      [250, 106],
      [254, 304],
    ]);
  });

  it('keeps to level, plumb and 45° while Shift is held', () => {
    const hand = desk({}, 'boundary', 'impervious');
    hand.click(100, 100);
    hand.click(300, 120, { shift: true });
    hand.click(310, 300, { shift: true });
    expect(hand.lines()[0]?.points).toEqual([
      [100, 100],
      [300, 100],
      [300, 300],
    ]);
  });

  it('says of a submerged face whose level it carries', () => {
    const hand = desk({}, 'boundary', 'tailwaterFace');
    hand.click(100, 100);
    expect(hand.lines()).toMatchObject([{ line: 'submergedFace', water: 'tailwater' }]);
  });

  it('shows a band from the last point to the pointer', () => {
    const hand = desk({}, 'equipotential');
    hand.click(100, 100);
    expect(hand.overlay(150, 160).rubber).toEqual([
      [100, 100],
      [150, 160],
    ]);
  });
});

describe('choosing and changing', () => {
  const line = tracedLine([
    [100, 100],
    [200, 100],
    [300, 100],
  ]);

  it('chooses a line by a click and lets it go by a click beside it', () => {
    const hand = desk({ [LINE_A]: line }, 'select');
    hand.click(150, 104);
    expect(hand.store.getState().selection).toMatchObject({ kind: 'line', ids: [LINE_A] });
    hand.click(600, 600);
    expect(hand.store.getState().selection.kind).toBe('none');
  });

  it('moves a vertex of the chosen line as one step that can be taken back', () => {
    const hand = desk({ [LINE_A]: line }, 'select');
    hand.click(150, 100);
    hand.drag([201, 100], [221, 140]);
    expect(hand.line(LINE_A).points[1]).toEqual([220, 140]);
    expect(hand.store.getState().preview).toEqual({});
    hand.store.undo();
    expect(hand.line(LINE_A).points).toEqual(line.points);
    expect(hand.store.getState().history.undoLabel).toBeNull();
  });

  it('does not move a vertex by a press with an unsteady hand', () => {
    const hand = desk({ [LINE_A]: line }, 'select');
    hand.click(150, 100);
    hand.drag([200, 100], [201, 101]);
    expect(hand.line(LINE_A).points).toEqual(line.points);
    expect(hand.store.getState().selection.vertex).toBe(1);
  });

  it('does not take hold of a vertex of a line that is not chosen', () => {
    const hand = desk({ [LINE_A]: line }, 'select');
    hand.drag([200, 100], [250, 150]);
    expect(hand.line(LINE_A).points).toEqual(line.points);
  });

  it('puts a vertex in by a double click and by Alt and dragging', () => {
    const hand = desk({ [LINE_A]: line }, 'select');
    hand.click(150, 100);
    hand.click(150, 103, {}, 2);
    expect(hand.line(LINE_A).points[1]).toEqual([150, 100]);
    hand.drag([250, 100], [250, 160], { alt: true });
    expect(hand.line(LINE_A).points).toEqual([
      [100, 100],
      [150, 100],
      [200, 100],
      [250, 160],
      [300, 100],
    ]);
  });

  it('takes a chosen vertex out but never leaves a line of one point: then the line goes', () => {
    const hand = desk({ [LINE_A]: line }, 'select');
    hand.click(150, 100);
    hand.click(200, 100);
    hand.key('remove');
    expect(hand.line(LINE_A).points).toEqual([
      [100, 100],
      [300, 100],
    ]);
    hand.click(100, 100);
    hand.key('remove');
    expect(hand.lines()).toEqual([]);
    hand.store.undo();
    expect(hand.lines()).toHaveLength(1);
  });

  it('moves no vertex that someone else removed during the drag', () => {
    const hand = desk(
      {
        [LINE_A]: line,
        [LINE_B]: tracedLine([
          [0, 0],
          [9, 9],
        ]),
      },
      'select',
    );
    hand.click(150, 100);
    hand.host.handle(
      { type: 'press', at: sheetPx(200, 100), keys: NO_KEYS },
      { zoom: 1, reachPx: 8, balloons: [] },
    );
    hand.store.receive({
      changeNumber: 2,
      entities: [{ id: LINE_A, version: 2, value: null, changedBy: null, clientId: null }],
    });
    hand.drag([200, 100], [230, 130]);
    expect(hand.lines()).toHaveLength(1);
  });

  it('goes on with a chosen unfinished line on Enter', () => {
    const hand = desk({ [LINE_A]: { ...line, line: 'drain', finished: false } }, 'select');
    hand.click(150, 100);
    hand.key('finish');
    expect(hand.store.getState()).toMatchObject({
      tool: 'boundary',
      boundaryKind: 'drain',
      draft: { lineId: LINE_A },
    });
  });

  it('chooses nothing that is hidden', () => {
    const hand = desk({ [LINE_A]: line }, 'select');
    hand.store.setHidden(['equipotential']);
    hand.click(150, 100);
    expect(hand.store.getState().selection.kind).toBe('none');
  });
});

describe('known points, reading points and notes', () => {
  const typed: DocumentEntity = {
    kind: 'readingPoint',
    ...UNSAID.readingPoint,
    name: 'P1',
    place: { on: 'section', offset: 1, elevation: 2 },
    order: 3,
  };

  it('makes two known points for the fit and the next a check, and asks for their figures', () => {
    const hand = desk({}, 'knownPoint');
    hand.click(100, 100);
    hand.click(500, 100);
    hand.click(300, 400);
    const points = entitiesOf(hand.store.getState().document, 'knownPoint').map(({ value }) => [
      value.name,
      value.use,
    ]);
    expect(points).toEqual([
      ['K1', 'fit'],
      ['K2', 'fit'],
      ['K3', 'check'],
    ]);
    expect(hand.intents.map((intent) => intent.type)).toEqual([
      'openKnownPoint',
      'openKnownPoint',
      'openKnownPoint',
    ]);
  });

  it('moves a known point that is pressed and sets no second one on it', () => {
    const hand = desk({}, 'knownPoint');
    hand.click(100, 100);
    hand.click(103, 100);
    hand.drag([100, 100], [140, 120]);
    const points = entitiesOf(hand.store.getState().document, 'knownPoint');
    expect(points.map(({ value }) => value.at)).toEqual([[140, 120]]);
  });

  it('names reading points on and puts them at the end of the schedule', () => {
    const hand = desk({ [POINT_A]: typed }, 'readingPoint');
    hand.click(400, 400);
    const added = entitiesOf(hand.store.getState().document, 'readingPoint').find(({ id }) => id !== POINT_A);
    expect(added?.value).toMatchObject({ name: 'P2', order: 4, place: { on: 'sheet', at: [400, 400] } });
  });

  it('begins a note on a line, on a reading point and on a bare place', () => {
    const point: DocumentEntity = { ...typed, place: { on: 'sheet', at: [500, 500] } };
    const hand = desk(
      {
        [LINE_A]: tracedLine([
          [100, 100],
          [200, 100],
        ]),
        [POINT_A]: point,
      },
      'note',
    );
    hand.click(150, 104);
    hand.click(502, 500);
    hand.click(800, 300);
    hand.click(900, 600);
    expect(hand.intents).toEqual([
      { type: 'writeNote', anchor: { on: 'line', entityId: LINE_A, at: [150, 100] } },
      { type: 'writeNote', anchor: { on: 'readingPoint', entityId: POINT_A, at: [500, 500] } },
      { type: 'writeNote', anchor: { on: 'place', at: [800, 300] } },
      { type: 'openNote', noteId: 'note-1' },
    ]);
  });

  it('begins a note on a profile, and on the cell in which a bare place lies', () => {
    const ids = ['h1', 'h2', 'f1', 'f2'];
    const side = (line: TracedLine['line'], from: [number, number], to: [number, number]) =>
      tracedLine([from, to], { line });
    const hand = desk(
      {
        h1: side('equipotential', [100, 100], [100, 400]),
        h2: side('equipotential', [300, 100], [300, 400]),
        f1: side('flowLine', [50, 150], [350, 150]),
        f2: side('impervious', [50, 350], [350, 350]),
        base: {
          kind: 'profile',
          name: '',
          use: 'base',
          place: {
            on: 'sheet',
            points: [
              [500, 500],
              [700, 500],
            ],
          },
          spacing: null,
          finished: true,
          order: 1,
        },
      },
      'note',
    );
    hand.click(600, 502);
    hand.click(200, 250);
    const [onProfile, inCell] = hand.intents.map((intent) => 'anchor' in intent && intent.anchor);
    expect(onProfile).toEqual({ on: 'profile', entityId: 'base', at: [600, 500] });
    expect(inCell).toMatchObject({ on: 'cell', at: [200, 250] });
    if (inCell && inCell.on === 'cell') expect([...inCell.heads, ...inCell.flows].sort()).toEqual(ids.sort());
  });

  it('asks for the magnified view while known points are placed', () => {
    expect(desk({}, 'knownPoint').overlay(10, 10).magnify).toBe(true);
    expect(desk({}, 'equipotential').overlay(10, 10).magnify).toBe(false);
  });
});
