import type { InkWindow } from '#shared/compute/ink/ink-window.ts';

type Place = readonly [x: number, y: number];

/** A stroke from one place to another, pixels of the window. */
export type DrawnStroke = { readonly from: Place; readonly to: Place; readonly widthPx: number };

export type ScanLook = {
  readonly paper: number;
  readonly ink: number;
  /** Standard deviation of the grey noise, specks to a thousand pixels, part of each stroke that has faded. */
  readonly noise: number;
  readonly specks: number;
  readonly gaps: number;
  /** True for a scan in black and white. */
  readonly bilevel: boolean;
};

/** Looks of scans from good to bad, by name. */
export const LOOKS: Readonly<Record<string, ScanLook>> = {
  clean: { paper: 250, ink: 20, noise: 0, specks: 0, gaps: 0, bilevel: false },
  toned: { paper: 205, ink: 70, noise: 6, specks: 2, gaps: 0.1, bilevel: false },
  faded: { paper: 205, ink: 140, noise: 8, specks: 4, gaps: 0.15, bilevel: false },
  fax: { paper: 250, ink: 10, noise: 12, specks: 5, gaps: 0.1, bilevel: true },
};

/** A window with strokes drawn into it, each pixel covered as far as the stroke covers it: the same seed, the same scan. */
export function drawnScan(
  side: number,
  strokes: readonly DrawnStroke[],
  look: ScanLook,
  seed: number,
): InkWindow {
  const random = randomOf(seed);
  const coverage = new Float32Array(side * side);
  for (const stroke of strokes) drawStroke(coverage, side, stroke, gapsOf(random, stroke, look.gaps));
  const grey = Uint8Array.from(coverage, (covered) => {
    const speck = random() < look.specks / 1000 ? 1 : 0;
    const tone = look.paper + look.noise * (random() + random() + random() - 1.5) * 2;
    const value = tone + (look.ink - tone) * Math.max(covered, speck);
    if (look.bilevel) return value < (look.paper + look.ink) / 2 ? 0 : 255;
    return Math.max(0, Math.min(255, value));
  });
  return { width: side, height: side, grey };
}

/** Numbers from 0 to 1 (Numerical Recipes' linear congruential generator). */
export function randomOf(seed: number): () => number {
  let state = (seed * 2654435761 + 1) >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 4294967296;
  };
}

function gapsOf(
  random: () => number,
  { from, to }: DrawnStroke,
  part: number,
): Array<readonly [number, number]> {
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
  const gaps: Array<readonly [number, number]> = [];
  for (let lost = 0; lost < part * length; ) {
    const long = 3 + 6 * random();
    const start = random() * (length - long);
    gaps.push([start, start + long]);
    lost += long;
  }
  return gaps;
}

function drawStroke(
  coverage: Float32Array,
  side: number,
  { from, to, widthPx }: DrawnStroke,
  gaps: ReadonlyArray<readonly [number, number]>,
): void {
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
  const [ex, ey] = [(to[0] - from[0]) / length, (to[1] - from[1]) / length];
  for (let y = 0; y < side; y += 1) {
    for (let x = 0; x < side; x += 1) {
      const [u, v] = [x + 0.5 - from[0], y + 0.5 - from[1]];
      const [along, across] = [u * ex + v * ey, Math.abs(v * ex - u * ey)];
      if (along < 0 || along > length || gaps.some(([a, b]) => along >= a && along < b)) continue;
      const covered = Math.min(1, Math.max(0, widthPx / 2 + 0.5 - across));
      const at = y * side + x;
      if (covered > coverage[at]!) coverage[at] = covered;
    }
  }
}
