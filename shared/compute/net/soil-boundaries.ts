import { makeFinding } from '#shared/compute/findings.ts';
import { ringContains } from '#shared/compute/geometry/polygon.ts';
import {
  distanceToPolyline,
  lengthOf,
  type Polyline,
  pointAlong,
  polylineOf,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { linesOfKind, type NetLine } from '#shared/compute/net/net-lines.ts';
import type { NetModel } from '#shared/compute/net/net-model.ts';
import type { Strip } from '#shared/compute/net/strips.ts';
import type { Finding } from '#shared/contract/reading.ts';

/** Places at which a soil boundary is asked whether it lies within the net. */
const PLACES_ASKED = 64;

/**
 * Questions the seepage of a net in which a boundary between soils is drawn, since it counts one permeability. One
 * finding for all such boundaries, at the first place within the net. A boundary that runs along the outline of the
 * net, nearer to it than the model's reach, bounds the net and does not part it.
 */
export function questionSoils({ lines, strips, potentials, reach }: NetModel): Finding[] {
  const outline = [...potentials.map(({ shape }) => shape), ...strips.flatMap(endsOf)];
  const within = linesOfKind(lines, 'soilBoundary').flatMap((line) => {
    const at = placeWithin(line, strips, outline, reach);
    return at === null ? [] : [{ id: line.id, at }];
  });
  const [first] = within;
  if (!first) return [];
  return [
    makeFinding(
      'question',
      'severalSoils',
      'More than one soil is drawn within the net; the seepage counts one permeability for all of it. Check that it is the permeability of the soil in which the cells have the B/L stated.',
      { cell: 'seepage', entityIds: within.map(({ id }) => id), at: first.at },
    ),
  ];
}

function endsOf({ ways }: Strip): Polyline[] {
  return ways.map((way) => polylineOf(way.points)).filter((shape) => shape !== null);
}

function placeWithin(
  { shape }: NetLine,
  strips: readonly Strip[],
  outline: readonly Polyline[],
  reach: number,
): Pair | null {
  const length = lengthOf(shape);
  for (let k = 0; k <= PLACES_ASKED; k += 1) {
    const at = pointAlong(shape, (k / PLACES_ASKED) * length);
    if (!strips.some(({ ring }) => ringContains(ring, ...at))) continue;
    if (outline.every((edge) => distanceToPolyline(edge, ...at) > reach)) return at;
  }
  return null;
}
