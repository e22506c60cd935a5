import { nextOf, type Triangulation, triangulate } from '#shared/compute/field/constrained-triangulation.ts';
import { innerPoints } from '#shared/compute/field/inner-points.ts';
import { type EdgeKind, nodeEdges } from '#shared/compute/field/node-edges.ts';
import { distanceToRing, type Ring, ringContains } from '#shared/compute/geometry/polygon.ts';
import {
  boxesMeet,
  nearestOnPolyline,
  type Polyline,
  polylineOf,
  verticesOf,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { thinned } from '#shared/compute/geometry/thin.ts';
import type { Strip } from '#shared/compute/net/strips.ts';

/** Points nearer than this, in pixels, are one: far below any tracing, far above rounding. */
const MERGE_PX = 0.05;
/** Elements across a strip from line to line. */
const ACROSS = 6;
/** Growth of the elements away from tips and corners, where the gradient is endless. */
const GROWTH = 0.3;
const LEAST_SIZE_PX = 1;

/**
 * A mesh of one strip. Corners of triangles are numbered by unknowns rather than by points: on the two sides of a wall
 * one point has two unknowns. `kindOf[e]` is the kind of the traced edge on which half-edge e lies, if any.
 */
export type StripMesh = {
  readonly xy: Float64Array;
  /** Point numbers of the triangles inside the strip, three each. */
  readonly triangles: Uint32Array;
  /** Unknowns at the same corners. */
  readonly unknowns: Uint32Array;
  readonly unknownCount: number;
  readonly kinds: ReadonlyArray<EdgeKind | null>;
};

/**
 * Meshes the ground between two neighbouring lines. All in base-raster pixels. `walls` stand in the strip where they
 * reach into it; along `freeFaces` the head is the elevation. Null when the outline is too tangled to be meshed.
 */
export function meshStrip(
  strip: Strip,
  walls: readonly Polyline[],
  freeFaces: readonly Polyline[],
  slack: number,
): StripMesh | null {
  const inner = walls.flatMap((wall) => piecesInside(wall, strip.ring, slack));
  const sizeAt = sizing(strip, inner, slack);
  const chains = chainsOf(strip, inner, freeFaces, slack).map(({ points, kind }) => ({
    points: refined(points, sizeAt),
    kind,
  }));
  const noded = nodeEdges(chains, MERGE_PX);
  if (noded === null) return null;
  const outline = outlineOf(strip, inner);
  const clearanceAt = (x: number, y: number) =>
    outline.reduce(
      (least, line) => Math.min(least, nearestOnPolyline(line, x, y).distance),
      Number.POSITIVE_INFINITY,
    );
  const xy = Float64Array.from([...noded.xy, ...innerPoints(strip.ring, sizeAt, clearanceAt)]);
  const mesh = triangulate(
    xy,
    noded.edges.map(({ from, to }) => [from, to] as const),
  );
  if (mesh === null) return null;
  const kinds = new Map(noded.edges.map(({ from, to, kind }) => [pairKey(from, to), kind]));
  return numbered(mesh, strip.ring, kinds);
}

/** Everything an inner point has to keep clear of. */
function outlineOf(strip: Strip, inner: readonly Pair[][]): Polyline[] {
  return [
    strip.beforeShape,
    strip.afterShape,
    ...[...strip.ways.map((way) => way.points), ...inner].map(polylineOf),
  ].filter((line) => line !== null);
}

function chainsOf(strip: Strip, inner: readonly Pair[][], freeFaces: readonly Polyline[], slack: number) {
  const onFreeFace = (points: readonly Pair[]) =>
    points.length > 1 &&
    points.every(([x, y]) => freeFaces.some((face) => nearestOnPolyline(face, x, y).distance <= slack));
  const chains: Array<{ points: readonly Pair[]; kind: EdgeKind }> = [
    { points: verticesOf(strip.beforeShape), kind: 'before' },
    { points: verticesOf(strip.afterShape), kind: 'after' },
  ];
  for (const way of strip.ways) {
    for (let i = 0; i + 1 < way.points.length; i += 1) {
      const points = [way.points[i]!, way.points[i + 1]!];
      chains.push({ points, kind: way.open ? 'open' : onFreeFace(points) ? 'free' : 'closed' });
    }
  }
  for (const points of inner) chains.push({ points, kind: 'closed' });
  return chains;
}

/** The runs of a wall's segments that reach into a ring; what runs along its outline is there already. */
function piecesInside(wall: Polyline, ring: Ring, slack: number): Pair[][] {
  if (!boxesMeet(wall.box, ring.box)) return [];
  const inside = (x: number, y: number) => ringContains(ring, x, y) && distanceToRing(ring, x, y) > slack;
  const vertices = verticesOf(wall);
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

/** Size of the elements in pixels: a part of the strip's width, smaller towards ends and corners. */
function sizing(strip: Strip, inner: readonly Pair[][], slack: number): (x: number, y: number) => number {
  const corners = [
    ...strip.ways.flatMap((way) => [way.points[0]!, way.points[way.points.length - 1]!]),
    ...inner.flatMap((points) => thinned(points, 3 * slack)),
  ];
  // The width is wanted roughly: the lines without their tremor are a tenth as many segments.
  const before = polylineOf(thinned(verticesOf(strip.beforeShape), slack)) ?? strip.beforeShape;
  const after = polylineOf(thinned(verticesOf(strip.afterShape), slack)) ?? strip.afterShape;
  return (x, y) => {
    const width = nearestOnPolyline(before, x, y).distance + nearestOnPolyline(after, x, y).distance;
    let toCorner = Number.POSITIVE_INFINITY;
    for (const corner of corners) toCorner = Math.min(toCorner, Math.hypot(corner[0] - x, corner[1] - y));
    return Math.max(LEAST_SIZE_PX, Math.min(width / ACROSS, 0.5 * LEAST_SIZE_PX + GROWTH * toCorner));
  };
}

/** Splits what is longer than the elements there. */
function refined(points: readonly Pair[], sizeAt: (x: number, y: number) => number): Pair[] {
  const sizes = points.map((point) => sizeAt(...point));
  const result: Pair[] = [];
  points.forEach((point, i) => {
    result.push(point);
    const next = points[i + 1];
    if (next !== undefined) addBetween(result, point, next, sizes[i]!, sizes[i + 1]!, sizeAt);
  });
  return result;
}

function addBetween(
  result: Pair[],
  a: Pair,
  b: Pair,
  sizeA: number,
  sizeB: number,
  sizeAt: (x: number, y: number) => number,
): void {
  const length = Math.hypot(b[0] - a[0], b[1] - a[1]);
  if (length <= 1.5 * Math.min(sizeA, sizeB)) return;
  const middle: Pair = [(a[0] + b[0]) / 2, (a[1] + b[1]) / 2];
  const size = sizeAt(...middle);
  addBetween(result, a, middle, sizeA, size, sizeAt);
  result.push(middle);
  addBetween(result, middle, b, size, sizeB, sizeAt);
}

function pairKey(a: number, b: number): number {
  return a < b ? a * 4_194_304 + b : b * 4_194_304 + a;
}

function numbered(mesh: Triangulation, ring: Ring, kindOf: ReadonlyMap<number, EdgeKind>): StripMesh {
  const { xy, triangles, halfedges } = mesh;
  const kept = keptTriangles(mesh, ring);
  const corners = new UnionFind(triangles.length);
  const kinds: Array<EdgeKind | null> = [];
  const out: number[] = [];
  for (const t of kept.list) {
    for (let e = 3 * t; e < 3 * t + 3; e += 1) {
      const kind = kindOf.get(pairKey(triangles[e]!, triangles[nextOf(e)]!)) ?? null;
      kinds.push(kind);
      out.push(triangles[e]!);
      const other = halfedges[e]!;
      // Nothing flows through a wall: the corners on its two sides stay apart.
      if (other < 0 || kind === 'closed' || !kept.has[Math.floor(other / 3)]) continue;
      corners.join(e, nextOf(other));
      corners.join(nextOf(e), other);
    }
  }
  const names = new Map<number, number>();
  const unknowns = Uint32Array.from(
    kept.list.flatMap((t) => [3 * t, 3 * t + 1, 3 * t + 2]),
    (corner) => {
      const root = corners.rootOf(corner);
      const known = names.get(root) ?? names.size;
      names.set(root, known);
      return known;
    },
  );
  return { xy, triangles: Uint32Array.from(out), unknowns, unknownCount: names.size, kinds };
}

function keptTriangles({ xy, triangles }: Triangulation, ring: Ring): { list: number[]; has: Uint8Array } {
  const has = new Uint8Array(triangles.length / 3);
  const list: number[] = [];
  for (let t = 0; t < has.length; t += 1) {
    const [a, b, c] = [triangles[3 * t]!, triangles[3 * t + 1]!, triangles[3 * t + 2]!];
    const x = (xy[2 * a]! + xy[2 * b]! + xy[2 * c]!) / 3;
    const y = (xy[2 * a + 1]! + xy[2 * b + 1]! + xy[2 * c + 1]!) / 3;
    if (!ringContains(ring, x, y)) continue;
    has[t] = 1;
    list.push(t);
  }
  return { list, has };
}

class UnionFind {
  private readonly parent: Int32Array;

  constructor(size: number) {
    this.parent = Int32Array.from({ length: size }, (_, i) => i);
  }

  rootOf(item: number): number {
    let root = item;
    while (this.parent[root] !== root) {
      this.parent[root] = this.parent[this.parent[root]!]!;
      root = this.parent[root]!;
    }
    return root;
  }

  join(a: number, b: number): void {
    this.parent[this.rootOf(a)] = this.rootOf(b);
  }
}
