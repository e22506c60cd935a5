/**
 * The basic parabola: flow through a homogeneous body on a level impervious base into a level drain that begins
 * at the focus, with a parabolic upstream boundary. Frame of this file: x from the focus, positive upstream,
 * y up from the base, both in one length unit; heads above the base.
 *
 * Source: J. Kozeny (1931), "Grundwasserbewegung bei freiem Spiegel, Fluss- und Kanalversickerung", Wasserkraft
 * und Wasserwirtschaft 26; the map x + iy = (u + iv)², head h = 2·v0·u, phreatic line v = v0, S = 2·v0².
 */
export interface BasicParabola {
  /** Twice the distance from the focus to the vertex of the phreatic line, S = q/k, length. */
  S: number;
  /** Head of the upstream boundary above the base, length. */
  H: number;
}

/** Where the line of head `head` (0…H) meets the flow line at the part `channel` (0 base, 1 phreatic line). */
export function basicParabolaPoint({ S }: BasicParabola, head: number, channel: number): [number, number] {
  const v0 = Math.sqrt(S / 2);
  const u = head / (2 * v0);
  const v = v0 * channel;
  return [u * u - v * v, 2 * u * v];
}

/**
 * Head above the base at a point, length; null above the phreatic line, below the base or upstream of the
 * boundary. u² is the root of u⁴ − x·u² − y²/4 = 0; the form with y²/(…) is used for x < 0, where the other one
 * would cancel.
 */
export function basicParabolaHead({ S, H }: BasicParabola, x: number, y: number): number | null {
  if (y < 0) return null;
  const v0 = Math.sqrt(S / 2);
  const root = Math.hypot(x, y);
  const uSquared = x >= 0 ? (x + root) / 2 : (y * y) / (2 * (root - x));
  const vSquared = x >= 0 ? (root === 0 ? 0 : (y * y) / (2 * (x + root))) : (root - x) / 2;
  const head = 2 * v0 * Math.sqrt(uSquared);
  return vSquared > v0 * v0 || head > H ? null : head;
}

/** Seepage through the body divided by the permeability, q/k = S, length (per unit length of the dam). */
export function basicParabolaSeepage({ S }: BasicParabola): number {
  return S;
}
