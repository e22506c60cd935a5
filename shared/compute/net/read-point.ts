import { doubtAtPlace } from '#shared/compute/doubt/doubt-at-place.ts';
import { plusMinusOf } from '#shared/compute/doubt/point-doubt.ts';
import { type SheetPx, sectionPt, sheetPx } from '#shared/compute/frames.ts';
import { type LieOfPlace, lieOf } from '#shared/compute/net/lie-of-place.ts';
import { questionReading } from '#shared/compute/net/point-findings.ts';
import { explainFreeFace, explainReading } from '#shared/compute/net/point-words.ts';
import type { ReadingGround } from '#shared/compute/net/reading-ground.ts';
import { type FieldAt, fieldAt, type HandAt, handAt } from '#shared/compute/net/two-readings.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { EntityOf } from '#shared/contract/document.ts';
import type { PointReading } from '#shared/contract/reading.ts';

/** A reading point on the sheet and in the section. */
export type PlacedPoint = {
  readonly id: string;
  readonly value: EntityOf<'readingPoint'>;
  readonly sheetAt: SheetPx | null;
  readonly offset: number | null;
  readonly elevation: number | null;
};

/**
 * Places a reading point: a clicked one is carried into the section, a typed one onto the sheet. Without a map only
 * what was entered is known; a place that is not finite counts as unknown.
 */
export function placePoint(id: string, value: EntityOf<'readingPoint'>, map: SectionMap | null): PlacedPoint {
  const { place } = value;
  if (place.on === 'sheet') {
    const sheetAt = sheetPx(...place.at);
    const [offset, elevation] = map === null ? [null, null] : map.toSection(sheetAt);
    return { id, value, sheetAt, offset: finiteOrNull(offset), elevation: finiteOrNull(elevation) };
  }
  const at = map === null ? null : map.toSheet(sectionPt(place.offset, place.elevation));
  const known = at !== null && Number.isFinite(at[0]) && Number.isFinite(at[1]);
  return { id, value, sheetAt: known ? at : null, offset: place.offset, elevation: place.elevation };
}

/** A reading point without a figure, with the reason why. */
export function withholdPoint(point: PlacedPoint, code: string, text: string): PointReading {
  return {
    id: point.id,
    name: point.value.name,
    order: point.value.order,
    sheetAt: point.sheetAt === null ? null : [point.sheetAt[0], point.sheetAt[1]],
    offset: point.offset,
    elevation: point.elevation,
    status: 'withheld',
    reason: { code, text },
    dropsLost: null,
    between: null,
    totalHead: null,
    totalHeadPlusMinus: null,
    pressureHead: null,
    pressureHeadPlusMinus: null,
    porePressure: null,
    porePressurePlusMinus: null,
    doubt: null,
    byHand: null,
    byField: null,
    explanation: text,
    findings: [],
  };
}

/**
 * Reads one point of a finished net: total head h by the field between the two lines beside it (on a face of free
 * outflow h = z), with hand's rule beside it as the explanation; pressure head h − z and pore pressure u = γw(h − z),
 * never γw times a depth. Heads and elevations in the document's length unit, pressure in γw's unit times it. Above the
 * phreatic line there is no head and the pressure is 0; outside the net and behind a wall there is no figure, only the
 * reason. Where the field could not be solved the figure is the hand rule's, and a finding says so.
 */
export function readPoint(point: PlacedPoint, ground: ReadingGround): PointReading {
  const { sheetAt, elevation } = point;
  if (sheetAt === null || elevation === null) {
    return withholdPoint(
      point,
      'noPlace',
      'The point has no place on this section. Check its coordinates and the known points.',
    );
  }
  const lie = lieOf(sheetAt, ground);
  if (lie.in === 'air') return abovePhreatic(point);
  if (lie.in === 'nothing') return withholdPoint(point, lie.code, lie.text);
  const hand = handAt(sheetAt, lie, ground);
  if ('code' in hand) return withholdPoint(point, hand.code, hand.text);
  const field = fieldAt(sheetAt, lie, ground);
  if (field !== null && 'code' in field) return withholdPoint(point, field.code, field.text);
  return withFigures({ point, sheetAt, elevation, lie, hand, field }, ground);
}

type TwiceRead = {
  readonly point: PlacedPoint;
  readonly sheetAt: SheetPx;
  readonly elevation: number;
  readonly lie: Extract<LieOfPlace, { in: 'strip' }>;
  readonly hand: HandAt;
  readonly field: FieldAt | null;
};

function withFigures(read: TwiceRead, ground: ReadingGround): PointReading {
  const { point, sheetAt, elevation, lie, hand, field } = read;
  const { before, after, onFreeFace } = lie;
  const { totalHead, dropsLost } = field ?? hand;
  const pressureHead = totalHead - elevation;
  const doubt = doubtOf(read, totalHead, pressureHead, ground);
  const figures = [totalHead, dropsLost, hand.totalHead, hand.dropsLost, pressureHead, doubt.totalHead]
    .concat(doubt.pressureHead, field?.gradient ?? [])
    .map((figure) => figure * Math.max(1, ground.gammaW));
  if (!figures.every((figure) => Number.isFinite(figure))) {
    return withholdPoint(
      point,
      'notFinite',
      'The figures are too large to be worked out. Check the levels and the known points.',
    );
  }
  return {
    ...withholdPoint(point, '', ''),
    status: 'read',
    reason: null,
    dropsLost,
    between: { before: before.id, after: after.id, fraction: hand.way.fraction },
    totalHead,
    totalHeadPlusMinus: doubt.totalHead,
    pressureHead,
    pressureHeadPlusMinus: doubt.pressureHead,
    porePressure: ground.gammaW * pressureHead,
    porePressurePlusMinus: doubt.porePressure,
    doubt: { totalHead: doubt.headShares, porePressure: doubt.pressureShares },
    byHand: { totalHead: hand.totalHead, dropsLost: hand.dropsLost },
    byField: field && { ...field, gradient: [field.gradient[0], field.gradient[1]] },
    explanation: onFreeFace
      ? explainFreeFace(elevation, ground)
      : explainReading(before, after, hand, field, ground),
    findings: questionReading(point.id, sheetAt, hand, field, pressureHead, ground),
  };
}

/** Without a field the gradient is only known in its size, by hand's rule. */
function doubtOf(read: TwiceRead, totalHead: number, pressureHead: number, ground: ReadingGround) {
  const { point, sheetAt, lie, hand, field } = read;
  const length = (hand.way.toBefore + hand.way.toAfter) * ground.map.unitsPerPx;
  const slope = length > 0 ? Math.abs(hand.headAfter - hand.headBefore) / length : 0;
  const doubt = doubtAtPlace(
    {
      id: point.id,
      at: sheetAt,
      lie,
      typed: point.value.place.on === 'section',
      elevationPlusMinus: point.value.elevationPlusMinus,
      fraction: hand.way.fraction,
      gradient: field?.gradient ?? [slope, 0],
      totalHead,
      pressureHead,
    },
    ground,
  );
  return plusMinusOf(doubt);
}

function abovePhreatic(point: PlacedPoint): PointReading {
  return {
    ...withholdPoint(point, 'abovePhreatic', 'above the phreatic line, suction left out'),
    status: 'abovePhreatic',
    porePressure: 0,
    explanation:
      'The point lies above the phreatic line. Suction is left out, and the pressure is given as 0.',
  };
}

function finiteOrNull(value: number | null): number | null {
  return value !== null && Number.isFinite(value) ? value : null;
}
