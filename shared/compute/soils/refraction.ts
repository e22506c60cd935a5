import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { Tensor } from '#shared/compute/soils/soil-list.ts';

/** How a direction r = tan α past an interface follows from the one before it: r₂ = shift + factor·r₁. */
export type Refraction = { readonly shift: number; readonly factor: number };

/** Components of a tensor along the normal and the tangent of an interface. */
function componentsOf({ xx, xy, yy }: Tensor, [tx, ty]: Pair) {
  const [nx, ny] = [-ty, tx];
  return {
    nn: xx * nx * nx + 2 * xy * nx * ny + yy * ny * ny,
    nt: xx * nx * tx + xy * (nx * ty + ny * tx) + yy * ny * ty,
    det: xx * yy - xy * xy,
  };
}

/**
 * Refraction of flow lines at an interface between two soils, r = tan α with α measured from the interface's normal.
 * Head and flow across the interface are one on both sides, so that with R = K⁻¹ R₁nt + r₁·R₁tt = R₂nt + r₂·R₂tt; for
 * isotropic soils tan α₁/tan α₂ = k₁/k₂. `k1`, `k2`: permeability in one frame up to one factor; `tangent`: unit vector
 * along the interface. Source: Forchheimer (1930); Casagrande (1937); for tensors Bear (1972), sec. 7.1.10.
 */
export function refractionOfFlow(k1: Tensor, k2: Tensor, tangent: Pair): Refraction {
  const [one, two] = [componentsOf(k1, tangent), componentsOf(k2, tangent)];
  return {
    shift: (two.nt / two.det - one.nt / one.det) / (two.nn / two.det),
    factor: one.nn / one.det / (two.nn / two.det),
  };
}

/**
 * The same for equipotentials, r = e_t/e_n of their direction e: with the slope of the head γ = g_n/g_t = −r,
 * K₁nn·γ₁ + K₁nt = K₂nn·γ₂ + K₂nt. From the interface (1/r) isotropic soils give tan β₁/tan β₂ = k₁/k₂.
 */
export function refractionOfHeads(k1: Tensor, k2: Tensor, tangent: Pair): Refraction {
  const [one, two] = [componentsOf(k1, tangent), componentsOf(k2, tangent)];
  return { shift: (two.nt - one.nt) / two.nn, factor: one.nn / two.nn };
}

/** The same law from the second side to the first. */
export function backwards({ shift, factor }: Refraction): Refraction {
  return { shift: -shift / factor, factor: 1 / factor };
}

/** Direction past the interface in radians from its normal, of one before it. */
export function refracted({ shift, factor }: Refraction, alpha: number): number {
  return Math.atan(shift + factor * Math.tan(alpha));
}

/** By how much the direction past the interface turns with the one before it. */
export function sensitivityOf(law: Refraction, alpha: number): number {
  const r = Math.tan(alpha);
  const past = law.shift + law.factor * r;
  return (law.factor * (1 + r * r)) / (1 + past * past);
}
