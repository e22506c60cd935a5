import { type SheetPx, sectionPt, sheetPx } from '#shared/compute/frames.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { SheetPoint, TracedLine } from '#shared/contract/document.ts';
import { MAX_SHEET_PX } from '#shared/contract/limits.ts';

/** In what a point of a line is shown and typed: offset and elevation of the set-out section, or pixels of the sheet. */
export type VertexUnits = 'section' | 'sheet';

/** Points to a page of the table; a line may have thousands. */
export const PAGE_POINTS = 50;
/** A typed place is kept finer than a traced one, so that the figures typed come back. */
const PER_PIXEL = 10_000;

/** The two figures of a point; pixels as long as there is no map. */
export function figuresOf(at: SheetPoint, units: VertexUnits, map: SectionMap | null): [number, number] {
  if (units === 'sheet' || map === null) return [rounded(at[0]), rounded(at[1])];
  const [offset, elevation] = map.toSection(sheetPx(...at));
  return [rounded(offset), rounded(elevation)];
}

/** The line with one figure of one of its points typed; null when that place lies too far off the sheet. */
export function withFigure(
  line: TracedLine,
  index: number,
  axis: 0 | 1,
  figure: number,
  units: VertexUnits,
  map: SectionMap | null,
): TracedLine | null {
  const before = line.points[index];
  if (before === undefined) return null;
  const at = placeOf(before, axis, figure, units, map);
  const point: SheetPoint = [rounded(at[0]), rounded(at[1])];
  if (!point.every((each) => Math.abs(each) <= MAX_SHEET_PX)) return null;
  return { ...line, points: line.points.map((each, i) => (i === index ? point : each)) };
}

/** The other figure stays as it is: unrounded, so that typing one after the other does not creep. */
function placeOf(
  before: SheetPoint,
  axis: 0 | 1,
  figure: number,
  units: VertexUnits,
  map: SectionMap | null,
): SheetPx {
  if (units === 'sheet' || map === null) {
    return axis === 0 ? sheetPx(figure, before[1]) : sheetPx(before[0], figure);
  }
  const [offset, elevation] = map.toSection(sheetPx(...before));
  return map.toSheet(axis === 0 ? sectionPt(figure, elevation) : sectionPt(offset, figure));
}

/** The place on the sheet of two figures: of the section where there is a map, else pixels. */
export function placeOfFigures(figures: readonly [number, number], map: SectionMap | null): SheetPx {
  return map === null ? sheetPx(...figures) : map.toSheet(sectionPt(...figures));
}

/** The line with a point half way to the next one; after the last one as far on as the last step was. */
export function withPointAfter(line: TracedLine, index: number): TracedLine | null {
  const [before, at, next] = [line.points[index - 1], line.points[index], line.points[index + 1]];
  if (at === undefined) return null;
  const to: SheetPoint =
    next ?? (before ? [2 * at[0] - before[0], 2 * at[1] - before[1]] : [at[0] + 1, at[1]]);
  const part = next === undefined ? 1 : 0.5;
  const points = [...line.points];
  points.splice(index + 1, 0, [
    rounded(at[0] + part * (to[0] - at[0])),
    rounded(at[1] + part * (to[1] - at[1])),
  ]);
  return { ...line, points };
}

/** First and last point, counted from 0, of the page that holds a point. */
export function pageOf(index: number, count: number): { first: number; last: number } {
  const first = PAGE_POINTS * Math.floor(Math.max(0, Math.min(index, count - 1)) / PAGE_POINTS);
  return { first, last: Math.min(count, first + PAGE_POINTS) - 1 };
}

function rounded(value: number): number {
  return Math.round(value * PER_PIXEL) / PER_PIXEL;
}
