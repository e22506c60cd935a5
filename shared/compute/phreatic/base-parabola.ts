/**
 * The basic parabola through a homogeneous dam on a level impervious base: y² = 2Sx + S² with S = √(d² + H²) − d.
 * Frame of this folder: x from the focus, positive upstream, y up from it, one length unit; transformed where the soil
 * is anisotropic.
 */

/** Part of the wetted upstream face's horizontal projection by which the parabola starts upstream of the water's edge. */
const ENTRY_PART = 0.3;

/**
 * Focal ordinate S = √(d² + H²) − d of the parabola with its focus at the origin through (d, H), length. `distance` d
 * and `height` H as the frame says; the seepage of an isotropic dam is k·S. Written H²/(√(d² + H²) + d), which loses
 * no figures where d is long. Source: Kozeny (1931), Grundwasserbewegung bei freiem Spiegel.
 */
export function focalOrdinate(distance: number, height: number): number {
  return height ** 2 / (Math.hypot(distance, height) + distance);
}

/** Height of the parabola over x ≥ −S/2: y = √(2Sx + S²); 0 below its vertex. Source as for `focalOrdinate`. */
export function parabolaHeight(S: number, x: number): number {
  return Math.sqrt(Math.max(0, 2 * S * x + S * S));
}

/**
 * Where the parabola is taken to start: 0.3 of the wetted horizontal projection m upstream of the water's edge,
 * d = x(edge) + 0.3·m. A vertical or overhanging face has no projection. Source: A. Casagrande (1937), Seepage through
 * dams, J. New England Water Works Assoc. 51.
 */
export function correctedEntry(edgeX: number, heelX: number): number {
  return edgeX + ENTRY_PART * Math.max(0, heelX - edgeX);
}

/** Distance from the focus along a face at angle α (radians) at which the parabola meets it: a + Δa = S/(1 − cos α). */
export function parabolaOnFace(S: number, angle: number): number {
  return S / (1 - Math.cos(angle));
}
