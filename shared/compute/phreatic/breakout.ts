import { parabolaOnFace } from '#shared/compute/phreatic/base-parabola.ts';

/** Δa/(a + Δa) against the angle of the discharge face in degrees. */
const CORRECTION: ReadonlyArray<readonly [angleDeg: number, ratio: number]> = [
  [30, 0.36],
  [60, 0.32],
  [90, 0.26],
  [120, 0.18],
  [150, 0.1],
  [180, 0],
];

/** Where the phreatic line breaks out of a discharge face, and by whose rule. */
export type Breakout = {
  readonly along: number;
  readonly author: 'Casagrande' | 'Schaffernak and Van Iterson';
};

/**
 * A. Casagrande's ratio Δa/(a + Δa) for a discharge face at `angleDeg` (30 to 180), between the tabled angles in
 * proportion. Source: A. Casagrande (1937), Seepage through dams, read off his chart; values from memory.
 */
export function breakoutCorrection(angleDeg: number): number {
  const held = Math.min(180, Math.max(30, angleDeg));
  const i = Math.max(
    1,
    CORRECTION.findIndex(([angle]) => angle >= held),
  );
  const [a0, r0] = CORRECTION[i - 1]!;
  const [a1, r1] = CORRECTION[i]!;
  return r0 + ((held - a0) / (a1 - a0)) * (r1 - r0);
}

/**
 * Distance from the toe along a face at angle α to the breakout, a = d/cos α − √(d²/cos²α − H²/sin²α), length; null
 * where the root does not exist. d: horizontal distance of the corrected entry from the toe, H: head above it. For
 * slopes below 30°. Source: Schaffernak (1917) and Van Iterson (1919), as in A. Casagrande (1937).
 */
export function flatSlopeBreakout(distance: number, height: number, angle: number): number | null {
  const square = (distance / Math.cos(angle)) ** 2 - (height / Math.sin(angle)) ** 2;
  return square >= 0 ? distance / Math.cos(angle) - Math.sqrt(square) : null;
}

/**
 * Where the phreatic line leaves a face that rises from the focus at `angleDeg` (above 0, up to 180; 180 is a level
 * drain): A. Casagrande's correction of the parabola from 30° on, Schaffernak and Van Iterson below. Lengths along the
 * face. Null where the rule has no answer.
 */
export function breakoutOf(S: number, distance: number, height: number, angleDeg: number): Breakout | null {
  const angle = (angleDeg * Math.PI) / 180;
  if (!(angleDeg > 0)) return null;
  if (angleDeg >= 30) {
    const along = parabolaOnFace(S, angle) * (1 - breakoutCorrection(angleDeg));
    return { along, author: 'Casagrande' };
  }
  const along = flatSlopeBreakout(distance, height, angle);
  return along === null ? null : { along, author: 'Schaffernak and Van Iterson' };
}
