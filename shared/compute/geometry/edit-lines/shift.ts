import { sectionPt, sheetPx } from '#shared/compute/frames.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';

/** Places moved by an offset, one frame and unit. */
export function shifted(points: readonly Pair[], by: Pair): Array<[number, number]> {
  return points.map(([x, y]) => [x + by[0], y + by[1]]);
}

/**
 * The step in sheet pixels that is a step of `by` in the section: offset and elevation in the document's length unit.
 * Of a section that is set out by one linear map it is the same everywhere.
 */
export function stepOnSheet(map: SectionMap, by: Pair): [number, number] {
  const [ox, oy] = map.toSheet(sectionPt(0, 0));
  const [x, y] = map.toSheet(sectionPt(by[0], by[1]));
  return [x - ox, y - oy];
}

/** Offset and elevation, document length unit, that a step in sheet pixels is in the section. */
export function stepInSection(map: SectionMap, by: Pair): [number, number] {
  const [ox, oz] = map.toSection(sheetPx(0, 0));
  const [x, z] = map.toSection(sheetPx(by[0], by[1]));
  return [x - ox, z - oz];
}
