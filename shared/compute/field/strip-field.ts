import { meshStrip, type StripMesh, type StripSurroundings } from '#shared/compute/field/strip-mesh.ts';
import { type FieldPlace, placesOf } from '#shared/compute/field/strip-places.ts';
import {
  type MeshTensor,
  type StripSystem,
  stiffnessOf,
  systemOf,
} from '#shared/compute/field/strip-system.ts';
import type { Strip } from '#shared/compute/net/strips.ts';
import { conjugateGradient } from '#shared/compute/solve/conjugate-gradient.ts';
import { nestedDissection } from '#shared/compute/solve/nested-dissection.ts';
import { choleskyOf } from '#shared/compute/solve/sparse-cholesky.ts';

/** Heads on the boundary of a strip, any one unit; places in working pixels. */
export type StripHeads = {
  readonly before: (x: number, y: number) => number;
  readonly after: (x: number, y: number) => number;
  /** Head on a face of free outflow: the elevation there. */
  readonly free: (x: number, y: number) => number;
};

/** The solved field of a strip. */
export type StripField = {
  readonly unknowns: number;
  /**
   * The field at a place. One that lies outside the strip by up to `slack` pixels takes the nearest place inside; null
   * where the field has no head.
   */
  at(x: number, y: number, slack: number): FieldPlace | null;
};

/** The equations are solved to this part of their right side: a thousandth of what any drawing tells. */
const SOLVED_TO = 1e-8;
/** Steps of conjugate gradients; the strips of most nets take a hundred or two. */
const MOST_STEPS = 500;
/** With as many unknowns the steps are many and each is dear: then the equations are solved directly from the start. */
const MANY_UNKNOWNS = 6000;

/**
 * The head between two neighbouring equipotentials that satisfies ∇·(K∇h) = 0 with both lines held at their heads,
 * walls and the phreatic line closed to flow, and open ends taken as closed. Linear triangles on a constrained
 * triangulation, finer towards tips and sharp corners; conjugate gradients, or directly. `tensorAt`: K in the frame of the strip,
 * null where it is the same everywhere and in all directions. Null when the strip cannot be meshed or the solution does
 * not settle. Source: Zienkiewicz, Mayer and Cheung (1966), seepage by finite elements.
 */
export function solveStrip(
  strip: Strip,
  heads: StripHeads,
  around: StripSurroundings,
  tensorAt: ((x: number, y: number) => MeshTensor) | null,
): StripField | null {
  const mesh = meshStrip(strip, around);
  if (mesh === null || mesh.triangles.length === 0) return null;
  const held = heldHeads(mesh, heads);
  const system = systemOf(mesh, stiffnessOf(mesh, tensorAt), held);
  const x =
    (system.rows.n < MANY_UNKNOWNS ? iterate(system, meanOf(held)) : null) ?? solveDirectly(mesh, system);
  if (x === null) return null;
  const atCorners = new Float64Array(mesh.unknowns.length);
  for (let corner = 0; corner < atCorners.length; corner += 1) {
    const unknown = mesh.unknowns[corner]!;
    const row = system.rowOf[unknown]!;
    atCorners[corner] = row >= 0 ? x[row]! : held[unknown]!;
  }
  return { unknowns: system.rows.n, at: placesOf(mesh, atCorners) };
}

/** Null where the steps do not come to rest, as where the water has a long way round walls. */
function iterate({ rows, right }: StripSystem, head: number): Float64Array | null {
  const guess = new Float64Array(rows.n).fill(head);
  const { x, converged } = conjugateGradient(rows, right, guess, SOLVED_TO, MOST_STEPS);
  return converged ? x : null;
}

function solveDirectly(mesh: StripMesh, { rows, right, rowOf }: StripSystem): Float64Array | null {
  const x = new Float64Array(rows.n);
  const y = new Float64Array(rows.n);
  mesh.unknowns.forEach((unknown, corner) => {
    const row = rowOf[unknown]!;
    if (row < 0) return;
    const point = mesh.triangles[corner]!;
    x[row] = mesh.xy[2 * point]!;
    y[row] = mesh.xy[2 * point + 1]!;
  });
  return choleskyOf(rows, nestedDissection(rows, x, y))?.solve(right) ?? null;
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

function meanOf(held: Float64Array): number {
  let sum = 0;
  let count = 0;
  for (const head of held) {
    if (Number.isNaN(head)) continue;
    sum += head;
    count += 1;
  }
  return count === 0 ? 0 : sum / count;
}
