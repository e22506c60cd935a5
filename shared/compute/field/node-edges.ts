import Flatbush from 'flatbush';
import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import { orientation, segmentsMeet } from '#shared/compute/geometry/predicates.ts';

/** What an edge of a strip is: a line held at its head, a boundary closed to flow, an open end, or a soil boundary. */
export type EdgeKind = 'before' | 'after' | 'free' | 'closed' | 'open' | 'soil';

/** An edge between two numbered points. */
export type NodedEdge = { readonly from: number; readonly to: number; readonly kind: EdgeKind };

/** Points, flat x0 y0 x1 y1 …, and edges between them that meet only at their ends. */
export type NodedEdges = { readonly xy: Float64Array; readonly edges: readonly NodedEdge[] };

const MOST_PASSES = 8;

/** Which kind holds where edges lie on one another: a held head before a wall, a wall before an open end. */
const RANK: Record<EdgeKind, number> = { before: 0, after: 1, free: 2, closed: 3, open: 4, soil: 5 };

/**
 * Splits edges where they cross, touch or overlap, and draws together points nearer than `merge`, so that edges meet
 * only at shared points. Frame and `merge` in one unit (pixels). Returns null when it does not come to rest, which only
 * hopeless input does. Snapping a crossing to a rounded point can make new crossings: passes are repeated until none
 * is left. Own derivation after the idea of iterated snap rounding (Hobby 1999).
 */
export function nodeEdges(
  chains: ReadonlyArray<{
    readonly points: ReadonlyArray<readonly [number, number]>;
    readonly kind: EdgeKind;
  }>,
  merge: number,
): NodedEdges | null {
  const points = new PointStore(merge);
  let edges: NodedEdge[] = [];
  for (const { points: places, kind } of chains) {
    const numbers = places.map(([x, y]) => points.numberOf(x, y));
    for (let i = 0; i + 1 < numbers.length; i += 1)
      edges.push({ from: numbers[i]!, to: numbers[i + 1]!, kind });
  }
  edges = withoutRepeats(edges);
  for (let pass = 0; pass < MOST_PASSES; pass += 1) {
    const splits = splitsOf(edges, points);
    if (splits.size === 0) return { xy: points.flat(), edges };
    edges = withoutRepeats(edges.flatMap((edge, i) => splitEdge(edge, splits.get(i), points)));
  }
  return null;
}

/** Numbers places; places nearer than `merge` are one. */
class PointStore {
  readonly x: number[] = [];
  readonly y: number[] = [];
  private readonly cells = new Map<number, number[]>();

  constructor(readonly merge: number) {}

  numberOf(x: number, y: number): number {
    const cx = Math.floor(x / this.merge);
    const cy = Math.floor(y / this.merge);
    for (let i = cx - 1; i <= cx + 1; i += 1) {
      for (let j = cy - 1; j <= cy + 1; j += 1) {
        const held = this.cells.get(cellKey(i, j));
        if (held === undefined) continue;
        for (const n of held) if (lengthOfVector(this.x[n]! - x, this.y[n]! - y) < this.merge) return n;
      }
    }
    const n = this.x.push(x) - 1;
    this.y.push(y);
    const key = cellKey(cx, cy);
    const held = this.cells.get(key);
    if (held === undefined) this.cells.set(key, [n]);
    else held.push(n);
    return n;
  }

  flat(): Float64Array {
    const xy = new Float64Array(2 * this.x.length);
    for (let i = 0; i < this.x.length; i += 1) {
      xy[2 * i] = this.x[i]!;
      xy[2 * i + 1] = this.y[i]!;
    }
    return xy;
  }
}

/** Two cells may share a key: what is found in them is looked at anyway. */
function cellKey(i: number, j: number): number {
  return i * 134_217_728 + j;
}

function withoutRepeats(edges: readonly NodedEdge[]): NodedEdge[] {
  const kept = new Map<number, NodedEdge>();
  for (const edge of edges) {
    if (edge.from === edge.to) continue;
    const [low, high] = edge.from < edge.to ? [edge.from, edge.to] : [edge.to, edge.from];
    const key = low * 67_108_864 + high;
    const known = kept.get(key);
    if (known === undefined || RANK[edge.kind] < RANK[known.kind]) kept.set(key, edge);
  }
  return [...kept.values()];
}

/** For each edge the points at which it has to be split. */
function splitsOf(edges: readonly NodedEdge[], points: PointStore): Map<number, Set<number>> {
  const splits = new Map<number, Set<number>>();
  if (edges.length < 2) return splits;
  const index = new Flatbush(edges.length);
  const boxOf = ({ from, to }: NodedEdge, grow: number) =>
    [
      Math.min(points.x[from]!, points.x[to]!) - grow,
      Math.min(points.y[from]!, points.y[to]!) - grow,
      Math.max(points.x[from]!, points.x[to]!) + grow,
      Math.max(points.y[from]!, points.y[to]!) + grow,
    ] as const;
  for (const edge of edges) index.add(...boxOf(edge, 0));
  index.finish();
  const add = (i: number, point: number) => {
    const edge = edges[i]!;
    if (point === edge.from || point === edge.to) return;
    splits.set(i, (splits.get(i) ?? new Set()).add(point));
  };
  edges.forEach((edge, i) => {
    for (const j of index.search(...boxOf(edge, points.merge))) {
      const other = edges[j]!;
      if (j === i) continue;
      for (const end of [other.from, other.to]) if (touches(edge, end, points)) add(i, end);
      if (j < i || sharesEnd(edge, other)) continue;
      const place = crossing(edge, other, points);
      if (place === null) continue;
      const point = points.numberOf(place[0], place[1]);
      add(i, point);
      add(j, point);
    }
  });
  return splits;
}

function sharesEnd(a: NodedEdge, b: NodedEdge): boolean {
  return a.from === b.from || a.from === b.to || a.to === b.from || a.to === b.to;
}

/** True when a point lies on an edge between its ends, or nearer to it than points are kept apart. */
function touches(edge: NodedEdge, point: number, points: PointStore): boolean {
  if (point === edge.from || point === edge.to) return false;
  const ax = points.x[edge.from]!;
  const ay = points.y[edge.from]!;
  const dx = points.x[edge.to]! - ax;
  const dy = points.y[edge.to]! - ay;
  const px = points.x[point]! - ax;
  const py = points.y[point]! - ay;
  const square = dx * dx + dy * dy;
  const t = (px * dx + py * dy) / square;
  if (t <= 0 || t >= 1) return false;
  return Math.abs(px * dy - py * dx) < 0.5 * points.merge * Math.sqrt(square);
}

function crossing(a: NodedEdge, b: NodedEdge, points: PointStore): [number, number] | null {
  const { x, y } = points;
  const [ax, ay, bx, by] = [x[a.from]!, y[a.from]!, x[a.to]!, y[a.to]!];
  const [cx, cy, dx, dy] = [x[b.from]!, y[b.from]!, x[b.to]!, y[b.to]!];
  if (!segmentsMeet(ax, ay, bx, by, cx, cy, dx, dy)) return null;
  const cross = (bx - ax) * (dy - cy) - (by - ay) * (dx - cx);
  // Collinear overlaps are split by the ends that lie on the other edge.
  if (cross === 0 || orientation(ax, ay, bx, by, cx, cy) === orientation(ax, ay, bx, by, dx, dy)) return null;
  const t = Math.min(1, Math.max(0, ((cx - ax) * (dy - cy) - (cy - ay) * (dx - cx)) / cross));
  return [ax + t * (bx - ax), ay + t * (by - ay)];
}

function splitEdge(edge: NodedEdge, splits: Set<number> | undefined, points: PointStore): NodedEdge[] {
  if (splits === undefined) return [edge];
  const dx = points.x[edge.to]! - points.x[edge.from]!;
  const dy = points.y[edge.to]! - points.y[edge.from]!;
  const along = (n: number) => points.x[n]! * dx + points.y[n]! * dy;
  const order = [...splits].sort((a, b) => along(a) - along(b));
  const chain = [edge.from, ...order, edge.to];
  return chain.slice(1).map((to, i) => ({ from: chain[i]!, to, kind: edge.kind }));
}
