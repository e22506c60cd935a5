import { determinantOf } from '#shared/compute/independent/conductivity.ts';
import type { HeadField, HeadProblem } from '#shared/compute/independent/head-field.ts';
import { gradientIn, MIDDLES, shapeOf } from '#shared/compute/independent/quadratic-element.ts';
import type { StreamField } from '#shared/compute/independent/stream-function.ts';

/** Energy of the flow, ∫∇h·K·∇h, and the gap between its two solutions, whole and by elements. */
export type EnergyGap = { readonly energy: number; readonly gap: number; readonly byElement: Float64Array };

/**
 * How far the two solutions are apart: ∫(K∇h + v)·K⁻¹·(K∇h + v) with v the flow of the stream function. The sum is the
 * square of the error of both together (Prager and Synge 1947), so that gap/energy bounds the relative error of the
 * energy, and between one inlet and one outlet that of the seepage; its parts tell where the mesh is too coarse.
 * Three-point rule in the middles of the sides, exact for quadratic elements.
 */
export function energyGap({ mesh, tensorOf }: HeadProblem, head: HeadField, stream: StreamField): EnergyGap {
  const byElement = new Float64Array(mesh.regions.length);
  let energy = 0;
  let gap = 0;
  for (let n = 0; n < byElement.length; n += 1) {
    const shape = shapeOf(mesh, n);
    const k = tensorOf(n);
    const det = determinantOf(k);
    let [own, apart] = [0, 0];
    for (const at of MIDDLES) {
      const [hx, hy] = gradientIn(mesh, n, shape, head.values, at);
      const [px, py] = gradientIn(stream.mesh, n, shape, stream.values, at);
      const [fx, fy] = [k.xx * hx + k.xy * hy, k.xy * hx + k.yy * hy];
      const [dx, dy] = [fx + py, fy - px];
      own += hx * fx + hy * fy;
      apart += (k.yy * dx * dx - 2 * k.xy * dx * dy + k.xx * dy * dy) / det;
    }
    byElement[n] = (apart * shape.area) / 3;
    energy += (own * shape.area) / 3;
    gap += byElement[n]!;
  }
  return { energy, gap, byElement };
}
