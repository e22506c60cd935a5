import { describe, expect, it } from 'vitest';
import { createDeskStore } from '#client/features/desk/model/desk-store.ts';
import type { SnapKind } from '#client/features/desk/model/tool-overlay.ts';
import { createToolHost } from '#client/features/desk/tools/tool-host.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import type { DocumentEntity } from '#shared/contract/document.ts';
import { countedIds, documentWith, LINE_A, LINE_B, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const NO_KEYS = { shift: false, alt: false, ctrl: false };
const BASE = tracedLine(
  [
    [0, 500],
    [300, 500],
    [600, 500],
  ],
  { line: 'impervious' },
);

/** A hand that traces a flow line; one sheet pixel is one screen pixel and things are met within 8 px. */
function desk(values: Record<string, DocumentEntity>) {
  const store = createDeskStore({ document: documentWith(values) }, { newId: countedIds() });
  const host = createToolHost(store);
  const view = { zoom: 1, reachPx: 8, balloons: [] };
  store.setTool('flowLine');
  return {
    store,
    snap: (x: number, y: number, keys = {}) =>
      host.overlay(sheetPx(x, y), { ...NO_KEYS, ...keys }, view).snap,
    click: (x: number, y: number) =>
      host.handle({ type: 'click', at: sheetPx(x, y), keys: NO_KEYS, count: 1 }, view),
    only: (...snapKinds: SnapKind[]) => store.setAids({ snapKinds }),
  };
}

describe('snapping', () => {
  it('meets nothing on an empty sheet, nor beyond its reach', () => {
    expect(desk({}).snap(100, 100)).toBeNull();
    expect(desk({ [LINE_A]: BASE }).snap(150, 508.5)).toBeNull();
  });

  it('is suspended by Alt and by Ctrl', () => {
    const hand = desk({ [LINE_A]: BASE });
    expect(hand.snap(150, 503)).not.toBeNull();
    expect(hand.snap(150, 503, { alt: true })).toBeNull();
    expect(hand.snap(150, 503, { ctrl: true })).toBeNull();
  });

  it('takes an end before a vertex before a place along the line', () => {
    const hand = desk({ [LINE_A]: BASE });
    expect(hand.snap(597, 504)).toMatchObject({ kind: 'end', at: [600, 500], lineId: LINE_A });
    expect(hand.snap(303, 504)).toMatchObject({ kind: 'vertex', at: [300, 500] });
    expect(hand.snap(150, 504)).toMatchObject({ kind: 'boundary', at: [150, 500] });
  });

  it('tells a boundary from a line of the net', () => {
    const hand = desk({ [LINE_A]: { ...BASE, line: 'equipotential' } });
    expect(hand.snap(150, 504)).toMatchObject({ kind: 'line', at: [150, 500] });
  });

  it('finds where two lines cross', () => {
    const across = tracedLine([
      [140, 400],
      [160, 600],
    ]);
    const hand = desk({ [LINE_A]: BASE, [LINE_B]: across });
    const snap = hand.snap(153, 504);
    expect(snap?.kind).toBe('crossing');
    expect(snap?.at[0]).toBeCloseTo(150, 9);
    expect(snap?.at[1]).toBeCloseTo(500, 9);
  });

  it('meets a line at a right angle from the last point, and not from a place on that line', () => {
    const slope = tracedLine(
      [
        [0, 400],
        [400, 0],
      ],
      { line: 'impervious' },
    );
    const hand = desk({ [LINE_A]: slope });
    hand.click(300, 300);
    const snap = hand.snap(204, 201);
    expect(snap?.kind).toBe('rightAngle');
    expect(snap?.at[0]).toBeCloseTo(200, 9);
    expect(snap?.at[1]).toBeCloseTo(200, 9);
    const onIt = desk({ [LINE_A]: slope });
    onIt.click(200, 200);
    expect(onIt.snap(204, 199)?.kind).toBe('boundary');
  });

  it('judges the right angle in the transformed section', () => {
    const slope = tracedLine(
      [
        [0, 400],
        [400, 0],
      ],
      { line: 'impervious' },
    );
    const hand = desk({ [LINE_A]: slope });
    // Lengths along the sheet halved: the slope runs by (200, −400), and the last point lies at (150, −100) from its
    // beginning, so that the foot lies at the part (150·200 + 100·400)/(200² + 400²) = 0.35 of it.
    const reading = { frame: { matrix: [0.5, 0, 0, 1] } } as unknown as ReturnType<
      typeof hand.store.getState
    >['reading'];
    hand.store.setState({ reading });
    hand.click(300, 300);
    const snap = hand.snap(142, 258);
    expect(snap?.kind).toBe('rightAngle');
    expect(snap?.at[0]).toBeCloseTo(140, 9);
    expect(snap?.at[1]).toBeCloseTo(260, 9);
  });

  it('draws a line on beyond its end, and to where that meets another line', () => {
    const short = tracedLine([
      [100, 100],
      [200, 200],
    ]);
    const hand = desk({ [LINE_A]: BASE, [LINE_B]: short });
    expect(hand.snap(302, 300)).toBeNull();
    hand.only('extension');
    const on = hand.snap(302, 300);
    expect(on).toMatchObject({ kind: 'extension', lineId: LINE_B, from: [200, 200] });
    expect(on?.at[0]).toBeCloseTo(301, 9);
    expect(on?.at[1]).toBeCloseTo(301, 9);
    expect(hand.snap(150, 150)).toBeNull();
    const steep = tracedLine([
      [390, 100],
      [395, 200],
    ]);
    const met = desk({ [LINE_A]: BASE, [LINE_B]: steep });
    met.only('extension');
    const snap = met.snap(410.5, 499);
    expect(snap?.at[0]).toBeCloseTo(410, 9);
    expect(snap?.at[1]).toBeCloseTo(500, 9);
  });

  it('keeps to the kinds that are switched on', () => {
    const hand = desk({ [LINE_A]: BASE });
    hand.only('line');
    expect(hand.snap(597, 504)).toBeNull();
    hand.only('boundary');
    expect(hand.snap(597, 504)).toMatchObject({ kind: 'boundary', at: [597, 500] });
  });

  it('passes over hidden lines, and meets locked ones, which cannot be picked', () => {
    const hand = desk({ [LINE_A]: BASE });
    hand.store.setHidden(['impervious']);
    expect(hand.snap(150, 504)).toBeNull();
    hand.store.setHidden([]);
    hand.store.setLocked(['impervious']);
    expect(hand.snap(150, 504)).not.toBeNull();
    hand.store.setTool('select');
    hand.click(150, 500);
    expect(hand.store.getState().selection.kind).toBe('none');
  });

  it('answers within 2 ms on a sheet of 200 lines with 5,000 vertices', () => {
    const values: Record<string, DocumentEntity> = {};
    for (let i = 0; i < 200; i += 1) {
      const points = Array.from({ length: 25 }, (_, k): [number, number] => [
        5 * i + 3 * Math.sin(k),
        28 * k,
      ]);
      values[`000000${String(i).padStart(2, '0')}-0000-7000-8000-${String(i).padStart(12, '0')}`] =
        tracedLine(points);
    }
    const hand = desk(values);
    hand.only('end', 'crossing', 'vertex', 'rightAngle', 'boundary', 'line', 'extension');
    hand.click(500, 350);
    hand.snap(100, 100);
    // The processor's time: the clock's depends on what else the machine does.
    const began = process.cpuUsage();
    for (let i = 0; i < 400; i += 1) hand.snap((i * 37) % 1000, (i * 53) % 700);
    expect(process.cpuUsage(began).user / 1000 / 400).toBeLessThan(2);
  });
});
