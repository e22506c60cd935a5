import { entityTableText as text } from '#client/text/entity-table.ts';
import { sectionPt, sheetPx } from '#shared/compute/frames.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import {
  type EntityOf,
  entitiesOf,
  type FlowNetDocument,
  type LineKind,
  type SheetPoint,
  type TracedLine,
} from '#shared/contract/document.ts';
import { MAX_SHEET_PX } from '#shared/contract/limits.ts';
import { nextKnownPointUse } from './known-point-use.ts';

const FEWEST_POINTS = 2;
const MOST_POINTS = 5000;
/** A typed place is kept finer than a traced one, so that the figures typed come back. */
const PER_PIXEL = 10_000;

/** A finished line of typed points, offsets and elevations where there is a map, else pixels; or why there is none. */
export function typedLine(
  line: LineKind,
  name: string,
  figures: ReadonlyArray<readonly [number, number]>,
  map: SectionMap | null,
): TracedLine | string {
  if (figures.length < FEWEST_POINTS) return text.twoNeeded;
  if (figures.length > MOST_POINTS) return text.tooMany(String(MOST_POINTS));
  const points = figures.map((pair): SheetPoint => {
    const [x, y] = map === null ? sheetPx(...pair) : map.toSheet(sectionPt(...pair));
    return [rounded(x), rounded(y)];
  });
  if (!points.every((point) => point.every((each) => Math.abs(each) <= MAX_SHEET_PX))) return text.tooFar;
  return {
    kind: 'line',
    line,
    name,
    points,
    finished: true,
    water: null,
    head: null,
    drops: null,
    origin: 'traced',
  };
}

/** A known point at a pixel of the sheet, whose offset and elevation are typed next. */
export function typedKnownPoint(
  document: FlowNetDocument,
  name: string,
  [x, y]: readonly [number, number],
): EntityOf<'knownPoint'> {
  const use = nextKnownPointUse(document);
  return { kind: 'knownPoint', name, at: [rounded(x), rounded(y)], offset: null, elevation: null, use };
}

/** The letter with the lowest number not yet used. */
export function freeName(
  document: FlowNetDocument,
  kind: 'readingPoint' | 'knownPoint',
  letter: string,
): string {
  const used = new Set(entitiesOf(document, kind).map(({ value }) => value.name));
  let number = 1;
  while (used.has(`${letter}${number}`)) number += 1;
  return `${letter}${number}`;
}

function rounded(value: number): number {
  return Math.round(value * PER_PIXEL) / PER_PIXEL;
}
