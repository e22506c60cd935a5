import { coverageFactor } from '#shared/compute/doubt/coverage.ts';
import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { fittedMap, type SetOut } from '#shared/compute/set-out.ts';
import { unknownsOf } from '#shared/compute/set-out-unknowns.ts';
import { singleInputs } from '#shared/compute/single-inputs.ts';
import {
  type DocumentEntity,
  type EntityOf,
  entitiesOf,
  type FlowNetDocument,
  type SheetPoint,
  singleOf,
  type VersionedEntity,
} from '#shared/contract/document.ts';
import type { SetOutReading } from '#shared/contract/reading.ts';

/** What one coordinate of one known point does to the place of anything on the sheet. */
export type SetOutCause = {
  readonly cause: string;
  /** Error of a place's section coordinates when the known point is off by its half-width, length units. */
  shift(at: SheetPx): readonly [offset: number, elevation: number];
};

/** Step of the differences, pixels: far above rounding, far below what bends a fit. */
const STEP_PX = 0.5;

/**
 * How the marks of the known points carry over to the places of the section: for each coordinate of each known point
 * the shift that its half-width (95 %) gives to any place. Found by moving the mark half a pixel either way and setting
 * the section out again, which holds for every way of setting out; linear to first order (JCGM 100, 2008, 5.1.3 note
 * 2). The half-width is the stated accuracy of the known points or what the residuals show, whichever is greater. Empty
 * while the section is not set out.
 */
export function setOutCauses(document: FlowNetDocument, setOut: SetOut): SetOutCause[] {
  const { map } = setOut;
  if (map === null) return [];
  const half = knownPointHalfWidth(document, setOut, map);
  return entitiesOf(document, 'knownPoint')
    .filter(({ value }) => bears(value, document))
    .flatMap(({ id }) =>
      [0, 1].map((axis): SetOutCause | null => {
        const ahead = movedMap(document, id, axis, STEP_PX);
        const back = movedMap(document, id, axis, -STEP_PX);
        if (ahead === null || back === null) return null;
        const scale = half / (2 * STEP_PX);
        return {
          cause: `known ${id} ${axis}`,
          shift: (at) => {
            const [x1, z1] = ahead.toSection(at);
            const [x0, z0] = back.toSection(at);
            return [(x1 - x0) * scale, (z1 - z0) * scale];
          },
        };
      }),
    )
    .filter((cause) => cause !== null);
}

/** True when the mark of a known point bears on the set-out: by a distance any may give its elevation or its offset. */
function bears(value: EntityOf<'knownPoint'>, document: FlowNetDocument): boolean {
  if (singleOf(document, 'setOut')?.value.method === 'distance') return true;
  return value.use === 'fit' && (value.offset !== null || value.elevation !== null);
}

/**
 * Half-width (95 %) of one coordinate of a known point's mark in pixels: as stated, or from the residuals when there are
 * more typed figures than the fit needs, by Student's t for the degrees of freedom left (JCGM 100, 2008, 4.3.2 and G.3).
 * A fit by a distance needs one elevation and one offset.
 */
export function knownPointHalfWidth(document: FlowNetDocument, setOut: SetOut, map: SectionMap): number {
  const stated = singleInputs(document).count.knownPointAccuracyPx;
  const { residuals } = setOut.reading;
  const along = setOut.reading.unitsPerPx ?? map.unitsPerPx;
  const up = setOut.reading.unitsPerPxUp ?? along;
  const misses = residuals.flatMap((each) => [
    ...(each.offset === null ? [] : [each.offset / along]),
    ...(each.elevation === null ? [] : [each.elevation / up]),
  ]);
  const freedom = misses.length - neededFigures(document, setOut);
  if (freedom < 1) return stated;
  const squares = misses.reduce((sum, miss) => sum + miss * miss, 0);
  return Math.max(stated, coverageFactor(freedom) * Math.sqrt(squares / freedom));
}

/** Typed figures that the fit uses up. */
function neededFigures(document: FlowNetDocument, { grounds }: SetOut): number {
  const setOut = singleOf(document, 'setOut')?.value;
  if (setOut?.method === 'distance') return 2;
  return unknownsOf(setOut?.scales ?? 'equal', grounds?.turnFromSheet);
}

/**
 * Half-widths (95 %) that the known points leave to the offset and to the elevation of a place on the sheet, section
 * units: the root of the sum of squares over their coordinates.
 */
export function placeDoubtAt(
  causes: readonly SetOutCause[],
  at: SheetPx,
): { offset: number; elevation: number } {
  const shifts = causes.map((cause) => cause.shift(at));
  return {
    offset: Math.hypot(...shifts.map(([offset]) => offset)),
    elevation: Math.hypot(...shifts.map(([, elevation]) => elevation)),
  };
}

/**
 * The doubt of a place in the middle of what is marked and traced on the sheet, and at that corner of the box about it
 * where the doubt is greatest. Null while the section is not set out.
 */
export function doubtOverSection(
  document: FlowNetDocument,
  causes: readonly SetOutCause[],
): SetOutReading['placeDoubt'] {
  if (causes.length === 0) return null;
  const places = Object.values(document.entities).flatMap(({ value }) => placesOf(value));
  const xs = places.map(([x]) => x);
  const ys = places.map(([, y]) => y);
  const [left, right, top, bottom] = [
    least(xs),
    -least(xs.map((x) => -x)),
    least(ys),
    -least(ys.map((y) => -y)),
  ];
  const [worst] = [sheetPx(left, top), sheetPx(right, top), sheetPx(left, bottom), sheetPx(right, bottom)]
    .map((at) => placeDoubtAt(causes, at))
    .sort((a, b) => Math.hypot(b.offset, b.elevation) - Math.hypot(a.offset, a.elevation));
  const middle = placeDoubtAt(causes, sheetPx((left + right) / 2, (top + bottom) / 2));
  return worst === undefined ? null : { middle, corner: worst };
}

/** `Math.min` takes its values as arguments, of which there may be too many. */
const least = (values: readonly number[]) =>
  values.reduce((low, value) => Math.min(low, value), Number.POSITIVE_INFINITY);

function placesOf(value: DocumentEntity): readonly SheetPoint[] {
  if (value.kind === 'knownPoint') return [value.at];
  if (value.kind === 'line') return value.points;
  return value.kind === 'readingPoint' && value.place.on === 'sheet' ? [value.place.at] : [];
}

function movedMap(document: FlowNetDocument, id: string, axis: number, by: number): SectionMap | null {
  const entity = document.entities[id] as VersionedEntity;
  if (entity.value.kind !== 'knownPoint') return null;
  const [x, y] = entity.value.at;
  const at: [number, number] = axis === 0 ? [x + by, y] : [x, y + by];
  const moved = { ...entity, value: { ...entity.value, at } };
  return fittedMap({ ...document, entities: { ...document.entities, [id]: moved } });
}
