import type { Tensor } from '#shared/compute/independent/conductivity.ts';
import { MIDDLES, type Shape, stiffness } from '#shared/compute/independent/quadratic-element.ts';

type Place = readonly [number, number, number];

/** The quarters of an element, by the area coordinates of their corners. */
const CORNERS: readonly Place[] = [[1, 0, 0], [0, 1, 0], [0, 0, 1], ...MIDDLES];
const QUARTERS = [
  [0, 3, 5],
  [3, 1, 4],
  [5, 4, 2],
  [3, 4, 5],
] as const;

/**
 * Stiffness of an element of which only the part with pressure above zero lets water through freely, the rest `dryPart`
 * of it; 6 × 6 by rows, written to `out`. `pressure`: at the six nodes, taken as linear in the quarters of the element.
 * The wet part is integrated by itself, so that heads in it need not bend where it ends (cut elements, after Hansbo and
 * Hansbo 2002).
 */
export function cutStiffness(
  shape: Shape,
  k: Tensor,
  pressure: ArrayLike<number>,
  dryPart: number,
  out: Float64Array,
): void {
  stiffness(shape, k, out);
  const wet = wetTriangles(pressure);
  if (wet === 'all') return;
  for (let i = 0; i < 36; i += 1) out[i] = out[i]! * dryPart;
  for (const triangle of wet) addPart(shape, k, triangle, 1 - dryPart, out);
}

/** Triangles, by area coordinates, that make up the part with pressure above zero. */
function wetTriangles(pressure: ArrayLike<number>): 'all' | Array<readonly [Place, Place, Place]> {
  let dry = 0;
  for (let i = 0; i < 6; i += 1) if (!(pressure[i]! > 0)) dry += 1;
  if (dry === 0) return 'all';
  if (dry === 6) return [];
  return QUARTERS.flatMap((quarter) => {
    const polygon = wetPolygon(
      quarter.map((i) => CORNERS[i]!),
      quarter.map((i) => pressure[i]!),
    );
    return polygon.slice(2).map((last, i) => [polygon[0]!, polygon[i + 1]!, last] as const);
  });
}

/** The corners of a triangle's part where a linear pressure is above zero (Sutherland and Hodgman 1974). */
function wetPolygon(corners: readonly Place[], pressure: readonly number[]): Place[] {
  return corners.flatMap((corner, i) => {
    const j = (i + 1) % corners.length;
    const [p, q] = [pressure[i]!, pressure[j]!];
    const kept = p > 0 ? [corner] : [];
    return p > 0 === q > 0 ? kept : [...kept, between(corner, corners[j]!, p / (p - q))];
  });
}

function between(a: Place, b: Place, t: number): Place {
  return [a[0] + t * (b[0] - a[0]), a[1] + t * (b[1] - a[1]), a[2] + t * (b[2] - a[2])];
}

/** Adds ∫∇Ni·K·∇Nj over a triangle within the element: three-point rule, exact as the gradients are linear. */
function addPart(
  { gx, gy, area }: Shape,
  k: Tensor,
  [a, b, c]: readonly [Place, Place, Place],
  factor: number,
  out: Float64Array,
): void {
  const share = (b[1] - a[1]) * (c[2] - a[2]) - (b[2] - a[2]) * (c[1] - a[1]);
  const weight = (factor * area * share) / 3;
  for (const [p, q] of [
    [a, b],
    [b, c],
    [c, a],
  ] as const) {
    const { dx, dy } = shapeGradients(gx, gy, between(p, q, 0.5));
    for (let i = 0; i < 6; i += 1) {
      const fx = k.xx * dx[i]! + k.xy * dy[i]!;
      const fy = k.xy * dx[i]! + k.yy * dy[i]!;
      for (let j = 0; j < 6; j += 1) out[6 * i + j] = out[6 * i + j]! + weight * (fx * dx[j]! + fy * dy[j]!);
    }
  }
}

function shapeGradients(
  gx: readonly number[],
  gy: readonly number[],
  at: Place,
): { dx: number[]; dy: number[] } {
  const of = (g: readonly number[]) => [
    ...[0, 1, 2].map((i) => (4 * at[i]! - 1) * g[i]!),
    ...[0, 1, 2].map((i) => 4 * (at[i]! * g[(i + 1) % 3]! + at[(i + 1) % 3]! * g[i]!)),
  ];
  return { dx: of(gx), dy: of(gy) };
}
