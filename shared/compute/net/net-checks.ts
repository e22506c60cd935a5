import { makeFinding } from '#shared/compute/findings.ts';
import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import {
  distanceToPolyline,
  lengthOf,
  type Polyline,
  pointAlong,
} from '#shared/compute/geometry/polyline.ts';
import type { FootedLine } from '#shared/compute/net/feet.ts';
import type { NetLine } from '#shared/compute/net/net-lines.ts';
import type { Finding } from '#shared/contract/reading.ts';

type FootedEquipotential = { readonly id: string; readonly footed: FootedLine };

/** Lines that lie within this part of their length of one another all along are one line traced twice. */
const DUPLICATE_PART = 0.01;

/**
 * What is wrong with the traced lines by themselves, each with its place: an equipotential traced twice,
 * equipotentials that cross, an equipotential that runs through a wall or the phreatic line, flow lines that cross.
 * Shapes in base-raster pixels; `reach` is the overshoot at an end that counts as a tracing error.
 */
export function checkLines(
  equipotentials: readonly FootedEquipotential[],
  flowLines: readonly NetLine[],
  walls: readonly NetLine[],
  accuracyPx: number,
  reach: number,
): Finding[] {
  const repeats = repeatsOf(equipotentials, accuracyPx);
  return [
    ...repeats.map(tracedAgain),
    ...pairwise(equipotentials, (a, b) =>
      repeats.some((lines) => lines.includes(a) && lines.includes(b)) ? null : checkPair(a, b, reach),
    ),
    ...equipotentials.flatMap((line) => walls.flatMap((wall) => checkWall(line, wall, reach))),
    ...pairwise(flowLines, (a, b) => checkFlowLines(a, b, reach)),
  ];
}

function pairwise<T>(items: readonly T[], check: (a: T, b: T) => Finding | null): Finding[] {
  return items
    .flatMap((a, i) => items.slice(i + 1).map((b) => check(a, b)))
    .filter((found) => found !== null);
}

/** How often in words, for a pair that meets more than once: it has one finding, at the first place. */
function inPlaces(places: readonly unknown[]): string {
  return places.length === 1 ? '' : ` in ${places.length} places`;
}

/** Equipotentials that lie along one another, all tracings of one line together. */
function repeatsOf(
  equipotentials: readonly FootedEquipotential[],
  accuracyPx: number,
): FootedEquipotential[][] {
  const groups: FootedEquipotential[][] = [];
  for (const line of equipotentials) {
    const group = groups.find((lines) => lines.some((other) => areOne(other, line, accuracyPx)));
    if (group) group.push(line);
    else groups.push([line]);
  }
  return groups.filter((lines) => lines.length > 1);
}

function areOne(a: FootedEquipotential, b: FootedEquipotential, accuracyPx: number): boolean {
  return (
    liesAlong(a.footed.shape, b.footed.shape, accuracyPx) &&
    liesAlong(b.footed.shape, a.footed.shape, accuracyPx)
  );
}

function tracedAgain(lines: readonly FootedEquipotential[]): Finding {
  const { shape } = lines[0]!.footed;
  const text =
    lines.length === 2
      ? 'An equipotential has been traced twice. Delete one of the two lines.'
      : `An equipotential has been traced ${lines.length} times. Delete all of these lines but one.`;
  return makeFinding('wrong', 'tracedTwice', text, {
    cell: 'netCheck',
    entityIds: lines.map(({ id }) => id),
    at: pointAlong(shape, lengthOf(shape) / 2),
  });
}

function checkPair(a: FootedEquipotential, b: FootedEquipotential, reach: number): Finding | null {
  const places = crossingsOf(a.footed.shape, b.footed.shape).filter(
    (place) => !(isAtFoot(a.footed, place.s, reach) && isAtFoot(b.footed, place.t, reach)),
  );
  const [first] = places;
  if (!first) return null;
  const text = `Two equipotentials cross${inPlaces(places)}. Correct one of them.`;
  return makeFinding('wrong', 'equipotentialsCross', text, {
    cell: 'netCheck',
    entityIds: [a.id, b.id],
    at: first.at,
  });
}

/** Two lines that end on a thin wall from its two sides may have their feet in one place. */
function isAtFoot(line: FootedLine, s: number, reach: number): boolean {
  const length = lengthOf(line.shape);
  const near = Math.min(reach, length / 4);
  return (line.start !== null && s <= near) || (line.end !== null && s >= length - near);
}

function liesAlong(line: Polyline, other: Polyline, accuracyPx: number): boolean {
  const length = lengthOf(line);
  const allowed = Math.max(3 * accuracyPx, DUPLICATE_PART * length);
  for (let k = 0; k <= 8; k += 1) {
    const at = pointAlong(line, (k / 8) * length);
    if (distanceToPolyline(other, at[0], at[1]) > allowed) return false;
  }
  return true;
}

function checkWall(line: FootedEquipotential, wall: NetLine, reach: number): Finding[] {
  const length = lengthOf(line.footed.shape);
  const places = crossingsOf(line.footed.shape, wall.shape).filter(
    (crossing) => crossing.s > reach && crossing.s < length - reach,
  );
  const [first] = places;
  if (!first) return [];
  const what = wall.kind === 'phreaticLine' ? 'the phreatic line' : 'an impervious boundary';
  return [
    makeFinding(
      'wrong',
      'lineThroughWall',
      `An equipotential runs through ${what}${inPlaces(places)}. End it there.`,
      { cell: 'netCheck', entityIds: [line.id, wall.id], at: first.at },
    ),
  ];
}

function checkFlowLines(a: NetLine, b: NetLine, reach: number): Finding | null {
  const length = lengthOf(a.shape);
  const places = crossingsOf(a.shape, b.shape).filter(({ s }) => s > reach && s < length - reach);
  const [first] = places;
  if (!first) return null;
  const text = `Two flow lines cross${inPlaces(places)}. Correct one of them.`;
  return makeFinding('question', 'flowLinesCross', text, {
    cell: 'netCheck',
    entityIds: [a.id, b.id],
    at: first.at,
  });
}
