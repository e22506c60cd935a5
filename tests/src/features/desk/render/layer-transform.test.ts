import { describe, expect, it } from 'vitest';
import type { Viewport } from '#client/features/desk/model/viewport.ts';
import { toScreen } from '#client/features/desk/model/viewport.ts';
import { layerTransform } from '#client/features/desk/render/layer-transform.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import {
  mapOfFourPlaces,
  type ProjectiveMap,
  projectiveInverse,
  throughPlane,
} from '#shared/compute/plane-map.ts';

const size = { widthPx: 1000, heightPx: 800 };
const view: Viewport = { zoom: 0.5, origin: sheetPx(100, 40), widthPx: 600, heightPx: 400 };

/** Where CSS puts a place of the layer. */
function placed(transform: string, x: number, y: number): [number, number] {
  const m = transform.match(/-?[\d.]+(e-?\d+)?/g)!.map(Number);
  if (transform.startsWith('matrix(')) return [m[0]! * x + m[2]! * y + m[4]!, m[1]! * x + m[3]! * y + m[5]!];
  const [, ...n] = m;
  const w = n[3]! * x + n[7]! * y + n[15]!;
  return [(n[0]! * x + n[4]! * y + n[12]!) / w, (n[1]! * x + n[5]! * y + n[13]!) / w];
}

const slant = mapOfFourPlaces(
  [
    [0, 0],
    [1000, 0],
    [1000, 800],
    [0, 800],
  ],
  [
    [50, 20],
    [900, 60],
    [980, 790],
    [10, 700],
  ],
)!;

describe('the transform of the tiles’ layer', () => {
  it('shows a layer that is still laid out at another zoom where the view shows the sheet', () => {
    for (const fromBase of [null, slant]) {
      const raster =
        fromBase === null ? size : { ...size, fromBase: null, toBase: projectiveInverse(fromBase)! };
      const now: Viewport = { ...view, origin: sheetPx(-30, 20) };
      const laidOutAt = 0.3;
      const transform = layerTransform(now, raster, 1, laidOutAt);
      for (const place of [sheetPx(10, 20), sheetPx(640, 310)]) {
        const [x, y] = toScreen(now, place);
        const onRaster = fromBase === null ? place : throughPlane(fromBase, place[0], place[1]);
        const [left, top] = placed(transform, onRaster[0] * laidOutAt, onRaster[1] * laidOutAt);
        expect(Math.hypot(left - x, top - y)).toBeLessThan(1);
      }
    }
  });

  it('only moves a raster that is seen as it is, by whole device pixels', () => {
    const off = { ...view, origin: sheetPx(100.3, 40.1) };
    expect(layerTransform(off, size, 1)).toBe('matrix(1, 0, 0, 1, -50, -20)');
    const shown = { ...off, seenAs: slant };
    expect(layerTransform(shown, { ...size, toBase: projectiveInverse(slant), fromBase: slant }, 1)).toBe(
      'matrix(1, 0, 0, 1, -50, -20)',
    );
  });

  it.each<[string, { seenAs?: Viewport['seenAs'] }, ProjectiveMap | null]>([
    ['the natural section of a scan', { seenAs: [0.5, 0.1, 0, 1] }, null],
    ['the natural section of a rectified photograph', { seenAs: [0.5, 0, 0, 1] }, projectiveInverse(slant)],
  ])('puts %s where the view shows it', (_, seen, toBase) => {
    const through = { ...view, ...seen } as Viewport;
    const sheet = { ...size, toBase, fromBase: toBase && slant };
    const css = layerTransform(through, sheet, 1);
    expect(css.startsWith('matrix3d')).toBe(toBase !== null);
    for (const [x, y] of [
      [0, 0],
      [970, 30],
      [500, 700],
    ] as const) {
      const onSheet = toBase ? throughPlane(toBase, x, y) : [x, y];
      const [sx, sy] = toScreen(through, sheetPx(onSheet[0]!, onSheet[1]!));
      const [left, top] = placed(css, x * view.zoom, y * view.zoom);
      expect(left).toBeCloseTo(sx, 6);
      expect(top).toBeCloseTo(sy, 6);
    }
  });
});
