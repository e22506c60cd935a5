import { sheetPx } from '#shared/compute/frames.ts';
import { distanceToPolyline, type Polyline, verticesOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { distanceToSegment, thinned } from '#shared/compute/geometry/thin.ts';
import { linesOfKind, type NetLine } from '#shared/compute/net/net-lines.ts';
import type { PreparedNet } from '#shared/compute/prepare-net.ts';
import { creepLength, creepRatio } from '#shared/compute/quantities/creep.ts';
import type { CreepReading } from '#shared/contract/reading-quantities.ts';

/** The contact of a structure: places in working pixels from the headwater to the outlet, and its lines. */
type Contact = { readonly points: readonly Pair[]; readonly lines: readonly string[] };

/** More boundaries in a row than this are no contact of a structure. */
const MOST_LINES = 12;

/**
 * Creep along the contact of the structure with its ground: the shortest chain of impervious lines that leads from the
 * headwater to an outlet, thin walls that branch off it counted down and up again. Null while the net is not finished
 * where no such chain is traced, and in a section with a phreatic line, whose impervious base is the foundation of a dam
 * and no contact that a structure has with its ground. Lengths in the natural section. Source: Lane (1935). Never throws.
 */
export function creepRead(prepared: PreparedNet): CreepReading | null {
  const { model, frame, finished, quantities, ground, phreatic } = prepared;
  if (!finished || phreatic !== null) return null;
  const lines = linesOfKind(model.lines, 'impervious');
  const ends = (role: 'headwater' | 'outlet') =>
    model.potentials.filter((potential) => potential.role === role).map(({ shape }) => shape);
  const touches = (shapes: readonly Polyline[]) => (place: Pair) =>
    shapes.some((shape) => distanceToPolyline(shape, place[0], place[1]) <= model.reach);
  const contact = contactOf(lines, touches(ends('headwater')), touches(ends('outlet')), model.reach);
  if (contact === null) return null;
  const natural = thinned(contact.points, 3 * ground.tracingAccuracyPx).map(([x, y]): Pair => {
    const [offset, elevation] = frame.map.toSection(sheetPx(x, y));
    return [offset, elevation];
  });
  const { steep, flat, weighted } = creepLength(natural);
  if (!Number.isFinite(steep + flat)) return null;
  const { headLost } = quantities;
  return {
    lines: [...contact.lines],
    steep,
    flat,
    weightedLength: weighted,
    weightedRatio: headLost === null ? null : creepRatio(weighted, headLost),
  };
}

type Touch = (place: Pair) => boolean;

function contactOf(
  lines: readonly NetLine[],
  atHeadwater: Touch,
  atOutlet: Touch,
  reach: number,
): Contact | null {
  const ways = lines.flatMap((line) => bothWays(line));
  const starts = ways.filter(({ points }) => atHeadwater(points[0]!));
  const found = starts.flatMap((start) => chainsFrom(start, ways, atOutlet, reach));
  const shortest = found.sort((a, b) => lengthOf(a.points) - lengthOf(b.points))[0];
  return shortest === undefined ? null : withBranches(shortest, lines, reach);
}

function bothWays({ id, shape }: NetLine): Contact[] {
  const points = verticesOf(shape);
  return [
    { points, lines: [id] },
    { points: points.toReversed(), lines: [id] },
  ];
}

/**
 * The chains from one line to the outlet. A lone wall between headwater and outlet, both of which meet its head, is
 * followed down one face and up the other.
 */
function chainsFrom(start: Contact, ways: readonly Contact[], atOutlet: Touch, reach: number): Contact[] {
  if (atOutlet(start.points[0]!) && !atOutlet(start.points.at(-1)!)) {
    return [{ ...start, points: downAndUp(start.points) }];
  }
  const found: Contact[] = [];
  let open: Contact[] = [start];
  for (let round = 0; round < MOST_LINES && open.length > 0 && found.length === 0; round += 1) {
    found.push(...open.filter(({ points }) => atOutlet(points.at(-1)!)));
    open = open
      .flatMap((chain) =>
        ways
          .filter(
            ({ points, lines }) =>
              !chain.lines.includes(lines[0]!) && near(chain.points.at(-1)!, points[0]!, reach),
          )
          .map((next) => ({
            points: [...chain.points, ...next.points],
            lines: [...chain.lines, ...next.lines],
          }))
          .slice(0, MOST_LINES),
      )
      .slice(0, MOST_LINES);
  }
  return found;
}

/** The contact with each thin wall that hangs on it by one end put in, down and up. */
function withBranches(contact: Contact, lines: readonly NetLine[], reach: number): Contact {
  const branches = lines
    .filter(({ id }) => !contact.lines.includes(id))
    .flatMap(bothWays)
    .filter(({ points }) => placeOn(contact.points, points[0]!, reach) !== null)
    .filter(({ points }) => placeOn(contact.points, points.at(-1)!, reach) === null);
  return branches.reduce<Contact>(({ points, lines: ids }, branch) => {
    const at = placeOn(points, branch.points[0]!, reach);
    if (at === null) return { points, lines: ids };
    return {
      points: [...points.slice(0, at + 1), ...downAndUp(branch.points), ...points.slice(at + 1)],
      lines: [...ids, ...branch.lines],
    };
  }, contact);
}

/** Index of the piece of a run of points on which a place lies, within `reach`; null when it lies on none. */
function placeOn(points: readonly Pair[], place: Pair, reach: number): number | null {
  let best = reach;
  let found: number | null = null;
  for (let i = 1; i < points.length; i += 1) {
    const away = distanceToSegment(place, points[i - 1]!, points[i]!);
    if (away > best || (found !== null && away === best)) continue;
    best = away;
    found = i - 1;
  }
  return found;
}

function downAndUp(points: readonly Pair[]): Pair[] {
  return [...points, ...points.slice(0, -1).toReversed()];
}

function lengthOf(points: readonly Pair[]): number {
  return points
    .slice(1)
    .reduce((sum, [x, y], i) => sum + Math.hypot(x - points[i]![0], y - points[i]![1]), 0);
}

function near(a: Pair, b: Pair, reach: number): boolean {
  return Math.hypot(a[0] - b[0], a[1] - b[1]) <= reach;
}
