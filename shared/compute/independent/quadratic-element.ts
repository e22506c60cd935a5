import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { Tensor } from '#shared/compute/independent/conductivity.ts';
import type { QuadraticMesh } from '#shared/compute/independent/quadratic-mesh.ts';

/** Gradients of the three area coordinates of an element (1/length) and its area. */
export type Shape = { readonly gx: readonly number[]; readonly gy: readonly number[]; readonly area: number };

export function shapeOf({ x, y, elements }: QuadraticMesh, n: number): Shape {
  const [a, b, c] = [elements[6 * n]!, elements[6 * n + 1]!, elements[6 * n + 2]!];
  const twice = (x[b]! - x[a]!) * (y[c]! - y[a]!) - (y[b]! - y[a]!) * (x[c]! - x[a]!);
  return {
    gx: [(y[b]! - y[c]!) / twice, (y[c]! - y[a]!) / twice, (y[a]! - y[b]!) / twice],
    gy: [(x[c]! - x[b]!) / twice, (x[a]! - x[c]!) / twice, (x[b]! - x[a]!) / twice],
    area: twice / 2,
  };
}

/**
 * Stiffness ∫∇Ni·K·∇Nj of a straight six-node triangle, 6 × 6 by rows, written to `out`. With Gij = A·∇Li·K·∇Lj: corner
 * with itself Gii, corners −Gij/3, corner and middle of a side at it 4Gij/3, middle with itself 8(Gii + Gij + Gjj)/3,
 * middles of the sides ij and ik 8Gjk/3. Exact integrals of the shape functions Li(2Li − 1) and 4LiLj (Zienkiewicz and
 * Taylor, The Finite Element Method, vol. 1).
 */
export function stiffness({ gx, gy, area }: Shape, k: Tensor, out: Float64Array): void {
  const g = (i: number, j: number) =>
    area * (k.xx * gx[i]! * gx[j]! + k.xy * (gx[i]! * gy[j]! + gy[i]! * gx[j]!) + k.yy * gy[i]! * gy[j]!);
  const set = (i: number, j: number, value: number) => {
    out[6 * i + j] = value;
    out[6 * j + i] = value;
  };
  for (let i = 0; i < 3; i += 1) {
    const j = (i + 1) % 3;
    const l = (i + 2) % 3;
    const ij = g(i, j);
    set(i, i, g(i, i));
    set(i, j, -ij / 3);
    // Middle 3 + i lies between corners i and j, middle 3 + j between j and l, middle 3 + l between l and i.
    set(i, 3 + i, (4 / 3) * ij);
    set(j, 3 + i, (4 / 3) * ij);
    set(l, 3 + i, 0);
    set(3 + i, 3 + i, (8 / 3) * (g(i, i) + ij + g(j, j)));
    set(3 + i, 3 + j, (8 / 3) * g(i, l));
  }
}

/** Values of the six shape functions at area coordinates L1, L2, L3. */
export function shapeValues([a, b, c]: readonly [number, number, number]): number[] {
  return [a * (2 * a - 1), b * (2 * b - 1), c * (2 * c - 1), 4 * a * b, 4 * b * c, 4 * c * a];
}

/** Gradient of a quadratic field within an element at area coordinates, field unit per length. */
export function gradientIn(
  mesh: QuadraticMesh,
  n: number,
  { gx, gy }: Shape,
  values: Float64Array,
  at: readonly [number, number, number],
): Pair {
  const v = (k: number) => values[mesh.elements[6 * n + k]!]!;
  let [x, y] = [0, 0];
  for (let i = 0; i < 3; i += 1) {
    const j = (i + 1) % 3;
    const l = (i + 2) % 3;
    // Derivative by Li: the corner's 4Li − 1 and the two middles at it.
    const slope = v(i) * (4 * at[i]! - 1) + 4 * (v(3 + i) * at[j]! + v(3 + l) * at[l]!);
    x += slope * gx[i]!;
    y += slope * gy[i]!;
  }
  return [x, y];
}

/** Area coordinates of a place with respect to an element. */
export function areaCoordinates(
  mesh: QuadraticMesh,
  n: number,
  px: number,
  py: number,
): [number, number, number] {
  const { x, y, elements } = mesh;
  const [a, b, c] = [elements[6 * n]!, elements[6 * n + 1]!, elements[6 * n + 2]!];
  const twice = (x[b]! - x[a]!) * (y[c]! - y[a]!) - (y[b]! - y[a]!) * (x[c]! - x[a]!);
  const l2 = ((px - x[a]!) * (y[c]! - y[a]!) - (py - y[a]!) * (x[c]! - x[a]!)) / twice;
  const l3 = ((x[b]! - x[a]!) * (py - y[a]!) - (y[b]! - y[a]!) * (px - x[a]!)) / twice;
  return [1 - l2 - l3, l2, l3];
}

/** Area coordinates of the middles of the three sides, in the order of the middle nodes. */
export const MIDDLES: ReadonlyArray<readonly [number, number, number]> = [
  [0.5, 0.5, 0],
  [0, 0.5, 0.5],
  [0.5, 0, 0.5],
];
