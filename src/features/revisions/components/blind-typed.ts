import { parseTypedNumber } from '#client/lib/parse-number.ts';
import { blindText as text } from '#client/text/check-work.ts';
import { headAfterDrops, pressureOf } from '#shared/compute/blind-reading.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import type { BlindPointInput, BlindView } from '#shared/contract/review.ts';

/** What is typed of one point; figures as text, so that a half typed one stays. */
export interface TypedPoint {
  sheetAt: SheetPoint | null;
  offset: string;
  elevation: string;
  drops: string;
  head: string;
  remark: string;
}

/** A blind reading as it is typed: the points chosen, by their ids. */
export interface TypedReading {
  drops: string;
  outletHead: string;
  points: Readonly<Record<string, TypedPoint>>;
}

export const NEW_POINT: TypedPoint = {
  sheetAt: null,
  offset: '',
  elevation: '',
  drops: '',
  head: '',
  remark: '',
};

const numberOf = (typed: string) => (typed.trim() === '' ? null : parseTypedNumber(typed));

/** The head and pressure that follow from what is typed; null while something is lacking. */
export function figuresTyped(
  point: TypedPoint,
  { drops, outletHead }: TypedReading,
  { headwater, gammaW }: BlindView['levels'],
): { totalHead: number; porePressure: number; isAbove: boolean } | null {
  const elevation = numberOf(point.elevation);
  const totalHead =
    numberOf(point.head) ?? headTyped(point, numberOf(drops), numberOf(outletHead), headwater);
  if (elevation === null || totalHead === null) return null;
  return {
    totalHead,
    porePressure: pressureOf(totalHead, elevation, gammaW),
    isAbove: elevation > totalHead,
  };
}

function headTyped(
  point: TypedPoint,
  drops: number | null,
  outletHead: number | null,
  headwater: number | null,
): number | null {
  const lost = numberOf(point.drops);
  if (lost === null || drops === null || drops <= 0 || outletHead === null || headwater === null) return null;
  return headAfterDrops({ headwater, outletHead, drops }, lost);
}

/** The reading to be sealed, or the sentence that says what is lacking. */
export function readTyped(typed: TypedReading, view: BlindView) {
  const chosen = view.points.filter(({ id }) => typed.points[id] !== undefined);
  if (chosen.length === 0) return { fault: text.chooseOne };
  const nameOf = (name: string) => name || text.unnamed;
  for (const { id, name } of chosen) {
    const point = typed.points[id] ?? NEW_POINT;
    for (const field of ['offset', 'elevation', 'drops', 'head'] as const)
      if (point[field].trim() !== '' && numberOf(point[field]) === null)
        return { fault: text.notNumber(text.fields[field], nameOf(name)) };
  }
  const lacking = chosen.filter(({ id }) => !figuresTyped(typed.points[id] ?? NEW_POINT, typed, view.levels));
  if (lacking.length > 0)
    return { fault: text.incomplete(lacking.map(({ name }) => nameOf(name)).join(', ')) };
  return {
    input: {
      drops: numberOf(typed.drops),
      outletHead: numberOf(typed.outletHead),
      points: chosen.map(({ id }) => pointInput(id, typed.points[id] ?? NEW_POINT)),
    },
  };
}

/** A head that is typed goes before drops, since it was read itself. */
function pointInput(pointId: string, point: TypedPoint): BlindPointInput {
  const totalHead = numberOf(point.head);
  return {
    pointId,
    sheetAt: point.sheetAt,
    offset: numberOf(point.offset),
    elevation: numberOf(point.elevation) ?? 0,
    dropsLost: totalHead === null ? numberOf(point.drops) : null,
    totalHead,
    remark: point.remark.trim(),
  };
}

/** What this browser has kept of a reading that is not sealed yet. */
export function parseKept(kept: string | null, view: BlindView): TypedReading {
  const first: TypedReading = {
    drops: '',
    outletHead: view.levels.tailwater === null ? '' : String(view.levels.tailwater),
    points: {},
  };
  try {
    const held = kept === null ? null : JSON.parse(kept);
    return held && typeof held === 'object' && 'points' in held ? { ...first, ...held } : first;
  } catch {
    return first;
  }
}
