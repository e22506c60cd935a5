import { describe, expect, it } from 'vitest';
import { sheetPx } from '#shared/compute/frames.ts';
import { type DocumentEntity, UNSAID } from '#shared/contract/document.ts';
import { LINE_A, LINE_B, POINT_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';
import { toolHand } from '#tests/support/desk/tool-hand.ts';
import { seededNoise } from '#tests/support/exact-nets/seeded-noise.ts';

const level = tracedLine([
  [100, 100],
  [200, 100],
  [300, 100],
]);
const plumb = tracedLine(
  [
    [250, 50],
    [250, 400],
  ],
  { line: 'impervious' },
);
const point: DocumentEntity = {
  kind: 'readingPoint',
  ...UNSAID.readingPoint,
  name: 'P1',
  place: { on: 'sheet', at: [500, 500] },
  order: 1,
};

describe('what a key asks of the chosen line', () => {
  it('is refused in words while nothing fits is chosen, a line is drawn, or the net may only be looked at', () => {
    const bare = toolHand({ [POINT_A]: point });
    bare.op('split');
    expect(bare.notice()).toMatch(/No line is chosen/);
    bare.click(500, 500);
    bare.op('trim');
    expect(bare.notice()).toMatch(/No line is chosen/);

    const drawing = toolHand({ [LINE_A]: level }, { tool: 'equipotential' });
    drawing.click(600, 600);
    drawing.op('split');
    expect(drawing.notice()).toMatch(/Finish it with Enter/);

    const onlyLooking = toolHand({ [LINE_A]: level }, { readOnly: true });
    onlyLooking.click(150, 100);
    onlyLooking.op('reverse');
    expect(onlyLooking.notice()).toMatch(/looked at/);
    expect(onlyLooking.points(LINE_A)).toEqual(level.points);
  });

  it('is refused for a line whose kind is locked, and a locked line can still be trimmed at', () => {
    const hand = toolHand({ [LINE_A]: level, [LINE_B]: plumb });
    hand.click(150, 100);
    hand.op('trim');
    hand.store.setLocked(['impervious']);
    hand.click(250, 300);
    expect(hand.points(LINE_A)).toEqual([
      [100, 100],
      [200, 100],
      [250, 100],
    ]);
    hand.store.setLocked(['equipotential']);
    expect(hand.chosen().kind).toBe('none');
    hand.store.select({ kind: 'line', ids: [LINE_A] });
    hand.op('reverse');
    expect(hand.notice()).toMatch(/locked/);
    hand.key('remove');
    hand.drag([150, 100], [150, 150]);
    hand.edit({ type: 'nudge', by: [1, 0] });
    hand.edit({ type: 'settle' });
    expect(hand.labels).toHaveLength(1);
  });

  it('takes the choosing tool into the hand, and Escape leaves what is asked for, then the line', () => {
    const hand = toolHand({ [LINE_A]: level }, { tool: 'readingPoint' });
    hand.store.select({ kind: 'line', ids: [LINE_A] });
    hand.op('join');
    expect(hand.store.getState().tool).toBe('select');
    expect(hand.asked()).toBe('join');
    hand.key('cancel');
    expect(hand.asked()).toBeNull();
    expect(hand.chosen().kind).toBe('line');
    hand.key('cancel');
    expect(hand.chosen().kind).toBe('none');
  });

  it('asks no more once another line is chosen, the line goes or another tool is taken', () => {
    const hand = toolHand({ [LINE_A]: level, [LINE_B]: plumb });
    hand.click(150, 100);
    hand.op('trim');
    hand.store.select({ kind: 'line', ids: [LINE_B] });
    expect(hand.asked()).toBeNull();
    hand.op('trim');
    hand.store.run('gone', [{ op: 'remove', entityId: LINE_B }]);
    expect(hand.asked()).toBeNull();
    hand.store.select({ kind: 'line', ids: [LINE_A] });
    hand.op('extend');
    hand.store.setTool('flowLine');
    expect(hand.asked()).toBeNull();
  });
});

describe('splitting', () => {
  it('goes at the chosen vertex at once: one step, the longer piece keeps its id and all that was typed', () => {
    const named = {
      ...level,
      name: '4',
      drops: 3,
      points: [...level.points, [420, 100] as [number, number]],
    };
    const hand = toolHand({ [LINE_A]: named });
    hand.click(150, 100);
    hand.click(200, 100);
    hand.op('split');
    expect(hand.points(LINE_A)).toEqual([
      [200, 100],
      [300, 100],
      [420, 100],
    ]);
    expect(hand.lines()).toMatchObject([
      { name: '4', drops: 3, points: [{}, {}] },
      { name: '4', drops: 3 },
    ]);
    expect(hand.labels).toEqual(['split an equipotential 4']);
    hand.store.undo();
    expect(hand.lines()).toEqual([named]);
  });

  it('goes at a place that is clicked, shown before, and not at an end', () => {
    const hand = toolHand({ [LINE_A]: level });
    hand.click(150, 100);
    hand.op('split');
    expect(hand.overlay(140, 103).sketches).toEqual([{ kind: 'place', points: [[140, 100]] }]);
    hand.click(600, 600);
    expect(hand.notice()).toMatch(/Click a place on the equipotential/);
    hand.click(100, 100);
    expect(hand.notice()).toMatch(/end of the line/);
    expect(hand.asked()).toBe('split');
    hand.click(140, 103);
    expect(hand.asked()).toBeNull();
    expect(
      hand
        .lines()
        .map(({ points }) => points.length)
        .sort(),
    ).toEqual([2, 3]);
  });

  it('leaves the id with the piece that has the notes', () => {
    const balloons = [{ id: 'n', at: sheetPx(120, 104), lineId: LINE_A }];
    const hand = toolHand({ [LINE_A]: level }, { balloons });
    hand.store.select({ kind: 'line', ids: [LINE_A] });
    hand.op('split');
    hand.click(140, 100);
    expect(hand.points(LINE_A)).toEqual([
      [100, 100],
      [140, 100],
    ]);
  });

  it('of a line that someone else has changed meanwhile comes back as a conflict about that line', () => {
    const hand = toolHand({ [LINE_A]: level });
    hand.click(150, 100);
    hand.click(200, 100);
    hand.op('split');
    hand.store.acknowledge(
      [
        {
          entityId: LINE_A,
          outcome: 'conflict',
          version: 2,
          current: { id: LINE_A, version: 2, value: { ...level, name: 'theirs' } },
          changedBy: null,
        },
      ],
      1,
    );
    hand.store.resolveConflict(LINE_A, 'theirs');
    expect(hand.lines()).toHaveLength(2);
    expect(hand.store.getState().document.entities[LINE_A]?.value).toMatchObject({ name: 'theirs' });
  });
});

describe('trimming', () => {
  it('asks for the line to trim at, shows what goes, and keeps the longer piece; Shift the other', () => {
    const hand = toolHand({ [LINE_A]: level, [LINE_B]: plumb });
    hand.click(150, 100);
    hand.op('trim');
    const lost = [
      [250, 100],
      [300, 100],
    ];
    expect(hand.overlay(251, 300).sketches).toEqual([
      { kind: 'lost', points: lost },
      { kind: 'place', points: [[250, 100]] },
    ]);
    expect(hand.overlay(251, 300, { shift: true }).sketches?.[0]?.points).toHaveLength(3);
    expect(hand.overlay(600, 600).sketches).toEqual([]);
    hand.click(251, 300);
    expect(hand.points(LINE_A).at(-1)).toEqual([250, 100]);
    expect(hand.labels).toEqual(['trimmed an equipotential']);
    hand.store.undo();
    hand.op('trim');
    hand.click(251, 300, { shift: true });
    expect(hand.points(LINE_A)).toEqual([
      [250, 100],
      [300, 100],
    ]);
  });

  it('takes the end off that is clicked, and says why it cannot', () => {
    const hand = toolHand({ [LINE_A]: level, [LINE_B]: plumb });
    hand.click(150, 100);
    hand.op('trim');
    hand.click(290, 100);
    expect(hand.points(LINE_A).at(-1)).toEqual([250, 100]);
    hand.op('trim');
    hand.click(150, 100);
    expect(hand.notice()).toMatch(/nothing to cut it at/);
    hand.click(250, 300);
    expect(hand.notice()).toMatch(/do not meet away from its ends/);
  });

  it('tells of a note about the piece cut off', () => {
    const balloons = [{ id: 'n', at: sheetPx(295, 96), lineId: LINE_A }];
    const hand = toolHand({ [LINE_A]: level, [LINE_B]: plumb }, { balloons });
    hand.store.select({ kind: 'line', ids: [LINE_A] });
    hand.op('trim');
    hand.click(250, 300);
    expect(hand.notice()).toMatch(/note about the piece cut off/);
  });
});

describe('extending', () => {
  const short = tracedLine([
    [100, 100],
    [180, 100],
  ]);

  it('goes straight on to the line clicked, shown before', () => {
    const hand = toolHand({ [LINE_A]: short, [LINE_B]: plumb });
    hand.click(150, 100);
    hand.op('extend');
    expect(hand.overlay(250, 300).sketches?.[0]).toEqual({
      kind: 'gained',
      points: [
        [180, 100],
        [250, 100],
      ],
    });
    hand.click(250, 300);
    expect(hand.points(LINE_A)).toEqual([...short.points, [250, 100]]);
    expect(hand.labels).toEqual(['extended an equipotential']);
  });

  it('goes on at the end clicked to the first line in the way, unfinished lines too', () => {
    const hand = toolHand({ [LINE_A]: { ...short, finished: false }, [LINE_B]: plumb });
    hand.click(150, 100);
    hand.op('extend');
    hand.click(104, 100);
    expect(hand.notice()).toMatch(/meets no other/);
    hand.click(176, 100);
    expect(hand.points(LINE_A).at(-1)).toEqual([250, 100]);
  });

  it('says why it cannot: it crosses already, ends there, or passes by', () => {
    const hand = toolHand({ [LINE_A]: level, [LINE_B]: plumb });
    hand.click(150, 100);
    hand.op('extend');
    hand.click(250, 300);
    expect(hand.notice()).toMatch(/crosses the impervious boundary already/);
    const by = toolHand({
      [LINE_A]: short,
      [LINE_B]: tracedLine([
        [300, 300],
        [400, 300],
      ]),
    });
    by.click(150, 100);
    by.op('extend');
    by.click(350, 300);
    expect(by.notice()).toMatch(/neither end meets/);
    const on = toolHand({
      [LINE_A]: short,
      [LINE_B]: tracedLine([
        [180, 20],
        [180, 200],
      ]),
    });
    on.click(150, 100);
    on.op('extend');
    on.click(180, 170);
    expect(on.notice()).toMatch(/ends on the equipotential already/);
  });
});

describe('joining', () => {
  const right = tracedLine([
    [420, 110],
    [320, 104],
  ]);

  it('makes one line of two in the direction of the first, as one step', () => {
    const hand = toolHand({ [LINE_A]: { ...level, drops: 2 }, [LINE_B]: { ...right, name: '7' } });
    hand.click(150, 100);
    hand.op('join');
    expect(hand.overlay(400, 109).sketches).toEqual([
      {
        kind: 'gained',
        points: [
          [300, 100],
          [320, 104],
        ],
      },
    ]);
    hand.click(400, 109);
    expect(hand.lines()).toEqual([
      { ...level, drops: 2, name: '7', points: [...level.points, [320, 104], [420, 110]] },
    ]);
    expect(hand.chosen()).toMatchObject({ kind: 'line', ids: [LINE_A] });
    hand.store.undo();
    expect(hand.lines()).toHaveLength(2);
  });

  it('joins two chosen lines at once, and keeps the id that the notes are about', () => {
    const balloons = [{ id: 'n', at: sheetPx(400, 100), lineId: LINE_B }];
    const hand = toolHand({ [LINE_A]: level, [LINE_B]: right }, { balloons });
    hand.store.select({ kind: 'several', ids: [LINE_A, LINE_B] });
    hand.op('join');
    expect(Object.keys(hand.store.getState().document.entities)).toEqual([LINE_B]);
    expect(hand.points(LINE_B)[0]).toEqual([100, 100]);
  });

  it('tells of the notes when both lines have some', () => {
    const balloons = [
      { id: 'n', at: sheetPx(150, 60), lineId: LINE_A },
      { id: 'm', at: sheetPx(400, 60), lineId: LINE_B },
    ];
    const hand = toolHand({ [LINE_A]: level, [LINE_B]: right }, { balloons });
    hand.store.select({ kind: 'several', ids: [LINE_A, LINE_B] });
    hand.op('join');
    expect(hand.notice()).toMatch(/notes about the other line/);
  });

  it.each([
    [{ line: 'flowLine' as const }, /an equipotential and a flow line are not joined/i],
    [{ head: 110 }, /different heads, 112 and 110/],
    [{ drops: 3 }, /typed head, the other a typed count/],
    [
      {
        points: [
          [800, 600],
          [810, 600],
        ] as Array<[number, number]>,
      },
      /farther than the shorter line is long \(24 px\)/,
    ],
  ])('is refused with the reason: %j', (changes, reason) => {
    const hand = toolHand({ [LINE_A]: { ...level, head: 112 }, [LINE_B]: { ...right, ...changes } });
    hand.store.select({ kind: 'several', ids: [LINE_A, LINE_B] });
    hand.op('join');
    expect(hand.notice()).toMatch(reason);
    expect(hand.lines()).toHaveLength(2);
  });

  it('with a line that someone else changed meanwhile leaves that line to be settled, the joined one stands', () => {
    const hand = toolHand({ [LINE_A]: level, [LINE_B]: right });
    hand.store.select({ kind: 'several', ids: [LINE_A, LINE_B] });
    hand.op('join');
    const theirs = { ...right, name: 'theirs' };
    hand.store.acknowledge(
      [
        { entityId: LINE_A, outcome: 'applied', version: 2, current: null, changedBy: null },
        {
          entityId: LINE_B,
          outcome: 'conflict',
          version: 2,
          current: { id: LINE_B, version: 2, value: theirs },
          changedBy: null,
        },
      ],
      1,
    );
    expect(hand.store.getState().conflicts[LINE_B]).toMatchObject({ mine: null, theirs: { name: 'theirs' } });
    hand.store.resolveConflict(LINE_B, 'theirs');
    expect(hand.points(LINE_B)).toEqual(right.points);
    expect(hand.points(LINE_A)).toHaveLength(5);
  });

  it('is finished only when both lines were', () => {
    const hand = toolHand({ [LINE_A]: level, [LINE_B]: { ...right, finished: false } });
    hand.store.select({ kind: 'several', ids: [LINE_A, LINE_B] });
    hand.op('join');
    expect(hand.lines()).toMatchObject([{ finished: false }]);
  });
});

describe('turning round and smoothing', () => {
  it('turns all chosen lines round', () => {
    const hand = toolHand({ [LINE_A]: level, [LINE_B]: plumb });
    hand.store.select({ kind: 'several', ids: [LINE_A, LINE_B] });
    hand.op('reverse');
    expect(hand.points(LINE_A)[0]).toEqual([300, 100]);
    expect(hand.points(LINE_B)[0]).toEqual([250, 400]);
    expect(hand.labels).toEqual(['turned 2 lines round']);
  });

  it('takes the tremor off within the tracing accuracy, and says when there is none', () => {
    const noise = seededNoise(3);
    const rough = tracedLine(
      Array.from({ length: 60 }, (_, i): [number, number] => [100 + 6 * i, 100 + 0.8 * noise()]),
    );
    const hand = toolHand({ [LINE_A]: rough, [LINE_B]: level });
    hand.store.select({ kind: 'several', ids: [LINE_A, LINE_B] });
    hand.op('smooth');
    const stray = (points: ReadonlyArray<readonly [number, number]>) =>
      points.reduce((sum, [, y]) => sum + (y - 100) ** 2, 0);
    expect(stray(hand.points(LINE_A))).toBeLessThan(0.5 * stray(rough.points));
    expect(hand.points(LINE_A)[0]).toEqual(rough.points[0]);
    expect(hand.points(LINE_B)).toEqual(level.points);
    hand.store.select({ kind: 'line', ids: [LINE_B] });
    hand.op('smooth');
    expect(hand.notice()).toMatch(/no tremor/);
  });
});
