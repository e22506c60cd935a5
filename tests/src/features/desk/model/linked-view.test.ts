import { describe, expect, it } from 'vitest';
import { type LinkedSide, linkViews, sameSection } from '#client/features/desk/model/linked-view.ts';
import { createViewStore } from '#client/features/desk/model/view-store.ts';
import { toScreen } from '#client/features/desk/model/viewport.ts';
import { type SectionPt, screenPx, sectionPt, sheetPx } from '#shared/compute/frames.ts';
import { type SectionMap, sectionMapOf } from '#shared/compute/section-map.ts';

const SHEET = { widthPx: 6000, heightPx: 4000 };
const FOOT = 0.3048;

/** A scan at 0.05 m to a pixel, turned by 90°, with section place (100, 50) in its middle. */
const metres: SectionMap = sectionMapOf({
  re: 0,
  im: 0.05,
  sheetOrigin: [3000, 2000],
  sectionOrigin: [100, 50],
  mirrored: false,
});
/** A photograph of the same section in feet, mirrored and at a coarser scale, with another middle. */
const feet: SectionMap = sectionMapOf({
  re: 0.4,
  im: 0.1,
  sheetOrigin: [2500, 2200],
  sectionOrigin: [95 / FOOT, 55 / FOOT],
  mirrored: true,
});

function side(map: SectionMap, metresPerUnit: number): LinkedSide {
  const views = createViewStore(SHEET, null);
  return { views, map, metresPerUnit };
}

/** Where a place of the section is seen, in screen pixels. */
function seen({ views, map, metresPerUnit }: LinkedSide, offset: number, elevation: number) {
  const place = map.toSheet(sectionPt(offset / metresPerUnit, elevation / metresPerUnit) as SectionPt);
  return toScreen(views.getState().view, place);
}

function both() {
  const [one, other] = [side(metres, 1), side(feet, FOOT)];
  const end = linkViews(one, other);
  one.views.resize(900, 500);
  other.views.resize(700, 500);
  return { one, other, end };
}

/** Screen pixels between two places of the section, ten metres apart. */
function tenMetres(of: LinkedSide): number {
  const [[x, y], [toX, toY]] = [seen(of, 100, 50), seen(of, 106, 58)];
  return Math.hypot(toX - x, toY - y);
}

describe('two views of one section', () => {
  it('show the same place in their middles at the same size, whatever the scan, its turn and its units', () => {
    const { one, other } = both();
    one.views.zoom(3);
    one.views.pan(-40, 25);
    // Each view is moved to whole pixels by itself.
    const middle = one.views.getState().view;
    const at = one.map.toSection(
      sheetPx(
        middle.origin[0] + middle.widthPx / 2 / middle.zoom,
        middle.origin[1] + middle.heightPx / 2 / middle.zoom,
      ),
    );
    const [x, y] = seen(other, at[0], at[1]);
    expect(Math.abs(x - 350)).toBeLessThanOrEqual(1);
    expect(Math.abs(y - 250)).toBeLessThanOrEqual(1);
    expect(tenMetres(other)).toBeCloseTo(tenMetres(one), 6);
  });

  it('follow one another both ways, and the first is what the second comes up with', () => {
    const { one, other } = both();
    expect(tenMetres(other)).toBeCloseTo(tenMetres(one), 6);
    const before = tenMetres(one);
    other.views.zoom(2, screenPx(350, 250));
    expect(tenMetres(one)).toBeCloseTo(2 * before, 6);
    expect(tenMetres(other)).toBeCloseTo(2 * before, 6);
  });

  it('are on their own again when they are let go', () => {
    const { one, other, end } = both();
    end();
    const before = tenMetres(other);
    one.views.zoom(4);
    expect(tenMetres(other)).toBeCloseTo(before, 9);
  });
});

it('a sheet at twice the scale is shown at half the zoom', () => {
  const view = { zoom: 0.5, origin: sheetPx(2000, 1500), widthPx: 1000, heightPx: 500 };
  const finer = sectionMapOf({
    re: 0.1,
    im: 0,
    sheetOrigin: [0, 4000],
    sectionOrigin: [0, 0],
    mirrored: false,
  });
  const coarser = sectionMapOf({
    re: 0.2,
    im: 0,
    sheetOrigin: [0, 4000],
    sectionOrigin: [0, 0],
    mirrored: false,
  });
  const from = { map: finer, metresPerUnit: 1 };
  // Middle at (3000, 2000): offset 300, elevation 200; on the other at (1500, 3000).
  const { at, zoom } = sameSection(view, from, { map: coarser, metresPerUnit: 1 });
  expect(at[0]).toBeCloseTo(1500, 9);
  expect(at[1]).toBeCloseTo(3000, 9);
  expect(zoom).toBeCloseTo(1, 9);
});
