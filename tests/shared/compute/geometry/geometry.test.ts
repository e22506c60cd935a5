import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import { nearestOnLines, nearestVertex, segmentAt } from '#shared/compute/geometry/hit-test.ts';
import { distanceToRing, ringContains, ringOf, signedArea } from '#shared/compute/geometry/polygon.ts';
import {
  lengthOf,
  nearestOnPolyline,
  pieceOf,
  pointAlong,
  polylineOf,
} from '#shared/compute/geometry/polyline.ts';
import { orientation, segmentsMeet } from '#shared/compute/geometry/predicates.ts';
import { thinned } from '#shared/compute/geometry/thin.ts';
import { PUBLISHED } from '#tests/support/published-checks.ts';

const line = (...points: Array<[number, number]>) => polylineOf(points)!;

describe('polylines', () => {
  it('refuse fewer than two distinct places and what is not finite', () => {
    expect(polylineOf([])).toBeNull();
    expect(
      polylineOf([
        [1, 1],
        [1, 1],
      ]),
    ).toBeNull();
    expect(
      polylineOf([
        [1, 1],
        [Number.NaN, 1],
      ]),
    ).toBeNull();
  });

  it('know their length, places along them and pieces', () => {
    const bent = line([0, 0], [3, 0], [3, 4]);
    expect(lengthOf(bent)).toBe(7);
    expect(pointAlong(bent, 5)).toEqual([3, 2]);
    expect(pointAlong(bent, 99)).toEqual([3, 4]);
    expect(pieceOf(bent, 2, 5)).toEqual([
      [2, 0],
      [3, 0],
      [3, 2],
    ]);
    expect(pieceOf(bent, 5, 2)).toEqual([
      [3, 2],
      [3, 0],
      [2, 0],
    ]);
  });

  it('find the nearest place', () => {
    const place = nearestOnPolyline(line([0, 0], [3, 0], [3, 4]), 4, 2);
    expect(place).toMatchObject({ s: 5, distance: 1, segment: 1 });
  });
});

describe('crossings', () => {
  it('lie where two segments cross (published check 7-06, linear solve)', () => {
    const [crossing] = crossingsOf(line([0, 0], [10, 4]), line([3, 6], [6, -1]));
    expect(crossing!.at[0]).toBeCloseTo(PUBLISHED['7-06'].x, 8);
    expect(crossing!.at[1]).toBeCloseTo(PUBLISHED['7-06'].y, 8);
  });

  it('at a shared vertex are given once', () => {
    expect(crossingsOf(line([0, 0], [1, 0], [2, 0]), line([1, -1], [1, 0], [1, 1]))).toHaveLength(1);
  });

  it('are symmetric in the two lines', () => {
    const coordinate = fc.integer({ min: -6, max: 6 });
    const points = fc.array(fc.tuple(coordinate, coordinate), { minLength: 2, maxLength: 6 });
    fc.assert(
      fc.property(points, points, (first, second) => {
        const a = polylineOf(first);
        const b = polylineOf(second);
        if (a === null || b === null) return;
        expect(crossingsOf(a, b).length > 0).toBe(crossingsOf(b, a).length > 0);
      }),
    );
  });
});

describe('sides of a line', () => {
  it('are told exactly where plain arithmetic fails', () => {
    // (0.5, 0.5) + multiples of 2⁻⁵³ beside the line through (12, 12) and (24, 24): Kettner and others 2008.
    const step = 2 ** -53;
    expect(orientation(12, 12, 24, 24, 0.5 + step * 2, 0.5 + step * 4)).toBe(1);
    expect(orientation(12, 12, 24, 24, 0.5 + step * 4, 0.5 + step * 2)).toBe(-1);
    expect(orientation(12, 12, 24, 24, 0.5 + step * 4, 0.5 + step * 4)).toBe(0);
  });

  it('let collinear segments meet only where they overlap', () => {
    expect(segmentsMeet(0, 0, 2, 0, 1, 0, 3, 0)).toBe(true);
    expect(segmentsMeet(0, 0, 2, 0, 2, 0, 3, 0)).toBe(true);
    expect(segmentsMeet(0, 0, 2, 0, 2.5, 0, 3, 0)).toBe(false);
  });
});

describe('polygons', () => {
  const vertices: Array<[number, number]> = [
    [0, 0],
    [150, 0],
    [100, 25],
    [90, 25],
  ];

  it('have the area of a cross-section (published check 7-05, Monte Carlo 1998.6)', () => {
    expect(signedArea(ringOf(vertices)!)).toBe(PUBLISHED['7-05'].area);
    expect(signedArea(ringOf([...vertices].reverse())!)).toBe(PUBLISHED['7-05'].area_reversed_order);
    const far = ringOf(vertices.map(([x, y]): [number, number] => [x + 250_000, y + 3_000]))!;
    expect(signedArea(far)).toBe(2000);
  });

  it('hold their inside and their outline', () => {
    const ring = ringOf(vertices)!;
    expect(ringContains(ring, 95, 20)).toBe(true);
    expect(ringContains(ring, 75, 0)).toBe(true);
    expect(ringContains(ring, 150, 0)).toBe(true);
    expect(ringContains(ring, 20, 20)).toBe(false);
    expect(distanceToRing(ring, 75, -3)).toBe(3);
  });

  it('share an edge without a gap between them', () => {
    const left = ringOf([
      [0, 0],
      [1.1, 0.3],
      [0.7, 2],
      [0, 2],
    ])!;
    const right = ringOf([
      [1.1, 0.3],
      [3, 0],
      [3, 2],
      [0.7, 2],
    ])!;
    fc.assert(
      fc.property(fc.double({ min: 0, max: 1, noNaN: true }), (t) => {
        const x = 1.1 - 0.4 * t;
        const y = 0.3 + 1.7 * t;
        expect(ringContains(left, x, y) || ringContains(right, x, y)).toBe(true);
      }),
    );
  });
});

describe('picking', () => {
  const lines = [
    {
      id: 'a',
      points: [
        [0, 0],
        [10, 0],
      ] as Array<[number, number]>,
    },
    {
      id: 'b',
      points: [
        [0, 5],
        [10, 5],
        [10, 9],
      ] as Array<[number, number]>,
    },
  ];

  it('finds the nearest line, vertex and segment within reach and nothing beyond', () => {
    expect(nearestOnLines(lines, [4, 3], 4)).toMatchObject({ id: 'b', segment: 0, distance: 2 });
    expect(nearestOnLines(lines, [4, 2.5], 1)).toBeNull();
    expect(nearestVertex(lines, [9.5, 8], 2)).toMatchObject({ id: 'b', index: 2 });
    expect(nearestVertex(lines, [5, 2], 2)).toBeNull();
    expect(segmentAt(lines[1]!.points, [11, 7], 2)).toMatchObject({ segment: 1, distance: 1 });
    expect(segmentAt([[1, 1]], [1, 1], 5)).toBeNull();
  });
});

describe('thinning', () => {
  it('keeps the corners and drops the tremor', () => {
    const points: Array<[number, number]> = [
      [0, 0],
      [5, 0.4],
      [10, 0],
      [10.3, 5],
      [10, 10],
    ];
    expect(thinned(points, 1)).toEqual([
      [0, 0],
      [10, 0],
      [10, 10],
    ]);
  });
});
