import Flatbush from 'flatbush';
import { orientation, type Pair, segmentsMeet } from '#shared/compute/geometry/predicates.ts';

/**
 * A straight piece between two numbered points; `label` of what it is part of. `outlines`: how many of the chains along
 * it bound the region; `parts`: how many part one material from another.
 */
export type NodedSegment = {
  readonly from: number;
  readonly to: number;
  readonly label: number;
  readonly outlines: number;
  readonly parts: number;
};

/** Points and segments between them that meet only at their ends. */
export type NodedSegments = {
  readonly x: readonly number[];
  readonly y: readonly number[];
  readonly segments: readonly NodedSegment[];
};

/** A polyline with the label of its segments and what it does; where segments lie on one another the smallest label holds. */
export type LabelledChain = {
  readonly points: readonly Pair[];
  readonly label: number;
  readonly bounds: boolean;
  readonly parts: boolean;
};

const MOST_PASSES = 12;

/**
 * Splits chains where they cross, touch or overlap and draws together points nearer than `merge`, so that segments
 * meet only at shared points. One frame and unit. Null when it does not come to rest, which only hopeless input does.
 * Own derivation after the idea of iterated snap rounding (Hobby 1999).
 */
export function nodeSegments(chains: readonly LabelledChain[], merge: number): NodedSegments | null {
  const points = new PointStore(merge);
  let segments = withoutRepeats(chains.flatMap((chain) => segmentsOf(chain, points)));
  for (let pass = 0; pass < MOST_PASSES; pass += 1) {
    const splits = splitsOf(segments, points);
    if (splits.size === 0) return { x: points.x, y: points.y, segments };
    segments = withoutRepeats(segments.flatMap((each, i) => splitAt(each, splits.get(i), points)));
  }
  return null;
}

function segmentsOf({ points, label, bounds, parts }: LabelledChain, store: PointStore): NodedSegment[] {
  const numbers = points.map(([x, y]) => store.numberOf(x, y));
  const outlines = bounds ? 1 : 0;
  return numbers.slice(1).map((to, i) => ({ from: numbers[i]!, to, label, outlines, parts: parts ? 1 : 0 }));
}

/** Numbers places; places nearer than `merge` are one. */
class PointStore {
  readonly x: number[] = [];
  readonly y: number[] = [];
  private readonly cells = new Map<string, number[]>();

  constructor(readonly merge: number) {}

  numberOf(x: number, y: number): number {
    const cx = Math.floor(x / this.merge);
    const cy = Math.floor(y / this.merge);
    for (let i = cx - 1; i <= cx + 1; i += 1) {
      for (let j = cy - 1; j <= cy + 1; j += 1) {
        for (const n of this.cells.get(`${i},${j}`) ?? []) {
          if (Math.hypot(this.x[n]! - x, this.y[n]! - y) < this.merge) return n;
        }
      }
    }
    const n = this.x.push(x) - 1;
    this.y.push(y);
    const key = `${cx},${cy}`;
    const cell = this.cells.get(key);
    if (cell === undefined) this.cells.set(key, [n]);
    else cell.push(n);
    return n;
  }
}

function withoutRepeats(segments: readonly NodedSegment[]): NodedSegment[] {
  const kept = new Map<string, NodedSegment>();
  for (const each of segments) {
    if (each.from === each.to) continue;
    const key = each.from < each.to ? `${each.from},${each.to}` : `${each.to},${each.from}`;
    const known = kept.get(key);
    if (known === undefined) kept.set(key, each);
    else
      kept.set(key, {
        ...known,
        label: Math.min(known.label, each.label),
        outlines: known.outlines + each.outlines,
        parts: known.parts + each.parts,
      });
  }
  return [...kept.values()];
}

/** For each segment the points at which it has to be split. */
function splitsOf(segments: readonly NodedSegment[], points: PointStore): Map<number, Set<number>> {
  const splits = new Map<number, Set<number>>();
  if (segments.length < 2) return splits;
  const index = new Flatbush(segments.length);
  for (const each of segments) index.add(...boxOf(each, points, 0));
  index.finish();
  const add = (i: number, point: number) => {
    const { from, to } = segments[i]!;
    if (point !== from && point !== to) splits.set(i, (splits.get(i) ?? new Set()).add(point));
  };
  segments.forEach((segment, i) => {
    for (const j of index.search(...boxOf(segment, points, points.merge))) {
      const other = segments[j]!;
      if (j === i) continue;
      for (const end of [other.from, other.to]) if (touches(segment, end, points)) add(i, end);
      if (j < i || sharesEnd(segment, other)) continue;
      const place = crossing(segment, other, points);
      if (place === null) continue;
      const point = points.numberOf(...place);
      add(i, point);
      add(j, point);
    }
  });
  return splits;
}

function boxOf({ from, to }: NodedSegment, { x, y }: PointStore, grow: number) {
  return [
    Math.min(x[from]!, x[to]!) - grow,
    Math.min(y[from]!, y[to]!) - grow,
    Math.max(x[from]!, x[to]!) + grow,
    Math.max(y[from]!, y[to]!) + grow,
  ] as const;
}

function sharesEnd(a: NodedSegment, b: NodedSegment): boolean {
  return a.from === b.from || a.from === b.to || a.to === b.from || a.to === b.to;
}

/** True when a point lies on a segment between its ends, or nearer to it than half of what points are kept apart by. */
function touches({ from, to }: NodedSegment, point: number, { x, y, merge }: PointStore): boolean {
  if (point === from || point === to) return false;
  const [dx, dy] = [x[to]! - x[from]!, y[to]! - y[from]!];
  const [px, py] = [x[point]! - x[from]!, y[point]! - y[from]!];
  const square = dx * dx + dy * dy;
  const t = (px * dx + py * dy) / square;
  return t > 0 && t < 1 && Math.abs(px * dy - py * dx) < 0.5 * merge * Math.sqrt(square);
}

function crossing(a: NodedSegment, b: NodedSegment, { x, y }: PointStore): [number, number] | null {
  const [ax, ay, bx, by] = [x[a.from]!, y[a.from]!, x[a.to]!, y[a.to]!];
  const [cx, cy, dx, dy] = [x[b.from]!, y[b.from]!, x[b.to]!, y[b.to]!];
  if (!segmentsMeet(ax, ay, bx, by, cx, cy, dx, dy)) return null;
  const cross = (bx - ax) * (dy - cy) - (by - ay) * (dx - cx);
  // Overlaps along one line are split by the ends that lie on the other segment.
  if (cross === 0 || orientation(ax, ay, bx, by, cx, cy) === orientation(ax, ay, bx, by, dx, dy)) return null;
  const t = Math.min(1, Math.max(0, ((cx - ax) * (dy - cy) - (cy - ay) * (dx - cx)) / cross));
  return [ax + t * (bx - ax), ay + t * (by - ay)];
}

function splitAt(segment: NodedSegment, splits: Set<number> | undefined, points: PointStore): NodedSegment[] {
  if (splits === undefined) return [segment];
  const { x, y } = points;
  const [x0, y0] = [x[segment.from]!, y[segment.from]!];
  const [dx, dy] = [x[segment.to]! - x0, y[segment.to]! - y0];
  const along = (point: number) => (x[point]! - x0) * dx + (y[point]! - y0) * dy;
  const inner = [...splits].sort((a, b) => along(a) - along(b));
  const stops = [segment.from, ...inner, segment.to];
  return stops.slice(1).map((to, i) => ({ ...segment, from: stops[i]!, to }));
}
