import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  type MatchedPlace,
  matched,
  matchResiduals,
  matchSheets,
  scaleOf,
  turnOf,
} from '#shared/compute/carry-across/match-sheets.ts';

const turnedBy = (degrees: number, scale: number, [sx, sy]: readonly [number, number]) => {
  const [c, s] = [scale * Math.cos((degrees * Math.PI) / 180), scale * Math.sin((degrees * Math.PI) / 180)];
  return ([x, y]: readonly [number, number]): [number, number] => [c * x - s * y + sx, s * x + c * y + sy];
};
const placesBy = (
  map: (at: readonly [number, number]) => [number, number],
  from: ReadonlyArray<readonly [number, number]>,
): MatchedPlace[] => from.map((at) => ({ from: at, to: map(at) }));

const CORNERS = [
  [120, 80],
  [9800, 140],
  [9700, 6900],
  [200, 6800],
] as const;

describe('matching two sheets', () => {
  it('takes two places for a similarity and three that are no line for an affine map', () => {
    const map = turnedBy(2, 1.3, [40, -25]);
    expect(matchSheets(placesBy(map, CORNERS.slice(0, 1)), 'similarity')).toBeNull();
    expect(matchSheets(placesBy(map, CORNERS.slice(0, 2)), 'affine')).toBeNull();
    const onALine = placesBy(map, [
      [0, 0],
      [100, 50],
      [200, 100],
    ]);
    expect(matchSheets(onALine, 'affine')).toBeNull();
    expect(matchSheets(onALine, 'similarity')).not.toBeNull();
    const same = placesBy(map, [
      [5, 5],
      [5, 5],
    ]);
    expect(matchSheets(same, 'similarity')).toBeNull();
  });

  it('refuses a mirrored sheet', () => {
    const mirror = ([x, y]: readonly [number, number]): [number, number] => [10_000 - x, y];
    expect(matchSheets(placesBy(mirror, CORNERS), 'affine')).toBeNull();
  });

  it('finds a turn, a scale and a shift again, whatever they are', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -179, max: 179, noNaN: true }),
        fc.double({ min: 0.2, max: 5, noNaN: true }),
        fc.double({ min: -1e5, max: 1e5, noNaN: true }),
        fc.constantFrom('similarity' as const, 'affine' as const),
        (degrees, scale, shift, shape) => {
          const map = turnedBy(degrees, scale, [shift, -shift / 3]);
          const match = matchSheets(placesBy(map, CORNERS), shape)!;
          expect(scaleOf(match)).toBeCloseTo(scale, 9);
          expect((turnOf(match) * 180) / Math.PI).toBeCloseTo(degrees, 6);
          const [x, y] = matched(match, 4321.5, 1234.5);
          const [ex, ey] = map([4321.5, 1234.5]);
          expect(Math.hypot(x - ex, y - ey)).toBeLessThan(1e-7 * (1 + Math.abs(shift)));
        },
      ),
    );
  });

  it('gives the residuals of a stretch that a similarity cannot follow, and none for an affine map', () => {
    // 1 in 1000 wider and not higher: over 9,700 px across, ±2.4 px at either side when it is shared out.
    const stretched = ([x, y]: readonly [number, number]): [number, number] => [1.001 * x, y];
    const places = placesBy(stretched, CORNERS);
    const poor = matchResiduals(matchSheets(places, 'similarity')!, places);
    expect(Math.max(...poor.each)).toBeGreaterThan(1);
    expect(poor.sigmaPx).toBeGreaterThan(1);
    const good = matchResiduals(matchSheets(places, 'affine')!, places);
    expect(Math.max(...good.each)).toBeLessThan(1e-9);
  });

  it('says nothing of its accuracy when no place is left over', () => {
    const places = placesBy(turnedBy(1, 1, [0, 0]), CORNERS.slice(0, 2));
    expect(matchResiduals(matchSheets(places, 'similarity')!, places).sigmaPx).toBeNull();
  });

  it('has the standard deviation of one coordinate, by the adjustment of a hand-worked example', () => {
    // Square of side 2 about the middle, one corner 0.4 px off along x: by symmetry the fit takes up a part of it, and
    // √(Σv²/(8 − 4)) follows from the normal equations Σx² = 8: re = 1 + 0.4/8, im = −0.4/8, shift 0.1.
    const square = [
      [1, 1],
      [-1, 1],
      [-1, -1],
      [1, -1],
    ] as const;
    const places: MatchedPlace[] = square.map((at, i) => ({ from: at, to: i === 0 ? [1.4, 1] : [...at] }));
    const match = matchSheets(places, 'similarity')!;
    expect(match.linear[0]).toBeCloseTo(1.05, 12);
    expect(match.linear[2]).toBeCloseTo(-0.05, 12);
    // Σv² = 0.4²·(1 − 1/4 − 2/8) = 0.08, the part of the error that leverage 1/4 + 2/8 leaves.
    expect(matchResiduals(match, places).sigmaPx).toBeCloseTo(Math.sqrt(0.08 / 4), 12);
  });
});
