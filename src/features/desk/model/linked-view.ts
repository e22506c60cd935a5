import { type SheetPx, screenPx, sectionPt, sheetPx } from '#shared/compute/frames.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { ViewStore } from './view-store.ts';
import { sheetZoom, toSheet, type Viewport } from './viewport.ts';

/** A view of a sheet that is set out. */
export type LinkedSide = {
  readonly views: ViewStore;
  readonly map: SectionMap;
  /** Metres in the length unit of its section. */
  readonly metresPerUnit: number;
};

/** Keeps two views of sections on the same part at the same size; gives a function that lets them go. */
export function linkViews(one: LinkedSide, other: LinkedSide): () => void {
  let following = false;
  const follow = (from: LinkedSide, to: LinkedSide) => {
    if (following || !isMeasured(from) || !isMeasured(to)) return;
    following = true;
    const { at, zoom } = sameSection(from.views.getState().view, from, to);
    to.views.show(at, zoom);
    following = false;
  };
  const endOne = one.views.subscribe(() => follow(one, other));
  const endOther = other.views.subscribe((_, before) =>
    // When it has just come up, it is the second that follows.
    before.view.widthPx === 0 ? follow(one, other) : follow(other, one),
  );
  follow(one, other);
  return () => {
    endOne();
    endOther();
  };
}

const isMeasured = ({ views }: LinkedSide) => views.getState().view.widthPx > 0;

/**
 * What a second sheet has to show in its middle, and at how many screen pixels to a sheet pixel, so that it shows the
 * same part of the section at the same size as a view of the first. Elevations and offsets are taken as they are typed,
 * lengths converted between the units. Where a scale differs with the direction, the mean of both counts.
 */
export function sameSection(
  view: Viewport,
  from: Pick<LinkedSide, 'map' | 'metresPerUnit'>,
  to: Pick<LinkedSide, 'map' | 'metresPerUnit'>,
): { at: SheetPx; zoom: number } {
  const middle = toSheet(view, screenPx(view.widthPx / 2, view.heightPx / 2));
  const ratio = from.metresPerUnit / to.metresPerUnit;
  const [offset, elevation] = from.map.toSection(middle);
  const at = to.map.toSheet(sectionPt(offset * ratio, elevation * ratio));
  const unitsPerScreenPx = (unitsPerPxAt(from.map, middle) * ratio) / sheetZoom(view);
  return { at, zoom: unitsPerPxAt(to.map, at) / unitsPerScreenPx };
}

/** Section units per sheet pixel at a place, the geometric mean of all directions: it changes on a photograph. */
function unitsPerPxAt(map: SectionMap, [x, y]: SheetPx): number {
  const [from, along, down] = [sheetPx(x, y), sheetPx(x + 1, y), sheetPx(x, y + 1)].map(map.toSection);
  const [a, b] = [along![0] - from![0], along![1] - from![1]];
  const [c, d] = [down![0] - from![0], down![1] - from![1]];
  return Math.sqrt(Math.abs(a * d - b * c));
}
