import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Viewport } from '#client/features/desk/model/viewport.ts';
import { lookOf } from '#client/features/desk/render/line-look.ts';
import type { SceneItem } from '#client/features/desk/render/scene.ts';
import { commonPart, holdsPart, partOfItems } from '#client/features/desk/render/screen-part.ts';
import { sheetPx } from '#shared/compute/frames.ts';

const view = (zoom: number, x: number, y: number): Viewport => ({
  zoom,
  origin: sheetPx(x, y),
  widthPx: 1000,
  heightPx: 700,
});

const line = (...points: [number, number][]): SceneItem => ({
  id: 'line',
  shape: 'line',
  points,
  look: lookOf('equipotential'),
  strong: true,
});

const mark = (at: [number, number], text: string): SceneItem => ({
  id: 'mark',
  shape: 'handle',
  at,
  text,
  colour: '#000000',
  strong: false,
  offsetPx: [0, 0],
});

const place = fc.double({ min: -20_000, max: 20_000, noNaN: true });
const points = fc.array(fc.tuple(place, place), { minLength: 1, maxLength: 20 });

describe('the part of the screen that items are drawn on', () => {
  it('is none without items', () => {
    expect(partOfItems([], view(1, 0, 0))).toBeNull();
  });

  it('holds each point of a line with its marks, at every zoom', () => {
    fc.assert(
      fc.property(points, fc.double({ min: 0.02, max: 8, noNaN: true }), place, place, (at, zoom, x, y) => {
        const part = partOfItems([line(...at)], view(zoom, x, y))!;
        for (const [px, py] of at) {
          const [sx, sy] = [(px - x) * zoom, (py - y) * zoom];
          expect(holdsPart(part, { x: sx - 8, y: sy - 8, width: 16, height: 16 })).toBe(true);
        }
      }),
    );
  });

  it('leaves more room about a text than about a handle', () => {
    const bare = partOfItems([mark([500, 500], '')], view(1, 0, 0))!;
    const named = partOfItems([mark([500, 500], 'P1')], view(1, 0, 0))!;
    expect(holdsPart(named, bare)).toBe(true);
    expect(named.width).toBeGreaterThan(bare.width);
  });

  it('holds a name however long it is', () => {
    const short = partOfItems([mark([500, 500], 'P1')], view(1, 0, 0))!;
    const long = partOfItems([mark([500, 500], 'P1, standpipe in the shell '.repeat(4))], view(1, 0, 0))!;
    expect(long.width).toBeGreaterThan(short.width);
  });

  it('keeps its size while something in it moves by a pixel, most of the time', () => {
    const sizes = new Set<string>();
    for (let x = 0; x < 60; x += 1) {
      const { width, height } = partOfItems([line([300 + x, 100], [420, 600])], view(1, 0, 0))!;
      sizes.add(`${width} ${height}`);
    }
    expect(sizes.size).toBeLessThanOrEqual(2);
  });
});

describe('what two parts have in common', () => {
  it('lies in both, and is nothing for parts that do not meet', () => {
    const a = { x: 0, y: 0, width: 100, height: 50 };
    expect(commonPart(a, { x: 60, y: 20, width: 100, height: 100 })).toEqual({
      x: 60,
      y: 20,
      width: 40,
      height: 30,
    });
    expect(commonPart(a, { x: 100, y: 0, width: 10, height: 10 })).toBeNull();
    expect(commonPart(null, a)).toBeNull();
  });
});
