import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { rasterOf } from '#client/features/desk/model/sheet-raster.ts';
import { createViewStore } from '#client/features/desk/model/view-store.ts';
import {
  rasterMap,
  seenOfRaster,
  sheetZoom,
  stepAsSeen,
  steppedOnScreen,
  toScreen,
  toSheet,
} from '#client/features/desk/model/viewport.ts';
import { screenPx, sheetPx } from '#shared/compute/frames.ts';
import { throughPlane } from '#shared/compute/plane-map.ts';
import { renditionGeometry } from '#shared/compute/renditions/rendition-geometry.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';
import { AS_SCANNED, type RenditionSettings } from '#shared/contract/renditions.ts';

const tiles = { rendition: 'base', tileSizePx: 512, maxZoom: 3, format: 'png' } as const;
const plain: SheetDto = {
  id: 's',
  pageNumber: 1,
  widthPx: 4000,
  heightPx: 3000,
  dpi: 300,
  tiles,
  note: '',
};

function cleanedUp(change: Partial<RenditionSettings>): SheetDto {
  const { widthPx, heightPx, toBase } = renditionGeometry(plain, { ...AS_SCANNED, ...change })!;
  const map = [...toBase] as NonNullable<SheetDto['shown']>['toBase'];
  return {
    ...plain,
    shown: { id: 'r', widthPx, heightPx, toBase: map, tiles: { ...tiles, rendition: 'r' } },
  };
}

const corners = [
  [300, 200],
  [3700, 420],
  [3900, 2900],
  [150, 2700],
] as RenditionSettings['corners'];
const turned = cleanedUp({ turnDeg: 90 });
const slanting = cleanedUp({ corners, turnDeg: 1.5, crop: [40, 30, 3000, 2000] });

function viewOf(sheet: SheetDto, asScanned = false) {
  const raster = rasterOf(sheet, asScanned);
  const views = createViewStore(raster, null);
  views.resize(1200, 800);
  return { raster, views, view: () => views.getState().view };
}

describe('the raster by which a sheet is shown', () => {
  it('is the scan where there is no other, where it is asked for, and has its places where only tones differ', () => {
    expect(rasterOf(plain, false)).toMatchObject({ widthPx: 4000, tiles, toBase: null });
    expect(rasterOf(turned, true)).toMatchObject({ widthPx: 4000, tiles, fromBase: null });
    const toned = rasterOf(cleanedUp({ threshold: 120 }), false);
    expect(toned).toMatchObject({ tiles: { rendition: 'r' }, toBase: null, fromBase: null });
  });

  it('is seen as it is: its pixels are those of the picture, and the whole of it fits', () => {
    const { raster, view } = viewOf(slanting);
    expect(rasterMap(view(), raster)).toBeNull();
    const [left, top, width, height] = seenOfRaster(view(), raster);
    expect(left).toBeLessThan(0);
    expect(top).toBeLessThan(0);
    expect(left + width).toBeGreaterThan(raster.widthPx);
    expect(top + height).toBeGreaterThan(raster.heightPx);
  });

  it('shows each place of the sheet on the pixel that was made of it, and finds it again', () => {
    const { raster, view } = viewOf(slanting);
    const pixel = fc.tuple(fc.nat(2999), fc.nat(1999));
    fc.assert(
      fc.property(pixel, ([x, y]) => {
        const [u, v] = throughPlane(raster.toBase!, x, y);
        const [left, top] = toScreen(view(), sheetPx(u, v));
        expect(left).toBeCloseTo((x - view().origin[0]) * view().zoom, 6);
        expect(top).toBeCloseTo((y - view().origin[1]) * view().zoom, 6);
        const [backX, backY] = toSheet(view(), screenPx(left, top));
        expect(backX).toBeCloseTo(u, 6);
        expect(backY).toBeCloseTo(v, 6);
      }),
    );
  });

  it('keeps the natural section turned as the picture is, in the same place in the middle', () => {
    const { raster, views, view } = viewOf(turned);
    views.seeAs([0.5, 0, 0, 1]);
    // A step along the sheet goes down in a picture that is turned by a quarter, at half its length.
    const middle = toSheet(view(), screenPx(600, 400));
    const [x, y] = toScreen(view(), sheetPx(middle[0] + 100, middle[1]));
    expect(x - 600).toBeCloseTo(0, 6);
    expect(y - 400).toBeCloseTo(50 * view().zoom, 6);
    expect(rasterMap(view(), raster)).not.toBeNull();
    views.seeAs(null);
    expect(rasterMap(view(), raster)).toBeNull();
  });

  it('steps along the screen by pixels of the sheet', () => {
    const { view } = viewOf(turned);
    const at = steppedOnScreen(view(), sheetPx(1000, 1000), 10, 0);
    // To the right on a picture turned clockwise is up on the sheet.
    expect(at[0]).toBeCloseTo(1000, 9);
    expect(at[1]).toBeCloseTo(990, 9);
    expect(stepAsSeen(view(), 0, 10)[0]).toBeCloseTo(10, 9);
    expect(stepAsSeen(viewOf(plain).view(), 3, 4)).toEqual([3, 4]);
    expect(sheetZoom(view())).toBeCloseTo(view().zoom, 9);
  });

  it('is not lost out of sight, however it is panned', () => {
    const { raster, views, view } = viewOf(slanting);
    views.pan(1e6, -1e6);
    const [left, top, width, height] = seenOfRaster(view(), raster);
    expect(left + width).toBeGreaterThan(0);
    expect(top).toBeLessThan(raster.heightPx);
    expect(left).toBeLessThan(raster.widthPx);
    expect(top + height).toBeGreaterThan(0);
  });
});
