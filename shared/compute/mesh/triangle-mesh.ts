import { incircle } from 'robust-predicates';
import { orientation } from '#shared/compute/geometry/predicates.ts';

/** The half-edge after `e` in its triangle; it starts where `e` ends. */
export function nextOf(e: number): number {
  return e % 3 === 2 ? e - 2 : e + 1;
}

/** The half-edge before `e` in its triangle; it starts at the corner opposite `e`. */
export function previousOf(e: number): number {
  return e % 3 === 0 ? e + 2 : e - 1;
}

/** No label on a half-edge: it may be swapped. */
export const FREE = -1;

/** Where a place lies: in a triangle, on a half-edge or at a vertex; each null when it does not apply. */
export type Located = {
  readonly triangle: number;
  readonly edge: number | null;
  readonly vertex: number | null;
};

/**
 * A triangulation that grows: vertices `x`, `y`; half-edge e of triangle ⌊e/3⌋ starts at vertex `corner[e]`, and
 * `twin[e]` is the half-edge on its other side (−1 on the hull). `label[e]`: FREE, or the number of what the edge is
 * part of, in which case it is never swapped. `region[t]`: number handed on to the parts of a triangle. Triangles turn
 * counter-clockwise in axes with y up. Sides and circles are told exactly (Shewchuk 1997).
 */
export class TriangleMesh {
  readonly x: number[] = [];
  readonly y: number[] = [];
  readonly corner: number[] = [];
  readonly twin: number[] = [];
  readonly label: number[] = [];
  readonly region: number[] = [];
  private readonly leaving: number[] = [];
  private lastFound = 0;

  get triangleCount(): number {
    return this.region.length;
  }

  addVertex(x: number, y: number): number {
    this.leaving.push(-1);
    this.y.push(y);
    return this.x.push(x) - 1;
  }

  addTriangle(a: number, b: number, c: number): number {
    const t = this.region.push(0) - 1;
    for (const vertex of [a, b, c]) {
      this.leaving[vertex] = this.corner.push(vertex) - 1;
      this.twin.push(-1);
      this.label.push(FREE);
    }
    return t;
  }

  /** Makes two half-edges each other's other side; −1 for none. */
  join(e: number, f: number): void {
    if (e >= 0) this.twin[e] = f;
    if (f >= 0) this.twin[f] = e;
  }

  /** Side of vertex `v` of the line from `a` to `b`: +1 to the left, −1 to the right, 0 on it. */
  side(a: number, b: number, v: number): number {
    const { x, y } = this;
    return orientation(x[a]!, y[a]!, x[b]!, y[b]!, x[v]!, y[v]!);
  }

  /** Half-edges that leave a vertex, one for each triangle about it. */
  around(vertex: number): number[] {
    const start = this.leaving[vertex]!;
    const found: number[] = [];
    if (start < 0) return found;
    let e = start;
    do {
      found.push(e);
      e = this.twin[previousOf(e)]!;
    } while (e >= 0 && e !== start);
    if (e === start) return found;
    e = this.twin[start]!;
    while (e >= 0) {
      e = nextOf(e);
      found.push(e);
      e = this.twin[e]!;
    }
    return found;
  }

  /** A half-edge between two vertices, from `a` to `b` if there is one that way round; −1 when they are no neighbours. */
  find(a: number, b: number): number {
    let other = -1;
    for (const e of this.around(a)) {
      if (this.corner[nextOf(e)] === b) return e;
      if (this.corner[previousOf(e)] === b) other = previousOf(e);
    }
    return other;
  }

  /** Labels an edge on both of its sides. */
  setLabel(e: number, label: number): void {
    this.label[e] = label;
    const other = this.twin[e]!;
    if (other >= 0) this.label[other] = label;
  }

  /**
   * Where a place lies, by walking from the last place found (or from `from`). Null outside the hull. `stopAt`, when
   * given, is asked for every half-edge about to be crossed and ends the walk there, giving that half-edge.
   */
  locate(
    px: number,
    py: number,
    from = this.lastFound,
    stopAt?: (e: number) => boolean,
  ): Located | { readonly stopped: number } | null {
    let t = Math.min(from, this.triangleCount - 1);
    for (let steps = 0; steps <= 4 * this.triangleCount; steps += 1) {
      // Starting at another corner each time keeps the walk from going round in circles.
      const shift = steps % 3;
      const out = this.edgeTowards(t, shift, px, py);
      if (out < 0) {
        this.lastFound = t;
        return this.placeIn(t, px, py);
      }
      if (stopAt?.(out)) return { stopped: out };
      const other = this.twin[out]!;
      if (other < 0) return null;
      t = Math.floor(other / 3);
    }
    return null;
  }

  private edgeTowards(t: number, shift: number, px: number, py: number): number {
    for (let k = 0; k < 3; k += 1) {
      const e = 3 * t + ((k + shift) % 3);
      if (this.sideOfPlace(e, px, py) < 0) return e;
    }
    return -1;
  }

  private sideOfPlace(e: number, px: number, py: number): number {
    const a = this.corner[e]!;
    const b = this.corner[nextOf(e)]!;
    return orientation(this.x[a]!, this.y[a]!, this.x[b]!, this.y[b]!, px, py);
  }

  private placeIn(t: number, px: number, py: number): Located {
    const on: number[] = [];
    for (let e = 3 * t; e < 3 * t + 3; e += 1) if (this.sideOfPlace(e, px, py) === 0) on.push(e);
    if (on.length === 0) return { triangle: t, edge: null, vertex: null };
    if (on.length === 1) return { triangle: t, edge: on[0]!, vertex: null };
    const shared = nextOf(on[0]!) === on[1] ? on[1]! : on[0]!;
    return { triangle: t, edge: null, vertex: this.corner[shared]! };
  }

  /** Puts a vertex into the triangle, or onto the half-edge, where it was found to lie, and swaps edges as needed. */
  insertAt(vertex: number, { triangle, edge }: Located): void {
    if (edge === null) this.splitTriangle(triangle, vertex);
    else this.splitEdge(edge, vertex);
    this.restore(this.around(vertex).map(nextOf));
  }

  private splitTriangle(t: number, v: number): void {
    const [a, b, c] = [this.corner[3 * t]!, this.corner[3 * t + 1]!, this.corner[3 * t + 2]!];
    const outer = [3 * t, 3 * t + 1, 3 * t + 2].map((e) => this.outside(e));
    const u = this.addTriangle(b, c, v);
    const w = this.addTriangle(c, a, v);
    this.write(t, [a, b, v], [outer[0]!, INNER, INNER]);
    this.write(u, [b, c, v], [outer[1]!, INNER, INNER]);
    this.write(w, [c, a, v], [outer[2]!, INNER, INNER]);
    this.join(3 * t + 1, 3 * u + 2);
    this.join(3 * u + 1, 3 * w + 2);
    this.join(3 * w + 1, 3 * t + 2);
    this.region[u] = this.region[t]!;
    this.region[w] = this.region[t]!;
  }

  private splitEdge(e: number, v: number): void {
    const f = this.twin[e]!;
    const label = this.label[e]!;
    const near = this.halve(e, v);
    if (f < 0) {
      this.label[near.first] = label;
      this.label[near.second] = label;
      return;
    }
    const far = this.halve(f, v);
    this.join(near.first, far.second);
    this.join(near.second, far.first);
    for (const part of [near.first, near.second, far.first, far.second]) this.label[part] = label;
  }

  /** Parts the triangle of half-edge `e` at a vertex on it; gives the two halves of the edge, in its direction. */
  private halve(e: number, v: number): { first: number; second: number } {
    const t = Math.floor(e / 3);
    const [a, b, c] = [this.corner[e]!, this.corner[nextOf(e)]!, this.corner[previousOf(e)]!];
    const bc = this.outside(nextOf(e));
    const ca = this.outside(previousOf(e));
    const u = this.addTriangle(v, b, c);
    this.write(t, [a, v, c], [INNER, INNER, ca]);
    this.write(u, [v, b, c], [INNER, bc, INNER]);
    this.join(3 * t + 1, 3 * u + 2);
    this.region[u] = this.region[t]!;
    return { first: 3 * t, second: 3 * u };
  }

  private outside(e: number): Outside {
    return { twin: this.twin[e]!, label: this.label[e]! };
  }

  private write(t: number, vertices: readonly number[], outer: readonly Outside[]): void {
    for (let k = 0; k < 3; k += 1) {
      const e = 3 * t + k;
      this.corner[e] = vertices[k]!;
      this.leaving[vertices[k]!] = e;
      this.label[e] = outer[k]!.label;
      this.twin[e] = outer[k]!.twin;
      if (outer[k]!.twin >= 0) this.twin[outer[k]!.twin] = e;
    }
  }

  /** Swaps edges until each of those given, and whatever that upsets, is Delaunay; labelled edges stay. Lawson (1977). */
  restore(edges: number[]): void {
    while (edges.length > 0) {
      const e = edges.pop()!;
      if (!this.shouldSwap(e)) continue;
      const other = this.twin[e]!;
      this.swap(e);
      const t = e - (e % 3);
      const u = other - (other % 3);
      edges.push(t + 1, t + 2, u + 1, u + 2);
    }
  }

  private shouldSwap(e: number): boolean {
    const f = this.twin[e]!;
    if (f < 0 || this.label[e] !== FREE) return false;
    const [a, b, c] = [this.corner[e]!, this.corner[nextOf(e)]!, this.corner[previousOf(e)]!];
    const d = this.corner[previousOf(f)]!;
    const { x, y } = this;
    // The library's axes run down, so that its sign is turned: positive inside the circle.
    return incircle(x[a]!, y[a]!, x[b]!, y[b]!, x[c]!, y[c]!, x[d]!, y[d]!) > 0 && this.isConvex(e);
  }

  /** True when the two triangles at a half-edge form a strictly convex quadrilateral, so that its diagonal may be swapped. */
  isConvex(e: number): boolean {
    const c = this.corner[previousOf(e)]!;
    const d = this.corner[previousOf(this.twin[e]!)]!;
    return this.side(c, d, this.corner[e]!) * this.side(c, d, this.corner[nextOf(e)]!) < 0;
  }

  /** Swaps the diagonal of the two triangles at half-edge `e`: a–b becomes c–d, at the first half-edge of each triangle. */
  swap(e: number): void {
    const f = this.twin[e]!;
    const [a, b, c] = [this.corner[e]!, this.corner[nextOf(e)]!, this.corner[previousOf(e)]!];
    const d = this.corner[previousOf(f)]!;
    const bc = this.outside(nextOf(e));
    const ca = this.outside(previousOf(e));
    const ad = this.outside(nextOf(f));
    const db = this.outside(previousOf(f));
    const t = e - (e % 3);
    const u = f - (f % 3);
    this.write(t / 3, [c, d, b], [INNER, db, bc]);
    this.write(u / 3, [d, c, a], [INNER, ca, ad]);
    this.join(t, u);
  }
}

/** What lies beyond a half-edge before a triangle is written anew. */
type Outside = { readonly twin: number; readonly label: number };

const INNER: Outside = { twin: -1, label: FREE };
