import Delaunator from 'delaunator';
import { orientation } from '#shared/compute/geometry/predicates.ts';

/**
 * A triangulation that contains given edges. `triangles`: three vertex numbers each; `halfedges[e]`: the half-edge on
 * the other side of half-edge e, −1 on the hull. Half-edge e starts at vertex `triangles[e]` and ends at that of
 * `nextOf(e)`.
 */
export type Triangulation = {
  readonly xy: Float64Array;
  readonly triangles: Uint32Array;
  readonly halfedges: Int32Array;
};

export function nextOf(e: number): number {
  return e % 3 === 2 ? e - 2 : e + 1;
}

export function previousOf(e: number): number {
  return e % 3 === 0 ? e + 2 : e - 1;
}

/**
 * Triangulates points so that the given edges are edges of triangles. `xy`: flat, x0 y0 x1 y1 …, no two points equal;
 * `edges`: pairs of point numbers that cross one another nowhere and pass through no other point. Returns null when an
 * edge cannot be had, which means that the input was not as said. Delaunay triangulation by the delaunator package;
 * edges inserted by swapping diagonals after Sloan (1993), sides told exactly.
 */
export function triangulate(
  xy: Float64Array,
  edges: ReadonlyArray<readonly [number, number]>,
): Triangulation | null {
  if (xy.length < 6) return null;
  const { triangles, halfedges } = new Delaunator(xy);
  if (triangles.length === 0) return null;
  const mesh = new EdgeInserter(xy, triangles, halfedges);
  return edges.every(([from, to]) => mesh.insert(from, to)) ? { xy, triangles, halfedges } : null;
}

/** Keeps an outgoing half-edge for each vertex while diagonals are swapped. */
class EdgeInserter {
  private readonly leaving: Int32Array;
  private readonly fixed = new Set<number>();

  constructor(
    private readonly xy: Float64Array,
    private readonly triangles: Uint32Array,
    private readonly halfedges: Int32Array,
  ) {
    this.leaving = new Int32Array(xy.length / 2).fill(-1);
    for (let e = 0; e < triangles.length; e += 1) this.leaving[triangles[e]!] = e;
  }

  insert(from: number, to: number): boolean {
    this.fixed.add(this.keyOf(from, to));
    if (this.find(from, to) >= 0) return true;
    const crossed = this.edgesCrossed(from, to);
    if (crossed === null) return false;
    // Every pass swaps at least one diagonal of a convex pair; more turns than this mean broken input.
    let turns = 20 + crossed.length * crossed.length * 4;
    while (crossed.length > 0) {
      turns -= 1;
      if (turns < 0) return false;
      const [a, b] = crossed.shift()!;
      const e = this.find(a, b);
      if (e < 0) return false;
      const swapped = this.swapIfConvex(e);
      if (swapped === null) crossed.push([a, b]);
      else if (this.crosses(from, to, swapped[0], swapped[1])) crossed.push(swapped);
    }
    return this.find(from, to) >= 0;
  }

  /** A half-edge between two vertices, in either direction; −1 when there is none. */
  private find(a: number, b: number): number {
    const { triangles, halfedges } = this;
    const start = this.leaving[a]!;
    // Most edges are met on the way about the vertex one way round; at the hull it is gone round the other way too.
    for (let e = start; e >= 0; ) {
      if (triangles[nextOf(e)] === b) return e;
      const into = previousOf(e);
      if (triangles[into] === b) return into;
      e = halfedges[into]!;
      if (e === start) return -1;
    }
    return this.around(a).find((e) => triangles[nextOf(e)] === b) ?? -1;
  }

  private keyOf(a: number, b: number): number {
    const count = this.leaving.length;
    return a < b ? a * count + b : b * count + a;
  }

  /** Half-edges that leave a vertex, one for each triangle about it. */
  private around(vertex: number): number[] {
    const start = this.leaving[vertex]!;
    if (start < 0) return [];
    const found: number[] = [];
    let e = start;
    do {
      found.push(e);
      e = this.halfedges[previousOf(e)]!;
    } while (e >= 0 && e !== start);
    if (e === start) return found;
    // Stopped at the hull: go on from the start the other way round.
    e = this.halfedges[start]!;
    while (e >= 0) {
      e = nextOf(e);
      found.push(e);
      e = this.halfedges[e]!;
    }
    return found;
  }

  private side(from: number, to: number, vertex: number): number {
    const { xy } = this;
    return orientation(
      xy[2 * from]!,
      xy[2 * from + 1]!,
      xy[2 * to]!,
      xy[2 * to + 1]!,
      xy[2 * vertex]!,
      xy[2 * vertex + 1]!,
    );
  }

  private crosses(from: number, to: number, a: number, b: number): boolean {
    if (a === from || a === to || b === from || b === to) return false;
    return (
      this.side(from, to, a) * this.side(from, to, b) < 0 && this.side(a, b, from) * this.side(a, b, to) < 0
    );
  }

  /** Edges that the straight way from one vertex to another crosses, as pairs of vertices; null when it meets a vertex. */
  private edgesCrossed(from: number, to: number): Array<[number, number]> | null {
    const { triangles, halfedges } = this;
    const first = this.around(from)
      .map(nextOf)
      .find((e) => this.crosses(from, to, triangles[e]!, triangles[nextOf(e)]!));
    if (first === undefined) return null;
    const crossed: Array<[number, number]> = [];
    for (let e = first; ; ) {
      const [a, b] = [triangles[e]!, triangles[nextOf(e)]!];
      if (this.fixed.has(this.keyOf(a, b))) return null;
      crossed.push([a, b]);
      const other = halfedges[e]!;
      if (other < 0 || crossed.length > triangles.length) return null;
      if (triangles[previousOf(other)] === to) return crossed;
      const ahead = [nextOf(other), previousOf(other)].find((each) =>
        this.crosses(from, to, triangles[each]!, triangles[nextOf(each)]!),
      );
      if (ahead === undefined) return null;
      e = ahead;
    }
  }

  /** Swaps the diagonal of the two triangles at half-edge `e`; the new one's ends, or null where they are not convex. */
  private swapIfConvex(e: number): [number, number] | null {
    const { triangles, halfedges } = this;
    const other = halfedges[e]!;
    if (other < 0) return null;
    const a = triangles[e]!;
    const b = triangles[nextOf(e)]!;
    const c = triangles[previousOf(e)]!;
    const d = triangles[previousOf(other)]!;
    if (this.side(c, d, a) * this.side(c, d, b) >= 0) return null;
    const bc = halfedges[nextOf(e)]!;
    const ad = halfedges[nextOf(other)]!;
    // Triangles a b c and b a d become c d b (at e) and d c a (at other).
    const t = e - (e % 3);
    const u = other - (other % 3);
    const ca = halfedges[previousOf(e)]!;
    const db = halfedges[previousOf(other)]!;
    this.write(t, [c, d, b], [u, db, bc]);
    this.write(u, [d, c, a], [t, ca, ad]);
    return [c, d];
  }

  private write(t: number, vertices: readonly number[], twins: readonly number[]): void {
    for (let k = 0; k < 3; k += 1) {
      this.triangles[t + k] = vertices[k]!;
      this.halfedges[t + k] = twins[k]!;
      if (twins[k]! >= 0) this.halfedges[twins[k]!] = t + k;
      this.leaving[vertices[k]!] = t + k;
    }
  }
}
