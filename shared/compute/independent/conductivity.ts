import type { SectionSoil } from '#shared/compute/independent/section-problem.ts';

/** A symmetric 2 × 2 tensor. */
export type Tensor = { readonly xx: number; readonly xy: number; readonly yy: number };

/**
 * Permeability tensor of a soil in axes offset (x) and elevation (y), unit of k: K = kh·e·eᵀ + kv·n·nᵀ with e along the
 * bedding, (cos δ, −sin δ) for a dip δ towards growing offsets, and n across it. Source: Bear (1972), Dynamics of
 * Fluids in Porous Media, sec. 5.6.
 */
export function permeabilityTensor({ kh, kv, dipDeg }: Pick<SectionSoil, 'kh' | 'kv' | 'dipDeg'>): Tensor {
  const cos = Math.cos((dipDeg * Math.PI) / 180);
  const sin = Math.sin((dipDeg * Math.PI) / 180);
  return {
    xx: kh * cos * cos + kv * sin * sin,
    xy: (kv - kh) * cos * sin,
    yy: kh * sin * sin + kv * cos * cos,
  };
}

export function determinantOf({ xx, xy, yy }: Tensor): number {
  return xx * yy - xy * xy;
}

/** The tensor of the stream function, K/det K: with v = −K·∇h = (∂ψ/∂y, −∂ψ/∂x), ∇·(K/det K·∇ψ) = 0 (Bear 1972). */
export function streamTensor(k: Tensor): Tensor {
  const d = determinantOf(k);
  return { xx: k.xx / d, xy: k.xy / d, yy: k.yy / d };
}

/** M·K·Mᵀ for a symmetric M of determinant 1: the tensor in coordinates x' = M·x. */
export function transformedTensor(m: Tensor, k: Tensor): Tensor {
  const a = m.xx * k.xx + m.xy * k.xy;
  const b = m.xx * k.xy + m.xy * k.yy;
  const c = m.xy * k.xx + m.yy * k.xy;
  const d = m.xy * k.xy + m.yy * k.yy;
  return { xx: a * m.xx + b * m.xy, xy: a * m.xy + b * m.yy, yy: c * m.xy + d * m.yy };
}

/**
 * The symmetric M of determinant 1 with M·K·Mᵀ = √(det K)·I, by which a section with permeability K is transformed to
 * one that is alike in all directions: M = (K/√det K)^(−1/2), the root of a 2 × 2 matrix of determinant 1 being
 * (A + I)/√(tr A + 2) (Cayley-Hamilton).
 */
export function isotropicTransform(k: Tensor): Tensor {
  const root = Math.sqrt(determinantOf(k));
  // The inverse of K/√det K.
  const a = { xx: k.yy / root, xy: -k.xy / root, yy: k.xx / root };
  const scale = Math.sqrt(a.xx + a.yy + 2);
  return { xx: (a.xx + 1) / scale, xy: a.xy / scale, yy: (a.yy + 1) / scale };
}
