import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  areaScaleAt,
  asProjective,
  isAffine,
  linearAt,
  mapOfFourPlaces,
  planeInverse,
  planeProduct,
  projectiveInverse,
  throughPlane,
} from '#shared/compute/plane-map.ts';

const square = [
  [0, 0],
  [4, 0],
  [4, 4],
  [0, 4],
] as const;

describe('a projective map by four places', () => {
  it('is none when three of the places lie on one line', () => {
    const flat = [
      [0, 0],
      [1, 1],
      [2, 2],
      [0, 4],
    ] as const;
    expect(mapOfFourPlaces(flat, square)).toBeNull();
    expect(mapOfFourPlaces(square, flat)).toBeNull();
  });

  it('takes the middle of a square to the crossing of the diagonals of a trapezium', () => {
    // Diagonals of (0,0) (6,0) (4,4) (2,4) cross at (3, 3): they divide one another 6 : 2.
    const map = mapOfFourPlaces(square, [
      [0, 0],
      [6, 0],
      [4, 4],
      [2, 4],
    ]);
    const [x, y] = throughPlane(map!, 2, 2);
    expect(x).toBeCloseTo(3, 12);
    expect(y).toBeCloseTo(3, 12);
    expect(isAffine(map!)).toBe(false);
  });

  it('is affine between parallelograms', () => {
    const map = mapOfFourPlaces(square, [
      [10, 20],
      [18, 22],
      [17, 26],
      [9, 24],
    ]);
    expect(isAffine(map!)).toBe(true);
    expect(throughPlane(map!, 2, 2)).toEqual([13.5, 23]);
  });

  it('goes back by its inverse, and its small steps are those of its linear part', () => {
    const jitter = fc.double({ min: -0.4, max: 0.4, noNaN: true });
    const corners = fc
      .array(jitter, { minLength: 8, maxLength: 8 })
      .map((by) => square.map(([x, y], i) => [x + by[2 * i]!, y + by[2 * i + 1]!] as const));
    fc.assert(
      fc.property(corners, fc.tuple(fc.nat(4), fc.nat(4)), (to, [x, y]) => {
        const map = mapOfFourPlaces(square, to)!;
        const [u, v] = throughPlane(map, x, y);
        const [back, down] = throughPlane(projectiveInverse(map), u, v);
        expect(back).toBeCloseTo(x, 9);
        expect(down).toBeCloseTo(y, 9);
        const step = 1e-6;
        const [a, b, c, d] = linearAt(map, x, y);
        const along = throughPlane(map, x + step, y);
        const across = throughPlane(map, x, y + step);
        expect((along[0] - u) / step).toBeCloseTo(a, 4);
        expect((across[0] - u) / step).toBeCloseTo(b, 4);
        expect((along[1] - v) / step).toBeCloseTo(c, 4);
        expect((across[1] - v) / step).toBeCloseTo(d, 4);
        expect(areaScaleAt(map, x, y)).toBeCloseTo(a * d - b * c, 12);
      }),
    );
  });

  it('follows a linear map as it stands', () => {
    const shear = [1, 0.5, 0, 2] as const;
    const twice = planeProduct(shear, shear);
    expect(throughPlane(twice, 2, 4)).toEqual([2 + 2 + 4, 16]);
    expect(throughPlane(planeInverse(shear), 4, 8)).toEqual([2, 4]);
    expect(throughPlane(asProjective(shear), 2, 4)).toEqual([4, 8]);
  });
});
