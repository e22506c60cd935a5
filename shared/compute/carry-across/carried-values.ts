import { matched, type SheetMatch, scaleOf, turnOf } from '#shared/compute/carry-across/match-sheets.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { DocumentEntity, EntityOf, SheetPoint } from '#shared/contract/document.ts';

/** A sheet turned by less than this, radians, lies as before: the width of a line over an A0 sheet. */
const NO_TURN = 2e-4;

/**
 * An entity of a net as it is on the sheet carried to: its places moved by the match, what is typed in section
 * coordinates as it was. Accuracies in pixels grow with the sheet, and that of the known points takes the match's own
 * error in besides (`sigmaPx`, pixels of the sheet carried to, null where nothing is known of it). For the set-out and
 * known points see `carriedSetOut`.
 */
export function carriedValue(
  value: DocumentEntity,
  match: SheetMatch,
  sigmaPx: number | null,
): DocumentEntity {
  const at = (point: SheetPoint): SheetPoint => matched(match, point[0], point[1]);
  switch (value.kind) {
    case 'line':
      return { ...value, points: value.points.map(at) };
    case 'knownPoint':
      return { ...value, at: at(value.at) };
    case 'readingPoint':
      return value.place.on === 'sheet'
        ? { ...value, place: { on: 'sheet', at: at(value.place.at) } }
        : value;
    case 'profile':
      return value.place.on === 'sheet'
        ? { ...value, place: { on: 'sheet', points: value.place.points.map(at) } }
        : value;
    case 'soil':
      return { ...value, places: value.places.map(at) };
    case 'netCount':
      return { ...value, ...carriedAccuracies(value, scaleOf(match), sigmaPx ?? 0) };
    default:
      return value;
  }
}

function carriedAccuracies(
  { tracingAccuracyPx, knownPointAccuracyPx }: EntityOf<'netCount'>,
  scale: number,
  sigmaPx: number,
): Pick<EntityOf<'netCount'>, 'tracingAccuracyPx' | 'knownPointAccuracyPx'> {
  return {
    tracingAccuracyPx: rounded(tracingAccuracyPx * scale),
    knownPointAccuracyPx: rounded(Math.sqrt((knownPointAccuracyPx * scale) ** 2 + sigmaPx ** 2)),
  };
}

/** To a hundredth of a pixel: the figure is shown and may be edited. */
function rounded(px: number): number {
  return Math.round(100 * px) / 100;
}

/** How a section is set out on the sheet carried to. */
export type CarriedSetOut = {
  readonly setOut: EntityOf<'setOut'>;
  /** What a known point becomes. */
  readonly pointOf: (value: EntityOf<'knownPoint'>) => EntityOf<'knownPoint'>;
  /** True when the known points were given the coordinates of the set-out of before, for want of a level sheet. */
  readonly levelIsTyped: boolean;
};

/**
 * The set-out on a sheet that may lie turned otherwise. What is said of the sides holds, because it is meant with the
 * section upright; the quarter turns that stand it upright grow by those of the sheet. A set-out that takes the
 * sheet's own horizontal as level cannot do so on a sheet turned by a small angle: its known points then get the
 * offsets and elevations that it gave them (`map`, null while it gives none).
 */
export function carriedSetOut(
  setOut: EntityOf<'setOut'>,
  map: SectionMap | null,
  match: SheetMatch,
): CarriedSetOut {
  const turn = turnOf(match);
  const quarters = Math.round(turn / (Math.PI / 2));
  const rest = Math.abs(turn - (quarters * Math.PI) / 2);
  const upQuarterTurns = quarters === 0 ? setOut.upQuarterTurns : turned(setOut.upQuarterTurns, quarters);
  const moved = (value: EntityOf<'knownPoint'>): EntityOf<'knownPoint'> => ({
    ...value,
    at: matched(match, value.at[0], value.at[1]),
  });
  const usesSheet = setOut.level === 'sheet' && rest > NO_TURN;
  if (!usesSheet || map === null) {
    return { setOut: { ...setOut, upQuarterTurns }, pointOf: moved, levelIsTyped: false };
  }
  return {
    setOut: { ...setOut, upQuarterTurns, method: 'points', distance: null, level: 'line' },
    pointOf: (value) => ({ ...moved(value), ...placeBy(map, value) }),
    levelIsTyped: true,
  };
}

function turned(
  quarterTurns: EntityOf<'setOut'>['upQuarterTurns'],
  by: number,
): EntityOf<'setOut'>['upQuarterTurns'] {
  return (((((quarterTurns ?? 0) + by) % 4) + 4) % 4) as 0 | 1 | 2 | 3;
}

/** Offset and elevation that a set-out gives a known point that sets it out. */
function placeBy(
  map: SectionMap,
  value: EntityOf<'knownPoint'>,
): Pick<EntityOf<'knownPoint'>, 'offset' | 'elevation'> {
  if (value.use === 'check') return { offset: value.offset, elevation: value.elevation };
  const [offset, elevation] = map.toSection(sheetPx(value.at[0], value.at[1]));
  return { offset, elevation };
}
