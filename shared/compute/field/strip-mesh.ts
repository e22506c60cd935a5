import { nextOf, type Triangulation, triangulate } from '#shared/compute/field/constrained-triangulation.ts';
import { gradedPoints } from '#shared/compute/field/graded-points.ts';
import { type EdgeKind, type NodedEdges, nodeEdges } from '#shared/compute/field/node-edges.ts';
import { chainsOf, outlineOf, piecesInside } from '#shared/compute/field/strip-chains.ts';
import { sizesOf } from '#shared/compute/field/strip-sizes.ts';
import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import { type Ring, ringContains } from '#shared/compute/geometry/polygon.ts';
import type { Polyline } from '#shared/compute/geometry/polyline.ts';
import type { Strip } from '#shared/compute/net/strips.ts';

/** Points nearer than this, in pixels, are one: far below any tracing, far above rounding. */
const MERGE_PX = 0.05;

/**
 * A mesh of one strip. Corners of triangles are numbered by unknowns rather than by points: on the two sides of a wall
 * one point has two unknowns. `kinds[e]` is the kind of the traced edge on which half-edge e lies, if any.
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

/** What stands in the strips; shapes in the frame of the strips. */
export type StripSurroundings = {
  readonly walls: readonly Polyline[];
  /** Faces along which the head is the elevation. */
  readonly freeFaces: readonly Polyline[];
  readonly soilBoundaries: readonly Polyline[];
  readonly slack: number;
};

/**
 * Meshes the ground between two neighbouring lines. All in working pixels. Walls stand in the strip where they reach
 * into it; along free faces the head is the elevation; triangles lie on one side of a soil boundary. Null when the
 * outline is too tangled to be meshed.
 */
export function meshStrip(strip: Strip, around: StripSurroundings): StripMesh | null {
  const { walls, freeFaces, soilBoundaries, slack } = around;
  const inner = walls.flatMap((wall) => piecesInside(wall, strip.ring, slack));
  const soil = soilBoundaries.flatMap((line) => piecesInside(line, strip.ring, slack));
  const chains = chainsOf(strip, sizesOf(strip, inner, slack), inner, soil, freeFaces, slack);
  const outline = outlineOf(chains);
  const noded = nodeEdges([chains.before, chains.after, ...chains.ways.flat(), ...chains.inside], MERGE_PX);
  if (outline === null || noded === null) return null;
  const inside = gradedPoints(outline, noded.xy, spacingsOf(noded));
  const xy = new Float64Array(noded.xy.length + inside.length);
  xy.set(noded.xy);
  xy.set(inside, noded.xy.length);
  const mesh = triangulate(
    xy,
    noded.edges.map(({ from, to }) => [from, to] as const),
  );
  return mesh === null ? null : numbered(mesh, outline, noded);
}

/** For each node the longest edge that ends at it. */
function spacingsOf({ xy, edges }: NodedEdges): Float64Array {
  const spacing = new Float64Array(xy.length / 2);
  for (const { from, to } of edges) {
    const length = lengthOfVector(xy[2 * to]! - xy[2 * from]!, xy[2 * to + 1]! - xy[2 * from + 1]!);
    spacing[from] = Math.max(spacing[from]!, length);
    spacing[to] = Math.max(spacing[to]!, length);
  }
  return spacing;
}

function numbered(mesh: Triangulation, ring: Ring, noded: NodedEdges): StripMesh {
  const { xy, triangles, halfedges } = mesh;
  const kindOf = edgeKinds(mesh, noded);
  const inside = trianglesInside(mesh, ring, kindOf);
  const corners = new UnionFind(triangles.length);
  for (let e = 0; e < triangles.length; e += 1) {
    const other = halfedges[e]!;
    // Nothing flows through a wall: the corners on its two sides stay apart.
    if (other < e || kindOf[e] === 'closed' || !inside[(e / 3) | 0] || !inside[(other / 3) | 0]) continue;
    corners.join(e, nextOf(other));
    corners.join(nextOf(e), other);
  }
  const names = new Int32Array(triangles.length).fill(-1);
  const points = new Uint32Array(triangles.length);
  const unknowns = new Uint32Array(triangles.length);
  const kinds: Array<EdgeKind | null> = [];
  let count = 0;
  for (let e = 0; e < triangles.length; e += 1) {
    if (!inside[(e / 3) | 0]) continue;
    const root = corners.rootOf(e);
    if (names[root]! < 0) {
      names[root] = count;
      count += 1;
    }
    points[kinds.length] = triangles[e]!;
    unknowns[kinds.length] = names[root]!;
    kinds.push(kindOf[e] ?? null);
  }
  return {
    xy,
    triangles: points.slice(0, kinds.length),
    unknowns: unknowns.slice(0, kinds.length),
    unknownCount: count,
    kinds,
  };
}

/** The kind of traced edge on which each half-edge lies. */
function edgeKinds({ xy, triangles }: Triangulation, { edges }: NodedEdges): Array<EdgeKind | undefined> {
  const count = xy.length / 2;
  const known = new Map<number, EdgeKind>();
  for (const { from, to, kind } of edges) known.set(from < to ? from * count + to : to * count + from, kind);
  let nodes = 0;
  for (const { from, to } of edges) nodes = Math.max(nodes, from + 1, to + 1);
  const kinds = new Array<EdgeKind | undefined>(triangles.length).fill(undefined);
  for (let e = 0; e < triangles.length; e += 1) {
    const a = triangles[e]!;
    const b = triangles[nextOf(e)]!;
    if (a < nodes && b < nodes) kinds[e] = known.get(a < b ? a * count + b : b * count + a);
  }
  return kinds;
}

/** Triangles inside the ring: asked once for each patch that no traced edge parts, at its largest triangle. */
function trianglesInside(
  { xy, triangles, halfedges }: Triangulation,
  ring: Ring,
  kindOf: ReadonlyArray<EdgeKind | undefined>,
): Uint8Array {
  const count = triangles.length / 3;
  const patches = new UnionFind(count);
  for (let e = 0; e < triangles.length; e += 1) {
    const other = halfedges[e]!;
    if (other > e && kindOf[e] === undefined) patches.join((e / 3) | 0, (other / 3) | 0);
  }
  const largest = new Int32Array(count).fill(-1);
  const areas = new Float64Array(count);
  for (let t = 0; t < count; t += 1) {
    const area = areaOf(xy, triangles, t);
    const root = patches.rootOf(t);
    if (largest[root]! >= 0 && area <= areas[root]!) continue;
    largest[root] = t;
    areas[root] = area;
  }
  const isInside = new Uint8Array(count);
  for (let root = 0; root < count; root += 1) {
    const t = largest[root]!;
    if (t >= 0 && ringContains(ring, ...middleOf(xy, triangles, t))) isInside[root] = 1;
  }
  const inside = new Uint8Array(count);
  for (let t = 0; t < count; t += 1) inside[t] = isInside[patches.rootOf(t)]!;
  return inside;
}

function areaOf(xy: Float64Array, triangles: Uint32Array, t: number): number {
  const a = 2 * triangles[3 * t]!;
  const b = 2 * triangles[3 * t + 1]!;
  const c = 2 * triangles[3 * t + 2]!;
  const cross = (xy[b]! - xy[a]!) * (xy[c + 1]! - xy[a + 1]!) - (xy[b + 1]! - xy[a + 1]!) * (xy[c]! - xy[a]!);
  return Math.abs(cross) / 2;
}

function middleOf(xy: Float64Array, triangles: Uint32Array, t: number): [number, number] {
  const [a, b, c] = [2 * triangles[3 * t]!, 2 * triangles[3 * t + 1]!, 2 * triangles[3 * t + 2]!];
  return [(xy[a]! + xy[b]! + xy[c]!) / 3, (xy[a + 1]! + xy[b + 1]! + xy[c + 1]!) / 3];
}

class UnionFind {
  private readonly parent: Int32Array;

  constructor(size: number) {
    this.parent = new Int32Array(size);
    for (let i = 0; i < size; i += 1) this.parent[i] = i;
  }

  rootOf(item: number): number {
    const { parent } = this;
    let root = item;
    while (parent[root] !== root) {
      parent[root] = parent[parent[root]!]!;
      root = parent[root]!;
    }
    return root;
  }

  join(a: number, b: number): void {
    this.parent[this.rootOf(a)] = this.rootOf(b);
  }
}
