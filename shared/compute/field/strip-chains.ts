import type { Chain, Sizes } from '#shared/compute/field/strip-sizes.ts';
import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import { distanceToRing, type Ring, ringContains, ringOf } from '#shared/compute/geometry/polygon.ts';
import {
  boxesMeet,
  distanceToPolyline,
  type Polyline,
  verticesOf,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { distanceToSegment } from '#shared/compute/geometry/thin.ts';
import type { Strip } from '#shared/compute/net/strips.ts';

/** A line may be held off its place by this part of the strip's width: that part of a drop is lost by it. */
const HELD_OFF = 0.001;

/** What the mesh of a strip has to keep: its two lines, its two ends, and what stands inside. */
export type StripChains = {
  readonly before: Chain;
  readonly after: Chain;
  /** Each end from the line before to the line after. */
  readonly ways: readonly Chain[][];
  readonly inside: readonly Chain[];
};

/** The chains of a strip with as many vertices as its elements ask for. */
export function chainsOf(
  strip: Strip,
  sizes: Sizes,
  walls: readonly Pair[][],
  soilBoundaries: readonly Pair[][],
  freeFaces: readonly Polyline[],
  slack: number,
): StripChains {
  const chainOf = (kind: Chain['kind']) => (points: readonly Pair[]) => spaced({ points, kind }, sizes);
  return {
    before: chainOf('before')(verticesOf(strip.beforeShape)),
    after: chainOf('after')(verticesOf(strip.afterShape)),
    ways: strip.ways.map(({ points, open }) =>
      waysChains(points, open, freeFaces, slack).map((chain) => spaced(chain, sizes)),
    ),
    inside: [...walls.map(chainOf('closed')), ...soilBoundaries.map(chainOf('soil'))],
  };
}

/** The outline that the chains make, which is not quite that of the lines they were made of. */
export function outlineOf({ before, after, ways }: StripChains): Ring | null {
  const [start, end] = ways.map((chains) => chains.flatMap(({ points }) => points));
  return ringOf([
    ...before.points,
    ...(end ?? []),
    ...[...after.points].reverse(),
    ...[...(start ?? [])].reverse(),
  ]);
}

/** A way along the carriers, parted where it enters or leaves a face of free outflow. */
function waysChains(
  points: readonly Pair[],
  open: boolean,
  freeFaces: readonly Polyline[],
  slack: number,
): Chain[] {
  const onFreeFace = ([x, y]: Pair) => freeFaces.some((face) => distanceToPolyline(face, x, y) <= slack);
  const free = open || freeFaces.length === 0 ? points.map(() => false) : points.map(onFreeFace);
  const chains: Array<{ points: Pair[]; kind: Chain['kind'] }> = [];
  for (let i = 0; i + 1 < points.length; i += 1) {
    const kind = open ? 'open' : free[i] && free[i + 1] ? 'free' : 'closed';
    const last = chains[chains.length - 1];
    if (last?.kind === kind) last.points.push(points[i + 1]!);
    else chains.push({ points: [points[i]!, points[i + 1]!], kind });
  }
  return chains;
}

/** The runs of a line's segments that reach into a ring; what runs along its outline is there already. */
export function piecesInside(line: Polyline, ring: Ring, slack: number): Pair[][] {
  if (!boxesMeet(line.box, ring.box)) return [];
  const inside = (x: number, y: number) => ringContains(ring, x, y) && distanceToRing(ring, x, y) > slack;
  const vertices = verticesOf(line);
  const within = vertices.map(([x, y]) => inside(x, y));
  const pieces: Pair[][] = [];
  let current: Pair[] = [];
  for (let i = 0; i + 1 < vertices.length; i += 1) {
    const a = vertices[i]!;
    const b = vertices[i + 1]!;
    if (within[i] || within[i + 1] || inside((a[0] + b[0]) / 2, (a[1] + b[1]) / 2)) {
      if (current.length === 0) current.push(a);
      current.push(b);
    } else if (current.length > 0) {
      pieces.push(current);
      current = [];
    }
  }
  return current.length > 0 ? [...pieces, current] : pieces;
}

/**
 * A chain with as many vertices as the elements along it ask for: those are left out that are needed neither for its
 * shape, within a small part of the strip's width, nor for the size of the elements.
 */
function spaced({ points, kind }: Chain, { widthAt, sizeAt }: Sizes): Chain {
  const kept = withoutNeedless(points, widthAt);
  const sizes = kept.map((point) => sizeAt(...point));
  const result: Pair[] = [];
  kept.forEach((point, i) => {
    result.push(point);
    const next = kept[i + 1];
    if (next !== undefined) addBetween(result, point, next, sizes[i]!, sizes[i + 1]!, sizeAt);
  });
  return { points: result, kind };
}

/** Ramer (1972), Douglas and Peucker (1973), with a tolerance that follows the width of the strip. */
function withoutNeedless(points: readonly Pair[], widthAt: Sizes['widthAt']): Pair[] {
  if (points.length < 3) return [...points];
  const tolerance = points.map(([x, y]) => HELD_OFF * widthAt(x, y));
  const kept = new Uint8Array(points.length);
  kept[0] = 1;
  kept[points.length - 1] = 1;
  const open: Array<readonly [number, number]> = [[0, points.length - 1]];
  for (let span = open.pop(); span !== undefined; span = open.pop()) {
    const [from, to] = span;
    let worst = 1;
    let at = -1;
    for (let i = from + 1; i < to; i += 1) {
      const times = distanceToSegment(points[i]!, points[from]!, points[to]!) / Math.max(1e-9, tolerance[i]!);
      if (times > worst) {
        worst = times;
        at = i;
      }
    }
    if (at < 0) continue;
    kept[at] = 1;
    open.push([from, at], [at, to]);
  }
  return points.filter((_, i) => kept[i] === 1);
}

function addBetween(
  result: Pair[],
  a: Pair,
  b: Pair,
  sizeA: number,
  sizeB: number,
  sizeAt: Sizes['sizeAt'],
): void {
  const length = lengthOfVector(b[0] - a[0], b[1] - a[1]);
  if (length <= 1.5 * Math.min(sizeA, sizeB)) return;
  const middle: Pair = [(a[0] + b[0]) / 2, (a[1] + b[1]) / 2];
  const size = sizeAt(...middle);
  addBetween(result, a, middle, sizeA, size, sizeAt);
  result.push(middle);
  addBetween(result, middle, b, size, sizeB, sizeAt);
}
