import { makeFinding } from '#shared/compute/findings.ts';
import { type SheetPx, sectionPt, sheetPx } from '#shared/compute/frames.ts';
import { distanceToRing, type Ring, ringContains } from '#shared/compute/geometry/polygon.ts';
import { nearestOnPolyline, type Polyline, polylineOf } from '#shared/compute/geometry/polyline.ts';
import { liesAbovePhreatic } from '#shared/compute/net/above-phreatic.ts';
import { type HandReading, readByHand, straddlesWall, stripAt } from '#shared/compute/net/hand-rule.ts';
import { type HeadOfLine, headWhere, type NetHeads } from '#shared/compute/net/net-heads.ts';
import { provisionalDoubt } from '#shared/compute/net/provisional-doubt.ts';
import type { Strip } from '#shared/compute/net/strips.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { EntityOf } from '#shared/contract/document.ts';
import type { Finding, PointReading } from '#shared/contract/reading.ts';
import { fixedText } from '#shared/text/number-text.ts';

/** Everything a point is read against; shapes and `slack` in base-raster pixels. */
export type ReadingGround = {
  readonly map: SectionMap;
  readonly strips: readonly Strip[];
  readonly heads: NetHeads;
  readonly walls: readonly Polyline[];
  /** Closed impervious outlines inside which nothing flows. */
  readonly bodies: readonly Ring[];
  readonly phreaticLines: readonly Polyline[];
  /** Faces and ground that bound the section from above. */
  readonly faces: readonly Polyline[];
  /** Boundaries along which the head is the elevation. */
  readonly freeFaces: readonly Polyline[];
  readonly slack: number;
  readonly gammaW: number;
  /** Unit of a head or elevation with its datum, for words: "m LD". */
  readonly levelUnit: string;
  readonly placeDoubt: number;
  readonly unequal: boolean;
};

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
    porePressure: null,
    porePressurePlusMinus: null,
    explanation: text,
    findings: [],
  };
}

/**
 * Reads one point of a finished net: total head h by hand's rule (on a face of free outflow h = z), pressure head
 * h − z and pore pressure u = γw(h − z), never γw times a depth. Heads and elevations in the document's length unit,
 * pressure in γw's unit times it. Above the phreatic line there is no head and the pressure is 0; outside the net and
 * behind a wall there is no figure, only the reason.
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
  if (liesAbovePhreatic(sheetAt, ground.map.up, ground.phreaticLines, ground.faces, ground.slack)) {
    return abovePhreatic(point);
  }
  if (isInsideBody(sheetAt, ground)) {
    return withholdPoint(
      point,
      'acrossWall',
      'The point lies inside an impervious body. No water flows there, and nothing is read.',
    );
  }
  const strip = stripAt(ground.strips, sheetAt, ground.slack);
  if (strip === null) {
    return withholdPoint(
      point,
      'outsideNet',
      'The point lies outside the traced net. Nothing is read beyond the lines.',
    );
  }
  const hand = readByHand(strip, sheetAt, ground.walls, ground.slack);
  if (hand === null) {
    return withholdPoint(
      point,
      'acrossWall',
      'A wall, or a maze of walls, lies between the point and its neighbouring lines. Check the boundary there.',
    );
  }
  const before = ground.heads.byId.get(strip.before);
  const after = ground.heads.byId.get(strip.after);
  if (before === undefined || after === undefined) {
    return withholdPoint(
      point,
      'linesOutOfOrder',
      'The lines beside the point are not in order. Check the equipotentials there.',
    );
  }
  return withFigures(point, sheetAt, elevation, ground, hand, before, after);
}

/** A point on the outline itself, to the accuracy of tracing, is read from outside: there the water presses. */
function isInsideBody([x, y]: SheetPx, { bodies, slack }: ReadingGround): boolean {
  return bodies.some((body) => ringContains(body, x, y) && distanceToRing(body, x, y) > slack);
}

function withFigures(
  point: PlacedPoint,
  sheetAt: SheetPx,
  elevation: number,
  ground: ReadingGround,
  hand: HandReading,
  before: HeadOfLine,
  after: HeadOfLine,
): PointReading {
  const headBefore = headWhere(ground.heads, before, hand.strip.beforeShape, hand.beforeS);
  const headAfter = headWhere(ground.heads, after, hand.strip.afterShape, hand.afterS);
  const onFreeFace = ground.freeFaces.some(
    (face) => nearestOnPolyline(face, sheetAt[0], sheetAt[1]).distance <= ground.slack,
  );
  const totalHead = onFreeFace ? elevation : headBefore + hand.fraction * (headAfter - headBefore);
  const dropsLost = before.drops + hand.fraction * (after.drops - before.drops);
  const pressureHead = totalHead - elevation;
  const doubt = provisionalDoubt({
    intervalHead: headAfter - headBefore,
    intervalLength: (hand.toBefore + hand.toAfter) * ground.map.unitsPerPx,
    placeDoubt: ground.placeDoubt,
    clicked: point.value.place.on === 'sheet',
  });
  const figures = [
    totalHead,
    dropsLost,
    pressureHead,
    pressureHead * ground.gammaW,
    doubt.head,
    doubt.pressureHead,
  ];
  if (!figures.every((figure) => Number.isFinite(figure * ground.gammaW))) {
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
    between: { before: before.id, after: after.id, fraction: hand.fraction },
    totalHead,
    totalHeadPlusMinus: doubt.head,
    pressureHead,
    porePressure: ground.gammaW * pressureHead,
    porePressurePlusMinus: ground.gammaW * doubt.pressureHead,
    explanation: onFreeFace
      ? `On the face of free outflow the total head is the elevation, ${fixedText(elevation, 2)} ${ground.levelUnit}.`
      : explain(before, after, hand.fraction, headBefore, headAfter, totalHead, dropsLost, ground),
    findings: [
      ...negativePressure(point, pressureHead, sheetAt),
      ...nearOpenEnd(point, sheetAt, hand),
      ...onThinWall(point, sheetAt, hand, ground),
    ],
  };
}

function explain(
  before: HeadOfLine,
  after: HeadOfLine,
  fraction: number,
  headBefore: number,
  headAfter: number,
  totalHead: number,
  dropsLost: number,
  { unequal, levelUnit }: ReadingGround,
): string {
  const part = fixedText(fraction, 2);
  if (unequal) {
    return `From ${before.label} (head ${fixedText(headBefore, 2)}) ${part} of the way to ${after.label} (head ${fixedText(headAfter, 2)}): total head ${fixedText(totalHead, 2)} ${levelUnit}.`;
  }
  const drops = Math.round(before.drops * 100) / 100;
  const lead =
    before.source === 'boundary'
      ? `No drop lost at ${before.label}, then`
      : `${drops} ${drops === 1 ? 'drop' : 'drops'} lost at ${before.label}, then`;
  const span = after.drops - before.drops;
  const of = Math.abs(span - 1) < 0.005 ? 'the drop' : `the ${Math.round(span * 100) / 100} drops`;
  return `${lead} ${part} of ${of} from ${before.label} to ${after.label}: ${fixedText(dropsLost, 2)} drops lost, total head ${fixedText(totalHead, 2)} ${levelUnit}.`;
}

function abovePhreatic(point: PlacedPoint): PointReading {
  const text = 'above the phreatic line, suction left out';
  return {
    ...withholdPoint(point, 'abovePhreatic', text),
    status: 'abovePhreatic',
    porePressure: 0,
    explanation:
      'The point lies above the phreatic line. Suction is left out, and the pressure is given as 0.',
  };
}

/** Within a cell of an end that a mere straight join closes, the strip is not what the drawing says. */
function nearOpenEnd(point: PlacedPoint, at: SheetPx, hand: HandReading): Finding[] {
  const cell = hand.toBefore + hand.toAfter;
  const near = hand.strip.ways.some((way) => {
    const join = way.open ? polylineOf(way.points) : null;
    return join !== null && nearestOnPolyline(join, at[0], at[1]).distance < cell;
  });
  if (!near) return [];
  return [
    makeFinding(
      'note',
      'nearOpenEnd',
      'The point lies within a cell of an end at which no boundary is traced. Trace the boundary or the outermost flow line there.',
      { cell: 'netCheck', entityIds: [point.id], at },
    ),
  ];
}

/** Head jumps across a thin wall, and the hand's tremor decides on which side of it such a point comes to lie. */
function onThinWall(point: PlacedPoint, at: SheetPx, hand: HandReading, ground: ReadingGround): Finding[] {
  if (!straddlesWall(ground.strips, hand.strip, at, ground.walls, ground.slack)) return [];
  return [
    makeFinding(
      'question',
      'onThinWall',
      'The point lies on a thin wall, nearer than the tracing can tell its two sides apart, and the head differs from side to side. Move it clear of the wall, to the side that is meant.',
      { cell: 'netCheck', entityIds: [point.id], at },
    ),
  ];
}

function negativePressure(point: PlacedPoint, pressureHead: number, at: SheetPx): Finding[] {
  if (!(pressureHead < 0)) return [];
  return [
    makeFinding(
      'question',
      'negativePressure',
      'The pressure is negative below the phreatic line. Check the lines, the levels and the elevation of the point.',
      {
        cell: 'netCheck',
        entityIds: [point.id],
        at,
      },
    ),
  ];
}

function finiteOrNull(value: number | null): number | null {
  return value !== null && Number.isFinite(value) ? value : null;
}
