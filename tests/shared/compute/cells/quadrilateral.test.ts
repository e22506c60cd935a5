import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type CellSides, evenlyAlong, measureCell, outlineOf } from '#shared/compute/cells/quadrilateral.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';

const line = (at: (part: number) => Pair, pieces = 200): Pair[] =>
  Array.from({ length: pieces + 1 }, (_, i) => at(i / pieces));

/** The cell between two arcs (radii a < b) and two rays, the flow along the arcs. */
function ringCell(a: number, b: number, angle: number): CellSides {
  const at = (radius: number, turn: number): Pair => [radius * Math.cos(turn), radius * Math.sin(turn)];
  return {
    before: line((part) => at(a + part * (b - a), 0)),
    after: line((part) => at(a + part * (b - a), angle)),
    left: line((part) => at(a, part * angle)),
    right: line((part) => at(b, part * angle)),
  };
}

describe('measures of a cell', () => {
  it('are those of a rectangle', () => {
    const cell = measureCell({
      before: [
        [0, 0],
        [0, 30],
      ],
      after: [
        [40, 0],
        [40, 30],
      ],
      left: [
        [0, 0],
        [40, 0],
      ],
      right: [
        [0, 30],
        [40, 30],
      ],
    });
    expect(cell.length).toBeCloseTo(40, 12);
    expect(cell.width).toBeCloseTo(30, 12);
    expect(cell.midAngleDeg).toBeCloseTo(90, 12);
    expect(cell.middle).toEqual([20, 15]);
    expect(cell.area).toBeCloseTo(1200, 9);
  });

  it('are the arc half-way and the distance of the arcs between two arcs and two rays (plane geometry)', () => {
    const cell = measureCell(ringCell(100, 150, 0.4));
    // Chords in four pieces are shorter than the arc by θ²/(24·16).
    expect(cell.length).toBeCloseTo(0.4 * 125, 1);
    expect(cell.width).toBeCloseTo(50, 3);
    expect(cell.area).toBeCloseTo(0.2 * (150 ** 2 - 100 ** 2), 0);
  });

  it('give the flow through a ring, ln(b/a)/θ, to second order', () => {
    // Flow for a unit of head through a sector of a ring, round it: ln(b/a)/θ (polar coordinates).
    for (const ratio of [1.1, 1.3, 1.6]) {
      const cell = measureCell(ringCell(100, 100 * ratio, Math.log(ratio)));
      expect(Math.abs(cell.width / cell.length - 1)).toBeLessThan((ratio - 1) ** 2 / 11);
    }
  });

  it('turn the angle between the mid-lines with a skew', () => {
    const cell = measureCell({
      before: [
        [0, 0],
        [10, 10],
      ],
      after: [
        [10, 0],
        [20, 10],
      ],
      left: [
        [0, 0],
        [10, 0],
      ],
      right: [
        [10, 10],
        [20, 10],
      ],
    });
    expect(cell.midAngleDeg).toBeCloseTo(45, 9);
  });

  it('are unchanged by turning, shifting and mirroring, and grow with the scale', () => {
    const sides = ringCell(80, 120, 0.6);
    const plain = measureCell(sides);
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 6.28, noNaN: true }),
        fc.double({ min: 0.5, max: 20, noNaN: true }),
        fc.double({ min: -1e5, max: 1e5, noNaN: true }),
        fc.boolean(),
        (turn, scale, shift, mirrored) => {
          const move = ([x, y]: Pair): Pair => [
            shift + scale * (Math.cos(turn) * x - Math.sin(turn) * y),
            (mirrored ? -1 : 1) * scale * (Math.sin(turn) * x + Math.cos(turn) * y) - shift,
          ];
          const moved = measureCell({
            before: sides.before.map(move),
            after: sides.after.map(move),
            left: sides.left.map(move),
            right: sides.right.map(move),
          });
          expect(moved.length / (scale * plain.length)).toBeCloseTo(1, 8);
          expect(moved.width / (scale * plain.width)).toBeCloseTo(1, 8);
        },
      ),
      { numRuns: 50 },
    );
  });

  it('part a run of points evenly, its corners wherever they are', () => {
    const parted = evenlyAlong(
      [
        [0, 0],
        [1, 0],
        [1, 0],
        [4, 0],
        [4, 4],
      ],
      4,
    );
    expect(parted).toEqual([
      [0, 0],
      [2, 0],
      [4, 0],
      [4, 2],
      [4, 4],
    ]);
    expect(outlineOf(ringCell(1, 2, 1))).toHaveLength(8);
  });
});
