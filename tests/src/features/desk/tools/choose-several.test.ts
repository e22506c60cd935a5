import { describe, expect, it } from 'vitest';
import { type DocumentEntity, entitiesOf, UNSAID } from '#shared/contract/document.ts';
import { LINE_A, LINE_B, POINT_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';
import { toolHand } from '#tests/support/desk/tool-hand.ts';

const KNOWN = '000000b0-0000-7000-8000-000000000000';
const upper = tracedLine([
  [100, 100],
  [300, 100],
]);
const lower = tracedLine(
  [
    [100, 200],
    [300, 200],
  ],
  { line: 'flowLine', drops: null },
);
const point: DocumentEntity = {
  kind: 'readingPoint',
  ...UNSAID.readingPoint,
  name: 'P1',
  place: { on: 'sheet', at: [200, 150] },
  order: 1,
};
const typed: DocumentEntity = { ...point, place: { on: 'section', offset: 1, elevation: 2 } };
const known: DocumentEntity = {
  kind: 'knownPoint',
  name: 'K1',
  at: [250, 160],
  offset: null,
  elevation: null,
  use: 'fit',
};
const all = { [LINE_A]: upper, [LINE_B]: lower, [POINT_A]: point, [KNOWN]: known };

describe('choosing several', () => {
  it('adds and leaves out by Shift and click, down to one and to none', () => {
    const hand = toolHand(all);
    hand.click(150, 100);
    hand.click(150, 200, { shift: true });
    hand.click(200, 150, { shift: true });
    expect(hand.chosen()).toMatchObject({ kind: 'several', ids: [LINE_A, LINE_B, POINT_A] });
    hand.click(600, 600, { shift: true });
    expect(hand.chosen().ids).toHaveLength(3);
    hand.click(150, 100, { shift: true });
    hand.click(150, 200, { shift: true });
    expect(hand.chosen()).toMatchObject({ kind: 'readingPoint', ids: [POINT_A] });
    hand.click(200, 150, { shift: true });
    expect(hand.chosen().kind).toBe('none');
  });

  it('leaves known points alone, and says so', () => {
    const hand = toolHand(all);
    hand.click(150, 100);
    hand.click(250, 160, { shift: true });
    expect(hand.chosen().ids).toEqual([LINE_A]);
    expect(hand.notice()).toMatch(/chosen on its own/);
    hand.edit({ type: 'chooseAll' });
    expect(hand.chosen().ids).toEqual([LINE_A, LINE_B, POINT_A]);
  });

  it('chooses what lies wholly inside a rectangle drawn with Shift', () => {
    const hand = toolHand(all);
    hand.press(80, 80, { shift: true });
    hand.move(320, 160, { shift: true });
    expect(hand.overlay(320, 160).sketches?.[0]).toMatchObject({
      kind: 'frame',
      points: [{}, {}, {}, {}, {}],
    });
    expect(hand.host.grabs()).toBe(true);
    hand.drag([320, 160], [80, 80], { shift: true });
    expect(hand.chosen().ids).toEqual([LINE_A, POINT_A]);
    hand.drag([80, 180], [320, 220], { shift: true });
    expect(hand.chosen().ids).toEqual([LINE_A, POINT_A, LINE_B]);
    hand.drag([150, 60], [400, 140], { shift: true });
    expect(hand.chosen().ids).toHaveLength(3);
  });

  it('leaves out what is hidden or locked', () => {
    const hand = toolHand(all);
    hand.store.setHidden(['readingPoint']);
    hand.store.setLocked(['flowLine']);
    hand.edit({ type: 'chooseAll' });
    expect(hand.chosen()).toMatchObject({ kind: 'line', ids: [LINE_A] });
    hand.drag([50, 50], [400, 400], { shift: true });
    expect(hand.chosen().ids).toEqual([LINE_A]);
    hand.store.setLocked([]);
    hand.edit({ type: 'chooseAll' });
    hand.store.setLocked(['flowLine']);
    expect(hand.chosen()).toMatchObject({ kind: 'line', ids: [LINE_A] });
  });

  it('goes by plain clicks after it was asked for, as a finger needs it', () => {
    const hand = toolHand(all);
    hand.click(150, 100);
    hand.edit({ type: 'chooseMore' });
    hand.click(150, 200);
    hand.click(200, 150);
    expect(hand.chosen().ids).toHaveLength(3);
    hand.edit({ type: 'chooseMore' });
    hand.click(150, 100);
    expect(hand.chosen().ids).toEqual([LINE_A]);
  });

  it('keeps no more chosen than there is: others may remove it', () => {
    const hand = toolHand(all);
    hand.edit({ type: 'chooseAll' });
    const gone = (id: string, version: number) => ({
      id,
      version,
      value: null,
      changedBy: null,
      clientId: null,
    });
    hand.store.receive({ changeNumber: 2, entities: [gone(LINE_A, 2), gone(POINT_A, 2)] });
    expect(hand.chosen()).toEqual({ kind: 'line', ids: [LINE_B], vertex: null });
  });
});

describe('moving what is chosen', () => {
  it('moves all by dragging one of them, as one step', () => {
    const hand = toolHand(all);
    hand.edit({ type: 'chooseAll' });
    hand.press(200, 100);
    hand.move(210, 130);
    expect(Object.keys(hand.store.getState().preview)).toHaveLength(3);
    expect(hand.points(LINE_A)).toEqual(upper.points);
    hand.drag([200, 100], [210, 130]);
    expect(hand.points(LINE_A)).toEqual([
      [110, 130],
      [310, 130],
    ]);
    expect(hand.store.getState().document.entities[POINT_A]?.value).toMatchObject({
      place: { on: 'sheet', at: [210, 180] },
    });
    expect(hand.store.getState().document.entities[KNOWN]?.value).toEqual(known);
    expect(hand.labels).toEqual(['moved 2 lines and 1 reading point']);
    hand.store.undo();
    expect(hand.points(LINE_B)).toEqual(lower.points);
  });

  it('moves nothing by an unsteady hand, and a chosen line by its body, level with Shift', () => {
    const hand = toolHand(all);
    hand.click(200, 100);
    hand.drag([200, 100], [202, 102]);
    expect(hand.labels).toEqual([]);
    hand.drag([180, 100], [180, 140]);
    expect(hand.points(LINE_A)[0]).toEqual([100, 140]);
    hand.press(180, 140);
    hand.move(230, 144, { shift: true });
    hand.store.setPreview({});
    hand.drag([180, 140], [230, 140]);
    expect(hand.points(LINE_A)[0]).toEqual([150, 140]);
  });

  it('moves by arrow keys, shown at once and one step for a key held', () => {
    const hand = toolHand(all);
    hand.edit({ type: 'chooseAll' });
    for (let i = 0; i < 5; i += 1) hand.edit({ type: 'nudge', by: [1, 0] });
    hand.edit({ type: 'nudge', by: [0, -10] });
    expect(hand.labels).toEqual([]);
    expect(hand.store.getState().preview[LINE_A]).toMatchObject({
      points: [
        [105, 90],
        [305, 90],
      ],
    });
    hand.edit({ type: 'settle' });
    expect(hand.labels).toHaveLength(1);
    expect(hand.points(LINE_A)[0]).toEqual([105, 90]);
    expect(hand.store.getState().preview).toEqual({});
  });

  it('moves one chosen vertex by arrow keys, and makes the step before anything else happens', () => {
    const hand = toolHand(all);
    hand.click(200, 100);
    hand.click(300, 100);
    hand.edit({ type: 'nudge', by: [0, 1] });
    hand.op('reverse');
    expect(hand.points(LINE_A)).toEqual([
      [300, 101],
      [100, 100],
    ]);
    expect(hand.labels).toEqual(['moved a point of an equipotential', 'turned an equipotential round']);
  });

  it('by typed steps, and not off the sheet; a point typed by its coordinates stays', () => {
    const hand = toolHand({ ...all, [POINT_A]: typed });
    hand.store.select({ kind: 'several', ids: [LINE_A, POINT_A] });
    hand.edit({ type: 'moveBy', by: [2.5, 0], asCopy: false });
    expect(hand.points(LINE_A)[0]).toEqual([102.5, 100]);
    expect(hand.notice()).toMatch(/1 thing typed by coordinates stayed/);
    hand.edit({ type: 'moveBy', by: [2e6, 0], asCopy: false });
    expect(hand.notice()).toMatch(/too far off the sheet/);
    hand.store.select({ kind: 'readingPoint', ids: [POINT_A] });
    hand.edit({ type: 'nudge', by: [1, 0] });
    expect(hand.notice()).toMatch(/stays where its figures say/);
  });
});

describe('copying, removing and changing what is chosen', () => {
  it('pastes copies beside the original and chooses them, without name, count and origin', () => {
    const hand = toolHand({ ...all, [LINE_A]: { ...upper, name: '4', drops: 3, origin: 'adopted' } });
    hand.edit({ type: 'chooseAll' });
    hand.edit({ type: 'copy' });
    hand.edit({ type: 'paste' });
    expect(hand.lines()).toHaveLength(4);
    expect(hand.lines()).toContainEqual({
      ...upper,
      points: [
        [116, 116],
        [316, 116],
      ],
    });
    expect(hand.chosen().ids).toHaveLength(3);
    expect(hand.chosen().ids).not.toContain(LINE_A);
    const points = entitiesOf(hand.store.getState().document, 'readingPoint');
    expect(points.map(({ value }) => [value.name, value.order])).toContainEqual(['P2', 2]);
    hand.edit({ type: 'paste' });
    expect(hand.lines()).toContainEqual(
      expect.objectContaining({
        points: [
          [132, 132],
          [332, 132],
        ],
      }),
    );
    hand.store.undo();
    hand.store.undo();
    expect(hand.lines()).toHaveLength(2);
  });

  it('says when nothing was copied, and duplicates without touching what was', () => {
    const hand = toolHand(all);
    hand.edit({ type: 'paste' });
    expect(hand.notice()).toMatch(/Nothing has been copied/);
    hand.edit({ type: 'duplicate' });
    expect(hand.notice()).toMatch(/Nothing is chosen/);
    hand.click(150, 100);
    hand.edit({ type: 'duplicate' });
    expect(hand.labels).toEqual(['copied an equipotential']);
    hand.edit({ type: 'moveBy', by: [0, 30], asCopy: true });
    expect(hand.lines()).toHaveLength(4);
    expect(hand.lines()).toContainEqual(
      expect.objectContaining({
        points: [
          [116, 146],
          [316, 146],
        ],
      }),
    );
  });

  it('removes all in one step', () => {
    const hand = toolHand(all);
    hand.edit({ type: 'chooseAll' });
    hand.key('remove');
    expect(hand.labels).toEqual(['removed 2 lines and 1 reading point']);
    expect(Object.keys(hand.store.getState().document.entities)).toEqual([KNOWN]);
    hand.store.undo();
    expect(Object.keys(hand.store.getState().document.entities)).toHaveLength(4);
  });

  it('gives all lines one kind in one step, and takes what only made sense for the old one', () => {
    const hand = toolHand({ ...all, [LINE_A]: { ...upper, drops: 3 } });
    hand.edit({ type: 'chooseAll' });
    hand.edit({ type: 'changeKind', line: 'flowLine' });
    expect(hand.lines().map(({ line, drops }) => [line, drops])).toEqual([
      ['flowLine', null],
      ['flowLine', null],
    ]);
    expect(hand.labels).toEqual(['changed 1 line to: flow line']);
  });
});
