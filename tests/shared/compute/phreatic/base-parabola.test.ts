import { describe, expect, it } from 'vitest';
import {
  correctedEntry,
  focalOrdinate,
  parabolaHeight,
  parabolaOnFace,
} from '#shared/compute/phreatic/base-parabola.ts';
import { breakoutCorrection, breakoutOf, flatSlopeBreakout } from '#shared/compute/phreatic/breakout.ts';

const RAD = Math.PI / 180;

describe('the basic parabola', () => {
  // Published case 2-01 (Kozeny 1931): d = 40 m, H = 12 m.
  it('has the focal ordinate and the heights of the closed form', () => {
    const S = focalOrdinate(40, 12);
    expect(S).toBeCloseTo(1.761226, 6);
    expect(parabolaHeight(S, 0)).toBeCloseTo(1.761226, 6);
    expect(parabolaHeight(S, 20)).toBeCloseTo(8.576186, 6);
    expect(parabolaHeight(S, -S / 2)).toBe(0);
    expect(parabolaHeight(S, -S)).toBe(0);
  });

  // Published cases 2-02 and 2-16 (a printed example of a text book on irrigation works): d = 65.6 m, H = 18 m.
  it('has the printed coefficients y² = 4.849x + 5.879 of an example', () => {
    const distance = correctedEntry(146 - 30 - 72, 146 - 30);
    expect(distance).toBeCloseTo(65.6, 9);
    const S = focalOrdinate(distance, 18);
    expect(2 * S).toBeCloseTo(4.849, 3);
    expect(S * S).toBeCloseTo(5.879, 3);
    expect(parabolaHeight(S, 30)).toBeCloseTo(12.3029, 4);
  });

  it('takes no correction at a vertical or overhanging face', () => {
    expect(correctedEntry(40, 40)).toBe(40);
    expect(correctedEntry(40, 35)).toBe(40);
  });

  // Published cases 2-05 and 2-06: a + Δa = S/(1 − cos α), d = 40 m, H = 12 m.
  it.each([
    [30, 13.14597],
    [60, 3.522452],
  ])('meets a face at %d° where the published case says', (angleDeg, along) => {
    expect(parabolaOnFace(focalOrdinate(40, 12), angleDeg * RAD)).toBeCloseTo(along, 5);
  });
});

describe('the breakout', () => {
  // Published case 2-09: A. Casagrande's chart of 1937, values from memory.
  it.each([
    [30, 0.36],
    [60, 0.32],
    [90, 0.26],
    [120, 0.18],
    [150, 0.1],
    [180, 0],
  ])('at %d° takes the ratio of the chart', (angleDeg, ratio) => {
    expect(breakoutCorrection(angleDeg)).toBeCloseTo(ratio, 12);
  });

  // Published cases 2-05, 2-06 (Schaffernak and Van Iterson) and 2-07, a printed example in feet.
  it.each([
    [40, 12, 30, 6.724959],
    [40, 12, 60, 1.209138],
    [64.30127, 20, 30, 11.69576],
  ])('of d = %d, H = %d at %d° lies where the formula says', (distance, height, angleDeg, along) => {
    expect(flatSlopeBreakout(distance, height, angleDeg * RAD)).toBeCloseTo(along, 4);
  });

  it('is nowhere when the formula has no root, or the face does not rise', () => {
    expect(flatSlopeBreakout(10, 12, 10 * RAD)).toBeNull();
    expect(breakoutOf(1, 10, 12, 10)).toBeNull();
    expect(breakoutOf(1, 10, 12, 0)).toBeNull();
  });

  it('names its author', () => {
    expect(breakoutOf(focalOrdinate(90, 12), 90, 12, 20)?.author).toBe('Schaffernak and Van Iterson');
    expect(breakoutOf(focalOrdinate(40, 12), 40, 12, 60)).toEqual({
      along: expect.closeTo(3.522452 * (1 - 0.32), 5),
      author: 'Casagrande',
    });
  });
});
