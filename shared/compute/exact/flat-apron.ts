/**
 * Confined flow under a flat impervious floor of width b on level ground over a half-space. Frame of this file:
 * x from the floor's middle, positive downstream, y down from the ground, one length unit; head difference H
 * with the tailwater at the datum.
 *
 * Source: M. E. Harr (1962), "Groundwater and Seepage", McGraw-Hill, confocal ellipses (flow lines) and
 * hyperbolas (equipotentials): x = (b/2)·cosθ·cosh v, y = (b/2)·sinθ·sinh v, head h = H·θ/π, stream function
 * q/(kH) = v/π.
 */
export interface FlatApron {
  b: number;
  H: number;
}

/** Point of the equipotential of head `head` (0…H above tailwater) on the flow line v. */
export function flatApronPoint({ b, H }: FlatApron, head: number, v: number): [number, number] {
  const theta = (Math.PI * head) / H;
  // Head H lies upstream, where x is negative.
  return [(b / 2) * Math.cos(theta) * Math.cosh(v), (b / 2) * Math.sin(theta) * Math.sinh(v)];
}

/**
 * Head above the tailwater at a point with y ≥ 0, length. θ is taken from the half sum and half difference of the
 * distances to the floor's ends, cosθ = (r₁ − r₂)/b.
 */
export function flatApronHead({ b, H }: FlatApron, x: number, y: number): number {
  const toUpstreamEnd = Math.hypot(x + b / 2, y);
  const toDownstreamEnd = Math.hypot(x - b / 2, y);
  const cosine = Math.min(1, Math.max(-1, (toUpstreamEnd - toDownstreamEnd) / b));
  return (H * Math.acos(cosine)) / Math.PI;
}
