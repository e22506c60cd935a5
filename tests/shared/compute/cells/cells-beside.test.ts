import { describe, expect, it } from 'vitest';
import { cellsBeside, type FamilyLine, type NetFamily } from '#shared/compute/cells/cells-beside.ts';
import type { ExactNet } from '#shared/compute/exact/exact-net.ts';
import { lengthOf, type Polyline, pointAlong, polylineOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { LineKind } from '#shared/contract/document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const through = (...points: Pair[]): Polyline => polylineOf(points)!;
const line = (id: string, family: NetFamily, ...points: Pair[]): FamilyLine => ({
  id,
  family,
  shape: through(...points),
});

/** Upright head lines 100 apart, level flow lines `spacing` apart. */
function grid(spacing: number): FamilyLine[] {
  const heads = [100, 200, 400].map((x) => line(`h${x}`, 'head', [x, 0], [x, 1000]));
  const flows = [0, 1, 2].map((i) => line(`f${i}`, 'flow', [0, 200 + i * spacing], [500, 200 + i * spacing]));
  return [...heads, ...flows];
}

const ON_SHEET: Readonly<Partial<Record<LineKind, NetFamily>>> = {
  equipotential: 'head',
  submergedFace: 'head',
  drain: 'head',
  flowLine: 'flow',
  impervious: 'flow',
  phreaticLine: 'flow',
};
const PARTS = 400;

/** The lines of an exact net, in pixels of 100 to the unit with y downwards. */
function linesOf(net: ExactNet): FamilyLine[] {
  return net.lines.flatMap(({ line: kind, at }, i) => {
    const family = ON_SHEET[kind];
    if (family === undefined) return [];
    const points = Array.from({ length: PARTS + 1 }, (_, k): Pair => {
      const [x, y] = at(k / PARTS);
      return [100 * x, -100 * y];
    });
    return [{ id: `${kind} ${i}`, family, shape: polylineOf(points)! }];
  });
}

describe('the cells beside a line that is drawn', () => {
  it('are none where it meets fewer than two lines of the other family, or has no neighbour', () => {
    const lines = grid(100);
    const short = through([300, 150], [300, 250]);
    expect(cellsBeside({ family: 'head', shape: short }, lengthOf(short), lines, 2)).toEqual([]);
    const alone = lines.filter(({ family }) => family === 'flow');
    const whole = through([300, 150], [300, 450]);
    expect(cellsBeside({ family: 'head', shape: whole }, 100, alone, 2)).toEqual([]);
  });

  it('have B over L of the rectangle between the lines, at either hand', () => {
    const down = through([300, 150], [300, 450]);
    const [left, right] = cellsBeside({ family: 'head', shape: down }, 100, grid(100), 2).sort((a, b) =>
      a.side < b.side ? -1 : 1,
    );
    // Going down the sheet the left hand points to the right of the sheet.
    expect(left).toMatchObject({ side: 'left', neighbour: 'h400', rails: ['f0', 'f1'] });
    expect(right).toMatchObject({ side: 'right', neighbour: 'h200' });
    expect(left?.ratio).toBeCloseTo(1, 9);
    expect(right?.ratio).toBeCloseTo(1, 9);
    const narrow = cellsBeside({ family: 'head', shape: down }, 100, grid(60), 2);
    for (const cell of narrow) expect(cell.ratio).toBeCloseTo(0.6, 9);
  });

  it('are those last closed where the line has not come to the next one, and the next once it is within reach', () => {
    const toward = (y: number) => {
      const shape = through([300, 199], [300, y]);
      return cellsBeside({ family: 'head', shape }, lengthOf(shape), grid(100), 2).map(({ rails }) => rails);
    };
    expect(toward(290)).toEqual([]);
    expect(toward(350)).toEqual([
      ['f0', 'f1'],
      ['f0', 'f1'],
    ]);
    expect(toward(398.5)).toEqual([
      ['f1', 'f2'],
      ['f1', 'f2'],
    ]);
  });

  it('measure a flow line by the same ratio, width across the flow over length along it', () => {
    const level = through([50, 260], [450, 260]);
    const cells = cellsBeside({ family: 'flow', shape: level }, 150, grid(100), 2);
    const ratios = cells.map(({ neighbour, ratio }) => [neighbour, ratio] as const).sort();
    expect(ratios[0]?.[0]).toBe('f0');
    expect(ratios[0]?.[1]).toBeCloseTo(0.6, 9);
    expect(ratios[1]?.[0]).toBe('f1');
    expect(ratios[1]?.[1]).toBeCloseTo(0.4, 9);
  });

  it('see the neighbour and not the line behind it', () => {
    const down = through([450, 150], [450, 450]);
    const cells = cellsBeside({ family: 'head', shape: down }, 100, grid(100), 2);
    expect(cells.map(({ neighbour }) => neighbour)).toEqual(['h400']);
  });

  it.each(EXACT_NETS)('are squares on the exact net of the $name', ({ net }) => {
    const lines = linesOf(net);
    let judged = 0;
    for (const drawn of lines) {
      if (!drawn.id.startsWith('equipotential') && !drawn.id.startsWith('flowLine')) continue;
      const others = lines.filter(({ id }) => id !== drawn.id);
      const middle = lengthOf(drawn.shape) / 2;
      for (const cell of cellsBeside(drawn, middle, others, 2)) {
        judged += 1;
        // Conformal cells of one drop and one channel: B/L differs from 1 by the bend within the cell only.
        expect(Math.abs(cell.ratio - 1), `${drawn.id} and ${cell.neighbour}`).toBeLessThan(0.06);
      }
    }
    expect(judged).toBeGreaterThan(10);
  });

  it('do not change when the line is drawn the other way, except for the hand', () => {
    const { net } = EXACT_NETS[0]!;
    const lines = linesOf(net);
    const drawn = lines.find(({ id }) => id.startsWith('equipotential'))!;
    const others = lines.filter(({ id }) => id !== drawn.id);
    const back = { ...drawn, shape: polylineOf(pointsOf(drawn.shape).reverse())! };
    const at = lengthOf(drawn.shape) * 0.4;
    const there = cellsBeside(drawn, at, others, 2);
    const again = cellsBeside(back, lengthOf(drawn.shape) - at, others, 2);
    expect(there.length).toBeGreaterThan(0);
    for (const cell of there) {
      const same = again.find(({ neighbour }) => neighbour === cell.neighbour);
      expect(same?.side).not.toBe(cell.side);
      expect(same?.ratio).toBeCloseTo(cell.ratio, 6);
    }
  });
});

function pointsOf(shape: Polyline): Pair[] {
  return Array.from(shape.cum, (s) => pointAlong(shape, s));
}
