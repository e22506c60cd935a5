import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  cutAt,
  cutAtVertex,
  distancesOf,
  endPieceOff,
  meetingsAlong,
  trimmedAt,
} from '#shared/compute/geometry/edit-lines/cut.ts';
import { endDirection, endsOn, extendedAt, extendedTo } from '#shared/compute/geometry/edit-lines/extend.ts';
import { joined, reversed, widestGap } from '#shared/compute/geometry/edit-lines/join.ts';
import { shifted, stepInSection, stepOnSheet } from '#shared/compute/geometry/edit-lines/shift.ts';
import { cornersOf, smoothed } from '#shared/compute/geometry/edit-lines/smooth.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { sectionMapOfFit } from '#shared/compute/section-map.ts';
import { seededNoise } from '#tests/support/exact-nets/seeded-noise.ts';

const LEVEL: Pair[] = [
  [0, 0],
  [40, 0],
  [100, 0],
];
const plumbAt = (x: number): Pair[] => [
  [x, -50],
  [x, 50],
];
const arc = (radius: number, count: number, turn: number): Pair[] =>
  Array.from({ length: count }, (_, i) => {
    const angle = (turn * i) / (count - 1);
    return [radius * Math.cos(angle), radius * Math.sin(angle)];
  });
const lengthOf = (points: readonly Pair[]) => distancesOf(points).at(-1)!;

const coordinate = fc.integer({ min: -500, max: 500 });
const randomLine = fc
  .uniqueArray(fc.tuple(coordinate, coordinate), { minLength: 3, maxLength: 30, selector: String })
  .map((points): Pair[] => points);

const turned = (points: readonly Pair[], angle: number): Pair[] => {
  const [c, s] = [Math.cos(angle), Math.sin(angle)];
  return points.map(([x, y]) => [c * x - s * y + 7, s * x + c * y - 3]);
};

function expectSame(a: readonly Pair[], b: readonly Pair[], within = 1e-6): void {
  expect(a.length).toBe(b.length);
  a.forEach(([x, y], i) => {
    expect(Math.hypot(x - b[i]![0], y - b[i]![1])).toBeLessThan(within);
  });
}

describe('a line that is cut', () => {
  it('is not cut at its ends, beyond them, or where it has no length', () => {
    for (const s of [-1, 0, 0.001, 100, 99.995, 120, Number.NaN]) expect(cutAt(LEVEL, s)).toBeNull();
    const still: Pair[] = [
      [5, 5],
      [5, 5],
    ];
    expect(cutAt(still, 0)).toBeNull();
    expect(cutAt([], 1)).toBeNull();
    expect(cutAtVertex(LEVEL, 0)).toBeNull();
    expect(cutAtVertex(LEVEL, 2)).toBeNull();
  });

  it('gets a place of its own between vertices, and takes a vertex that is there', () => {
    expect(cutAt(LEVEL, 70)).toEqual({ before: [LEVEL[0], LEVEL[1], [70, 0]], after: [[70, 0], LEVEL[2]] });
    expect(cutAt(LEVEL, 40.004)).toEqual({ before: [LEVEL[0], LEVEL[1]], after: [LEVEL[1], LEVEL[2]] });
    expect(cutAtVertex(LEVEL, 1)).toEqual({ before: [LEVEL[0], LEVEL[1]], after: [LEVEL[1], LEVEL[2]] });
  });

  it('keeps its whole length and its vertices, whichever way round it is', () => {
    fc.assert(
      fc.property(randomLine, fc.double({ min: 0.05, max: 0.95, noNaN: true }), (points, part) => {
        const s = part * lengthOf(points);
        const cut = cutAt(points, s);
        if (cut === null) return;
        expect(lengthOf(cut.before) + lengthOf(cut.after)).toBeCloseTo(lengthOf(points), 6);
        expect(cut.before.at(-1)).toBe(cut.after[0]);
        for (const point of points) expect([...cut.before, ...cut.after]).toContain(point);
        const back = cutAt(reversed(points), lengthOf(points) - s)!;
        expectSame(reversed(back.after), cut.before, 0.05);
      }),
    );
  });
});

describe('a line that is trimmed', () => {
  const cutters = [plumbAt(20), plumbAt(90)];

  it('stays when it meets nothing, and where it only ends on the other line', () => {
    expect(trimmedAt(LEVEL, plumbAt(200), [200, 0])).toBeNull();
    expect(trimmedAt(LEVEL, plumbAt(100), [100, 0])).toBeNull();
    expect(meetingsAlong(LEVEL, [plumbAt(0), plumbAt(100)])).toEqual([]);
    expect(endPieceOff(LEVEL, [plumbAt(300)], [10, 0])).toBeNull();
  });

  it('keeps its longer piece, and the other one when that is asked for', () => {
    expect(trimmedAt(LEVEL, plumbAt(90), [90, 10])).toEqual({
      kept: [LEVEL[0], LEVEL[1], [90, 0]],
      gone: [[90, 0], LEVEL[2]],
    });
    expect(trimmedAt(LEVEL, plumbAt(90), [90, 10], true)?.kept).toEqual([[90, 0], LEVEL[2]]);
    expect(trimmedAt(LEVEL, plumbAt(20), [20, 0])?.kept).toEqual([[20, 0], LEVEL[1], LEVEL[2]]);
  });

  it('is cut at the meeting that is pointed at when there are several', () => {
    const wave: Pair[] = [
      [20, -10],
      [20, 10],
      [80, 10],
      [80, -10],
    ];
    expect(trimmedAt(LEVEL, wave, [78, 4])?.kept.at(-1)).toEqual([80, 0]);
    expect(trimmedAt(LEVEL, wave, [24, -4])?.kept[0]).toEqual([20, 0]);
  });

  it('loses the end that is pointed at, and nothing between two meetings', () => {
    expect(endPieceOff(LEVEL, cutters, [5, 3])).toMatchObject({ kept: [[20, 0], LEVEL[1], LEVEL[2]] });
    expect(endPieceOff(LEVEL, cutters, [96, 3])).toMatchObject({ kept: [LEVEL[0], LEVEL[1], [90, 0]] });
    expect(endPieceOff(LEVEL, cutters, [50, 3])).toBe('between');
  });

  it('is trimmed alike when the sheet is turned or the line reversed', () => {
    fc.assert(
      fc.property(randomLine, fc.double({ min: 0, max: 6, noNaN: true }), (points, angle) => {
        const cutter: Pair[] = [
          [-600, 13.37],
          [600, -21.21],
        ];
        const near: Pair = [100, 0];
        const trimmed = trimmedAt(points, cutter, near);
        if (trimmed === null) return;
        expect(lengthOf(trimmed.kept)).toBeGreaterThanOrEqual(lengthOf(trimmed.gone) - 1e-6);
        expect(lengthOf(trimmed.kept) + lengthOf(trimmed.gone)).toBeCloseTo(lengthOf(points), 6);
        const other = trimmedAt(turned(points, angle), turned(cutter, angle), turned([near], angle)[0]!)!;
        expectSame(other.kept, turned(trimmed.kept, angle), 0.05);
        expectSame(reversed(trimmedAt(reversed(points), cutter, near)!.kept), trimmed.kept, 0.05);
      }),
    );
  });
});

describe('a line that is extended', () => {
  it('has no direction without length, and meets nothing that lies elsewhere', () => {
    const still: Pair[] = [
      [5, 5],
      [5, 5],
    ];
    expect(endDirection(still, false)).toBeNull();
    expect(extendedAt(still, false, [{ id: 'a', points: plumbAt(9) }], 100)).toBeNull();
    expect(
      extendedTo(
        LEVEL,
        {
          id: 'a',
          points: [
            [0, 40],
            [100, 40],
          ],
        },
        1000,
      ),
    ).toBeNull();
    expect(extendedTo(LEVEL, { id: 'a', points: plumbAt(150) }, 20)).toBeNull();
  });

  it('goes straight on to the first line it meets, at the end with the shorter way', () => {
    const targets = [
      { id: 'far', points: plumbAt(160) },
      { id: 'near', points: plumbAt(130) },
      { id: 'behind', points: plumbAt(-7) },
    ];
    expect(extendedAt(LEVEL, false, targets, 1000)).toMatchObject({
      targetId: 'near',
      points: [...LEVEL, [130, 0]],
    });
    expect(extendedAt(LEVEL, true, targets, 1000)).toMatchObject({
      targetId: 'behind',
      added: [
        [0, 0],
        [-7, 0],
      ],
    });
    const hook: Pair[] = [
      [-20, 10],
      [-20, -10],
      [110, -10],
      [110, 10],
    ];
    expect(extendedTo(LEVEL, { id: 'hook', points: hook }, 1000)).toMatchObject({ atStart: false });
  });

  it('does not count the line on which it ends already', () => {
    expect(extendedTo(LEVEL, { id: 'a', points: plumbAt(100) }, 1000)).toBeNull();
    expect(endsOn(LEVEL, plumbAt(100))).toBe(true);
    expect(endsOn(LEVEL, plumbAt(101))).toBe(false);
  });

  it('leaves a circle along its tangent, to a third of a degree at 3 px between vertices', () => {
    const circle = arc(300, 160, Math.PI / 2);
    const [dx, dy] = endDirection(circle, false)!;
    expect((Math.abs(Math.atan2(dy, dx) - Math.PI) * 180) / Math.PI).toBeLessThan(0.33);
    const [sx, sy] = endDirection(circle, true)!;
    expect((Math.abs(Math.atan2(sy, sx) + Math.PI / 2) * 180) / Math.PI).toBeLessThan(0.33);
  });

  it('evens out the tremor of a dense end', () => {
    const noise = seededNoise(5);
    const rough = Array.from({ length: 60 }, (_, i): Pair => [2 * i, 0.3 * noise()]);
    const [dx, dy] = endDirection(rough, false)!;
    expect(Math.abs(Math.atan2(dy, dx))).toBeLessThan(0.15);
  });

  it('is extended alike when the sheet is turned or the line reversed', () => {
    fc.assert(
      fc.property(randomLine, fc.double({ min: 0, max: 6, noNaN: true }), (points, angle) => {
        const target = {
          id: 'a',
          points: [
            [-900, 613.37],
            [900, 590.21],
          ] as Pair[],
        };
        const done = extendedTo(points, target, 4000);
        if (done === null) return;
        const other = extendedTo(
          turned(points, angle),
          { id: 'a', points: turned(target.points, angle) },
          4000,
        )!;
        expectSame(other.points, turned(done.points, angle), 1e-4);
        const back = extendedTo(reversed(points), target, 4000)!;
        expectSame(reversed(back.points), done.points, 1e-4);
      }),
    );
  });
});

describe('two lines that are joined', () => {
  const right: Pair[] = [
    [130, 5],
    [104, 3],
  ];

  it('need two points each', () => {
    expect(joined(LEVEL, [[1, 1]])).toBeNull();
    expect(joined([], LEVEL)).toBeNull();
  });

  it('are joined at their nearest ends in the direction of the first', () => {
    expect(joined(LEVEL, right)).toEqual({
      points: [...LEVEL, [104, 3], [130, 5]],
      bridge: [
        [100, 0],
        [104, 3],
      ],
      gap: 5,
    });
    const left: Pair[] = [
      [-30, 0],
      [-4, 3],
    ];
    expect(joined(LEVEL, left)?.points).toEqual([...left, ...LEVEL]);
    expect(joined(LEVEL, reversed(left))?.points).toEqual([...left, ...LEVEL]);
  });

  it('share one vertex where their ends lie at one place', () => {
    const on: Pair[] = [
      [100, 0],
      [150, 0],
    ];
    expect(joined(LEVEL, on)).toMatchObject({ points: [...LEVEL, [150, 0]], gap: 0 });
  });

  it('may be no farther apart than the shorter is long', () => {
    expect(widestGap(LEVEL, plumbAt(1))).toBe(100);
    expect(
      widestGap(LEVEL, [
        [0, 0],
        [30, 0],
      ]),
    ).toBe(30);
    expect(
      widestGap(LEVEL, [
        [0, 0],
        [3, 0],
      ]),
    ).toBe(24);
  });

  it('undo a cut, and do not mind which way round either is', () => {
    fc.assert(
      fc.property(randomLine, fc.double({ min: 0.1, max: 0.9, noNaN: true }), (points, part) => {
        const cut = cutAt(points, part * lengthOf(points));
        if (cut === null) return;
        const ends = [points[0]!, points.at(-1)!];
        // A line that comes back to its own start has two places where it could be joined.
        if (Math.hypot(ends[0]![0] - ends[1]![0], ends[0]![1] - ends[1]![1]) < 1) return;
        if (lengthOf(cut.before) < 1 || lengthOf(cut.after) < 1) return;
        const whole = joined(cut.before, cut.after)!;
        if (whole.gap > 0) return;
        expect(lengthOf(whole.points)).toBeCloseTo(lengthOf(points), 6);
        expect(joined(cut.before, reversed(cut.after))!.points).toEqual(whole.points);
        expect(joined(reversed(cut.before), cut.after)!.points).toEqual(reversed(whole.points));
      }),
    );
  });
});

describe('a line that is smoothed', () => {
  const TOLERANCE = 1.5;
  const roughArc = (seed: number) => {
    const noise = seededNoise(seed);
    return arc(300, 90, 2).map(([x, y]): Pair => [x + 0.7 * noise(), y + 0.7 * noise()]);
  };
  const strayOf = (points: readonly Pair[]) =>
    Math.sqrt(points.reduce((sum, [x, y]) => sum + (Math.hypot(x, y) - 300) ** 2, 0) / points.length);

  it('is left as it is when it has no tremor or too few vertices to tell', () => {
    const smooth = arc(300, 90, 2);
    expect(smoothed(smooth, TOLERANCE)).toEqual({ points: smooth, farthest: 0 });
    expect(smoothed(LEVEL, TOLERANCE)).toEqual({ points: LEVEL, farthest: 0 });
    expect(smoothed([], TOLERANCE).points).toEqual([]);
  });

  it('comes nearer to the curve that was meant, by no more than the tolerance for any vertex, its ends unmoved', () => {
    for (let seed = 1; seed <= 8; seed += 1) {
      const rough = roughArc(seed);
      const calm = smoothed(rough, TOLERANCE);
      expect(strayOf(calm.points)).toBeLessThan(0.7 * strayOf(rough));
      expect(calm.farthest).toBeLessThanOrEqual(TOLERANCE + 1e-9);
      calm.points.forEach(([x, y], i) => {
        expect(Math.hypot(x - rough[i]![0], y - rough[i]![1])).toBeLessThanOrEqual(TOLERANCE + 1e-9);
      });
      expect(calm.points[0]).toBe(rough[0]);
      expect(calm.points.at(-1)).toBe(rough.at(-1));
    }
  });

  it('keeps its corners exactly, and takes no tremor for one', () => {
    const bent: Pair[] = [
      ...Array.from({ length: 40 }, (_, i): Pair => [8 * i, 0]),
      ...Array.from({ length: 40 }, (_, i): Pair => [8 * 39, 8 * (i + 1)]),
    ];
    expect(cornersOf(bent, 12)).toEqual([39]);
    for (let seed = 1; seed <= 6; seed += 1) {
      const noise = seededNoise(seed);
      const rough = bent.map(([x, y]): Pair => [x + 0.7 * noise(), y + 0.7 * noise()]);
      const corners = cornersOf(rough, 12);
      expect(corners).toHaveLength(1);
      const calm = smoothed(rough, TOLERANCE);
      expect(calm.points[corners[0]!]).toBe(rough[corners[0]!]);
      expect(calm.farthest).toBeGreaterThan(0.2);
      expect(cornersOf(roughArc(seed), 12)).toEqual([]);
    }
  });

  it('does the same turned and reversed', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 60 }),
        fc.double({ min: 0, max: 6, noNaN: true }),
        (seed, angle) => {
          const rough = roughArc(seed);
          const calm = smoothed(rough, TOLERANCE).points;
          expectSame(smoothed(turned(rough, angle), TOLERANCE).points, turned(calm, angle), 1e-6);
          expectSame(reversed(smoothed(reversed(rough), TOLERANCE).points), calm, 1e-6);
        },
      ),
      { numRuns: 25 },
    );
  });
});

describe('a line that is moved', () => {
  it('by a step of the section, which is the same everywhere on the sheet', () => {
    const map = sectionMapOfFit({
      linear: [0.05, 0.001, -0.002, -0.1],
      sheetOrigin: [400, 900],
      sectionOrigin: [12, 98],
    });
    const step = stepOnSheet(map, [3, -1.5]);
    const [offset, elevation] = stepInSection(map, step);
    expect(offset).toBeCloseTo(3, 9);
    expect(elevation).toBeCloseTo(-1.5, 9);
    const [from, to] = [LEVEL[1]!, shifted(LEVEL, step)[1]!];
    const before = map.toSection(from as never);
    const after = map.toSection(to as never);
    expect(after[0] - before[0]).toBeCloseTo(3, 9);
    expect(after[1] - before[1]).toBeCloseTo(-1.5, 9);
  });
});
