import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { projectiveInverse, throughPlane } from '#shared/compute/plane-map.ts';
import { renditionGeometry, turnToLevel } from '#shared/compute/renditions/rendition-geometry.ts';

const base = { widthPx: 400, heightPx: 300 };
const none = { corners: null, turnDeg: 0, crop: null } as const;

describe('the geometry of a rendition', () => {
  it('is refused for corners that cross, go backwards or lie on a line, and for a crop beside the picture', () => {
    const crossed = [
      [0, 0],
      [400, 300],
      [400, 0],
      [0, 300],
    ] as const;
    const backwards = [
      [0, 0],
      [0, 300],
      [400, 300],
      [400, 0],
    ] as const;
    for (const corners of [crossed, backwards])
      expect(
        renditionGeometry(base, { ...none, corners: corners.map((each) => [...each]) as never }),
      ).toBeNull();
    const flat = [
      [0, 0],
      [10, 0],
      [20, 0],
      [0, 30],
    ];
    expect(renditionGeometry(base, { ...none, corners: flat as never })).toBeNull();
    expect(renditionGeometry(base, { ...none, crop: [401, 0, 10, 10] })).toBeNull();
  });

  it('is the base itself when nothing is done', () => {
    expect(renditionGeometry(base, none)).toEqual({ ...base, toBase: [1, 0, 0, 0, 1, 0, 0, 0, 1] });
  });

  it('turns by quarters without losing a pixel', () => {
    const right = renditionGeometry(base, { ...none, turnDeg: 90 })!;
    expect([right.widthPx, right.heightPx]).toEqual([300, 400]);
    // The sheet's top-left pixel comes to the top right.
    expect(throughPlane(right.toBase, 299.5, 0.5)).toEqual([0.5, 0.5]);
    const left = renditionGeometry(base, { ...none, turnDeg: -90 })!;
    expect(throughPlane(left.toBase, 0.5, 399.5)).toEqual([0.5, 0.5]);
    const half = renditionGeometry(base, { ...none, turnDeg: 180 })!;
    expect([half.widthPx, half.heightPx]).toEqual([400, 300]);
    expect(throughPlane(half.toBase, 399.5, 299.5)).toEqual([0.5, 0.5]);
  });

  it('turns clockwise about the middle, in a picture that holds all corners', () => {
    const { widthPx, heightPx, toBase } = renditionGeometry(base, { ...none, turnDeg: 30 })!;
    // 400·cos 30° + 300·sin 30° = 496.41; 400·sin 30° + 300·cos 30° = 459.81.
    expect([widthPx, heightPx]).toEqual([497, 460]);
    const fromBase = projectiveInverse(toBase);
    expect(throughPlane(fromBase, 200, 150)).toEqual([expect.closeTo(248.5, 9), expect.closeTo(230, 9)]);
    // A step to the right on the sheet goes 30° downwards in the picture.
    const [x, y] = throughPlane(fromBase, 300, 150);
    expect((Math.atan2(y - 230, x - 248.5) * 180) / Math.PI).toBeCloseTo(30, 9);
  });

  it('keeps the whole pixels of a crop that lie in the picture', () => {
    const cropped = renditionGeometry(base, { ...none, crop: [-20, 10.4, 120, 500] })!;
    expect(cropped).toEqual({ widthPx: 100, heightPx: 290, toBase: [1, 0, 0, 0, 1, 10, 0, 0, 1] });
  });

  it('makes a rectangle of four corners, as large as its sides are in the mean', () => {
    const corners = [
      [100, 50],
      [300, 50],
      [350, 250],
      [50, 250],
    ] as [[number, number], [number, number], [number, number], [number, number]];
    const { widthPx, heightPx, toBase } = renditionGeometry(base, { ...none, corners })!;
    expect(widthPx).toBe(250);
    expect(heightPx).toBe(Math.round(Math.hypot(50, 200)));
    const far = [
      [0, 0],
      [widthPx, 0],
      [widthPx, heightPx],
      [0, heightPx],
    ].map(([x, y]) => throughPlane(toBase, x!, y!));
    far.forEach((place, i) => {
      expect(place[0]).toBeCloseTo(corners[i]![0], 9);
      expect(place[1]).toBeCloseTo(corners[i]![1], 9);
    });
  });

  it('crops what was turned as it was turned: the steps follow one another', () => {
    const angle = fc.double({ min: -180, max: 180, noNaN: true });
    fc.assert(
      fc.property(angle, (turnDeg) => {
        const turned = renditionGeometry(base, { ...none, turnDeg })!;
        const both = renditionGeometry(base, { ...none, turnDeg, crop: [20, 30, 100, 90] })!;
        const [x, y] = throughPlane(both.toBase, 7, 9);
        const [wholeX, wholeY] = throughPlane(turned.toBase, 27, 39);
        expect(x).toBeCloseTo(wholeX, 8);
        expect(y).toBeCloseTo(wholeY, 8);
      }),
    );
  });
});

describe('the turn that makes a line level', () => {
  it('is none for a single place', () => expect(turnToLevel([3, 4], [3, 4])).toBeNull());

  it('turns the shorter way, whichever end is named first', () => {
    expect(turnToLevel([0, 0], [10, 10])).toBeCloseTo(-45, 12);
    expect(turnToLevel([10, 10], [0, 0])).toBeCloseTo(-45, 12);
    expect(turnToLevel([0, 10], [10, 0])).toBeCloseTo(45, 12);
    expect(turnToLevel([0, 0], [0, 10])).toBeCloseTo(90, 12);
    expect(turnToLevel([0, 10], [0, 0])).toBeCloseTo(90, 12);
  });

  it('leaves the line level in the turned picture', () => {
    const [a, b] = [
      [20, 40],
      [380, 55],
    ] as const;
    const turned = renditionGeometry(base, { ...none, turnDeg: turnToLevel(a, b)! })!;
    const fromBase = projectiveInverse(turned.toBase);
    expect(throughPlane(fromBase, ...a)[1]).toBeCloseTo(throughPlane(fromBase, ...b)[1], 8);
  });
});
