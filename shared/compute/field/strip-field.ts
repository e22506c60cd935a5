import { meshStrip, type StripMesh } from '#shared/compute/field/strip-mesh.ts';
import type { Polyline } from '#shared/compute/geometry/polyline.ts';
import type { Strip } from '#shared/compute/net/strips.ts';
import { conjugateGradient, type SparseRows } from '#shared/compute/solve/conjugate-gradient.ts';

/** Heads on the boundary of a strip, any one unit; places in base-raster pixels. */
export type StripHeads = {
  readonly before: (x: number, y: number) => number;
  readonly after: (x: number, y: number) => number;
  /** Head on a face of free outflow: the elevation there. */
  readonly free: (x: number, y: number) => number;
};

/** The solved field of a strip. */
export type StripField = {
  readonly unknowns: number;
  /** The field at a place, see `fieldPlaceAt`. */
  at(x: number, y: number, slack: number): FieldPlace | null;
};

/**
 * The head between two neighbouring equipotentials that satisfies Laplace's equation with both lines held at their
 * heads, walls and the phreatic line closed to flow, and open ends taken as closed. Linear triangles on a constrained
 * triangulation, finer towards ends and corners; solved by conjugate gradients to 1e-9. Null when the strip cannot be
 * meshed or the solution does not settle. Source: Zienkiewicz, Mayer and Cheung (1966), seepage by finite elements.
 */
export function solveStrip(
  strip: Strip,
  heads: StripHeads,
  walls: readonly Polyline[],
  freeFaces: readonly Polyline[],
  slack: number,
): StripField | null {
  const mesh = meshStrip(strip, walls, freeFaces, slack);
  if (mesh === null || mesh.triangles.length === 0) return null;
  const held = heldHeads(mesh, heads);
  const reached = reachedUnknowns(mesh, held);
  const system = assemble(mesh, held, reached);
  const { x, converged } = conjugateGradient(system.rows, system.right, system.guess, 1e-9);
  if (!converged) return null;
  const at = Float64Array.from(mesh.unknowns, (unknown) => {
    const row = system.rowOf[unknown]!;
    return row >= 0 ? x[row]! : held[unknown]!;
  });
  return {
    unknowns: system.rows.n,
    at: (px, py, within) => fieldPlaceAt(mesh, at, px, py, within),
  };
}

/** Head of each unknown that lies on a held line; NaN for the others. */
function heldHeads(mesh: StripMesh, heads: StripHeads): Float64Array {
  const held = new Float64Array(mesh.unknownCount).fill(Number.NaN);
  mesh.kinds.forEach((kind, e) => {
    if (kind !== 'before' && kind !== 'after' && kind !== 'free') return;
    for (const corner of [e, e % 3 === 2 ? e - 2 : e + 1]) {
      const point = mesh.triangles[corner]!;
      const unknown = mesh.unknowns[corner]!;
      // Where a free face meets a line, the line's head holds.
      if (kind === 'free' && !Number.isNaN(held[unknown]!)) continue;
      held[unknown] = heads[kind](mesh.xy[2 * point]!, mesh.xy[2 * point + 1]!);
    }
  });
  return held;
}

/** Unknowns that are joined to a held one by triangles that have an area; the others have no head. */
function reachedUnknowns(mesh: StripMesh, held: Float64Array): Uint8Array {
  const reached = Uint8Array.from(held, (head) => (Number.isNaN(head) ? 0 : 1));
  const { unknowns } = mesh;
  const solid: number[] = [];
  for (let t = 0; t < unknowns.length; t += 3) if (stiffnessOf(mesh, t) !== null) solid.push(t);
  for (let changed = true; changed; ) {
    changed = false;
    for (const t of solid) {
      const some = reached[unknowns[t]!]! + reached[unknowns[t + 1]!]! + reached[unknowns[t + 2]!]!;
      if (some === 0 || some === 3) continue;
      for (let k = 0; k < 3; k += 1) reached[unknowns[t + k]!] = 1;
      changed = true;
    }
  }
  return reached;
}

type System = { rows: SparseRows; right: Float64Array; guess: Float64Array; rowOf: Int32Array };

function assemble(mesh: StripMesh, held: Float64Array, reached: Uint8Array): System {
  const rowOf = new Int32Array(mesh.unknownCount).fill(-1);
  let n = 0;
  held.forEach((head, unknown) => {
    if (Number.isNaN(head) && reached[unknown] === 1) {
      rowOf[unknown] = n;
      n += 1;
    }
  });
  const diagonal = new Float64Array(n);
  const right = new Float64Array(n);
  const rows: Array<Map<number, number>> = Array.from({ length: n }, () => new Map());
  for (let t = 0; t < mesh.unknowns.length; t += 3) {
    const stiffness = stiffnessOf(mesh, t);
    if (stiffness === null) continue;
    for (let i = 0; i < 3; i += 1) {
      const row = rowOf[mesh.unknowns[t + i]!]!;
      if (row < 0) continue;
      for (let j = 0; j < 3; j += 1) {
        const value = stiffness[3 * i + j]!;
        const other = mesh.unknowns[t + j]!;
        const column = rowOf[other]!;
        if (column === row) diagonal[row] = diagonal[row]! + value;
        else if (column >= 0) rows[row]!.set(column, (rows[row]!.get(column) ?? 0) + value);
        else if (!Number.isNaN(held[other]!)) right[row] = right[row]! - value * held[other]!;
      }
    }
  }
  return { rows: packed(rows, diagonal), right, guess: new Float64Array(n).fill(meanOf(held)), rowOf };
}

/** Stiffness of a linear triangle, 3 × 3 by rows; null for one without area. */
function stiffnessOf(mesh: StripMesh, t: number): number[] | null {
  const at = (k: number, axis: number) => mesh.xy[2 * mesh.triangles[t + (k % 3)]! + axis]!;
  const b = [0, 1, 2].map((i) => at(i + 1, 1) - at(i + 2, 1));
  const c = [0, 1, 2].map((i) => at(i + 2, 0) - at(i + 1, 0));
  const twice = Math.abs(b[0]! * c[1]! - b[1]! * c[0]!);
  if (!(twice > 1e-9)) return null;
  return [0, 1, 2].flatMap((i) => [0, 1, 2].map((j) => (b[i]! * b[j]! + c[i]! * c[j]!) / (2 * twice)));
}

function packed(rows: ReadonlyArray<ReadonlyMap<number, number>>, diagonal: Float64Array): SparseRows {
  const starts = new Int32Array(rows.length + 1);
  rows.forEach((row, i) => {
    starts[i + 1] = starts[i]! + row.size;
  });
  const columns = Int32Array.from(rows.flatMap((row) => [...row.keys()]));
  const values = Float64Array.from(rows.flatMap((row) => [...row.values()]));
  return { n: rows.length, starts, columns, values, diagonal };
}

function meanOf(held: Float64Array): number {
  const known = held.filter((head) => !Number.isNaN(head));
  return known.length === 0 ? 0 : known.reduce((sum, head) => sum + head, 0) / known.length;
}

/** Head at a place of a strip, and its gradient by working pixels. */
export type FieldPlace = { readonly head: number; readonly gradient: readonly [number, number] };

/**
 * Head at a place in a solved strip. A place that lies outside its triangles by up to `slack` pixels, as a point on a
 * traced boundary does, takes the head of the nearest place inside: nothing is extrapolated. Null where the field has
 * no head.
 */
function fieldPlaceAt(
  mesh: StripMesh,
  heads: Float64Array,
  x: number,
  y: number,
  slack: number,
): FieldPlace | null {
  let nearest = slack;
  let best: FieldPlace | null = null;
  for (let t = 0; t < mesh.triangles.length; t += 3) {
    if (Number.isNaN(heads[t]! + heads[t + 1]! + heads[t + 2]!)) continue;
    const found = nearestInTriangle(mesh, t, x, y, nearest);
    if (found === null) continue;
    const [a, b, c] = found.parts;
    best = {
      head: a * heads[t]! + b * heads[t + 1]! + c * heads[t + 2]!,
      gradient: gradientIn(mesh, heads, t),
    };
    nearest = found.distance;
    if (nearest === 0) return best;
  }
  return best;
}

function gradientIn(mesh: StripMesh, heads: Float64Array, t: number): [number, number] {
  const at = (k: number, axis: number) => mesh.xy[2 * mesh.triangles[t + k]! + axis]!;
  const [ux, uy] = [at(1, 0) - at(0, 0), at(1, 1) - at(0, 1)];
  const [vx, vy] = [at(2, 0) - at(0, 0), at(2, 1) - at(0, 1)];
  const [du, dv] = [heads[t + 1]! - heads[t]!, heads[t + 2]! - heads[t]!];
  const twice = ux * vy - uy * vx;
  return twice === 0 ? [0, 0] : [(du * vy - dv * uy) / twice, (dv * ux - du * vx) / twice];
}

type Nearest = { readonly distance: number; readonly parts: readonly [number, number, number] };

/** The place of a triangle nearest to a place, as parts of its corners; null when it is farther than `limit`. */
function nearestInTriangle(mesh: StripMesh, t: number, x: number, y: number, limit: number): Nearest | null {
  const corners = [0, 1, 2].map((k) => {
    const point = mesh.triangles[t + k]!;
    return [mesh.xy[2 * point]!, mesh.xy[2 * point + 1]!] as const;
  });
  const [[ax, ay], [bx, by], [cx, cy]] = corners as [Corner, Corner, Corner];
  if (x < Math.min(ax, bx, cx) - limit || x > Math.max(ax, bx, cx) + limit) return null;
  if (y < Math.min(ay, by, cy) - limit || y > Math.max(ay, by, cy) + limit) return null;
  const whole = (bx - ax) * (cy - ay) - (by - ay) * (cx - ax);
  const b = ((x - ax) * (cy - ay) - (y - ay) * (cx - ax)) / whole;
  const c = ((bx - ax) * (y - ay) - (by - ay) * (x - ax)) / whole;
  if (b >= 0 && c >= 0 && b + c <= 1) return { distance: 0, parts: [1 - b - c, b, c] };
  let best: Nearest | null = null;
  for (let k = 0; k < 3; k += 1) {
    const { distance, along } = toEdge(corners[k]!, corners[(k + 1) % 3]!, x, y);
    if (distance > (best?.distance ?? limit)) continue;
    const parts: [number, number, number] = [0, 0, 0];
    parts[k] = 1 - along;
    parts[(k + 1) % 3] = along;
    best = { distance, parts };
  }
  return best;
}

type Corner = readonly [x: number, y: number];

function toEdge(a: Corner, b: Corner, x: number, y: number): { distance: number; along: number } {
  const dx = b[0] - a[0];
  const dy = b[1] - a[1];
  const square = dx * dx + dy * dy;
  const along = square > 0 ? Math.min(1, Math.max(0, ((x - a[0]) * dx + (y - a[1]) * dy) / square)) : 0;
  return { distance: Math.hypot(a[0] + along * dx - x, a[1] + along * dy - y), along };
}
