import { makeFinding } from '#shared/compute/findings.ts';
import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import { lengthOf, nearestOnPolyline, type Polyline, pointAlong } from '#shared/compute/geometry/polyline.ts';
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
  return [
    ...pairwise(equipotentials, (a, b) => checkPair(a, b, accuracyPx, reach)),
    ...equipotentials.flatMap((line) => walls.flatMap((wall) => checkWall(line, wall, reach))),
    ...pairwise(flowLines, (a, b) => checkFlowLines(a, b, reach)),
  ];
}

function pairwise<T>(items: readonly T[], check: (a: T, b: T) => Finding | null): Finding[] {
  return items
    .flatMap((a, i) => items.slice(i + 1).map((b) => check(a, b)))
    .filter((found) => found !== null);
}

function checkPair(
  a: FootedEquipotential,
  b: FootedEquipotential,
  accuracyPx: number,
  reach: number,
): Finding | null {
  if (
    liesAlong(a.footed.shape, b.footed.shape, accuracyPx) &&
    liesAlong(b.footed.shape, a.footed.shape, accuracyPx)
  ) {
    return makeFinding(
      'wrong',
      'tracedTwice',
      'An equipotential has been traced twice. Delete one of the two lines.',
      {
        cell: 'netCheck',
        entityIds: [a.id, b.id],
        at: pointAlong(a.footed.shape, lengthOf(a.footed.shape) / 2),
      },
    );
  }
  const crossing = crossingsOf(a.footed.shape, b.footed.shape).find(
    (place) => !(isAtFoot(a.footed, place.s, reach) && isAtFoot(b.footed, place.t, reach)),
  );
  if (crossing === undefined) return null;
  return makeFinding('wrong', 'equipotentialsCross', 'Two equipotentials cross. Correct one of them.', {
    cell: 'netCheck',
    entityIds: [a.id, b.id],
    at: crossing.at,
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
    if (nearestOnPolyline(other, at[0], at[1]).distance > allowed) return false;
  }
  return true;
}

function checkWall(line: FootedEquipotential, wall: NetLine, reach: number): Finding[] {
  const length = lengthOf(line.footed.shape);
  const through = crossingsOf(line.footed.shape, wall.shape).find(
    (crossing) => crossing.s > reach && crossing.s < length - reach,
  );
  if (through === undefined) return [];
  const what = wall.kind === 'phreaticLine' ? 'the phreatic line' : 'an impervious boundary';
  return [
    makeFinding('wrong', 'lineThroughWall', `An equipotential runs through ${what}. End it there.`, {
      cell: 'netCheck',
      entityIds: [line.id, wall.id],
      at: through.at,
    }),
  ];
}

function checkFlowLines(a: NetLine, b: NetLine, reach: number): Finding | null {
  const length = lengthOf(a.shape);
  const crossing = crossingsOf(a.shape, b.shape).find((place) => place.s > reach && place.s < length - reach);
  if (crossing === undefined) return null;
  return makeFinding('question', 'flowLinesCross', 'Two flow lines cross. Correct one of them.', {
    cell: 'netCheck',
    entityIds: [a.id, b.id],
    at: crossing.at,
  });
}
