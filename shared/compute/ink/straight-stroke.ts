import type { InkMap } from '#shared/compute/ink/ink-window.ts';

type Place = readonly [x: number, y: number];

/** A straight line by its normal: the places p with (p − about)·(cos φ, sin φ) = ρ; φ in radians, ρ in pixels. */
export type NormalLine = { readonly about: Place; readonly phi: number; readonly rho: number };

/** A drawn straight stroke: its centre line, and the places along it, counted from the foot of `about`, that carry ink. */
export type StraightStroke = NormalLine & { readonly widthPx: number; readonly inked: readonly number[] };

/** Ink below this is paper. */
const LEAST_INK = 90;
/** Half the width across a line within which its stroke is looked for, first and once the line is nearly there, pixels. */
const LOOSE_REACH = 4;
const CLOSE_REACH = 2;
/** A stroke wider than twice this is an area, pixels. */
const MOST_HALF_WIDTH = 10;
const STEP = 0.5;
const LEAST_PLACES = 16;
/** Middles of one stroke depart from their line by less, pixels: a ragged print wavers by half a pixel. */
const AGREED_PX = 1;
/** The line looked along is already nearly that of the stroke. */
const MOST_SLOPE = 0.15;
/** Middles of which all pairs are tried. */
const PROBES = 24;

type Middle = { readonly t: number; readonly across: number; readonly width: number };

/**
 * The stroke along a line, its centre line fitted to a fraction of a pixel; null where there is none that is straight.
 * Every pixel along the line the ink is walked to both sides until it falls to half: the middle of what lies between is
 * one place of the centre line, and where it does not fall, as in the crossing with another stroke, there is none. A line
 * is fitted by least squares to the middles that agree, three times over, each time along the line found before. `radius`:
 * half the length looked at. Pixels of the map's frame, pixel middles at + 0.5. Own derivation.
 */
export function straightStroke(map: InkMap, start: NormalLine, radius: number): StraightStroke | null {
  let line = start;
  let agreed: Middle[] = [];
  for (const reach of [LOOSE_REACH, CLOSE_REACH, CLOSE_REACH]) {
    const fit = fittedLine(ofOneWidth(middlesAlong(map, line, radius, reach)));
    if (fit === null) return null;
    // Turned by the slope about the foot of its normal.
    const turn = Math.atan(fit.slope);
    line = { about: line.about, phi: line.phi - turn, rho: (line.rho + fit.shift) * Math.cos(turn) };
    agreed = fit.agreed;
  }
  return { ...line, widthPx: medianOf(agreed.map(({ width }) => width)), inked: agreed.map(({ t }) => t) };
}

function middlesAlong(map: InkMap, { about, phi, rho }: NormalLine, radius: number, reach: number): Middle[] {
  const [nx, ny] = [Math.cos(phi), Math.sin(phi)];
  const middles: Middle[] = [];
  for (let t = -radius; t <= radius; t += 1) {
    const at: Place = [about[0] + rho * nx - t * ny, about[1] + rho * ny + t * nx];
    const middle = middleAt(map, at, nx, ny, reach);
    if (middle !== null) middles.push({ t, ...middle });
  }
  return middles;
}

function middleAt(map: InkMap, [x, y]: Place, nx: number, ny: number, reach: number) {
  const inkAcross = (k: number) => inkBetween(map, x + k * nx, y + k * ny);
  let peak = LEAST_INK;
  let top: number | null = null;
  for (let k = -reach; k <= reach; k += STEP) {
    const ink = inkAcross(k);
    if (ink <= peak) continue;
    peak = ink;
    top = k;
  }
  if (top === null) return null;
  const half = peak / 2;
  const sides = [-STEP, STEP].map((step) => {
    for (let k = top; Math.abs(k - top) <= 2 * MOST_HALF_WIDTH; k += step) {
      const ink = inkAcross(k);
      if (ink >= half) continue;
      const before = inkAcross(k - step);
      return k - (step * (half - ink)) / (before - ink);
    }
    return null;
  });
  const [left, right] = sides;
  if (left == null || right == null || right - left > 2 * MOST_HALF_WIDTH) return null;
  return { across: (left + right) / 2, width: right - left };
}

/** Ink between the middles of four pixels; paper outside. */
function inkBetween({ width, height, ink }: InkMap, x: number, y: number): number {
  const i = Math.floor(x - 0.5);
  const j = Math.floor(y - 0.5);
  if (i < 0 || j < 0 || i + 1 >= width || j + 1 >= height) return 0;
  const [fu, fv] = [x - 0.5 - i, y - 0.5 - j];
  const at = j * width + i;
  const upper = ink[at]! * (1 - fu) + ink[at + 1]! * fu;
  const lower = ink[at + width]! * (1 - fu) + ink[at + width + 1]! * fu;
  return upper * (1 - fv) + lower * fv;
}

/** Middles of strokes that are about as wide as most are: where another stroke joins, the ink is wider. */
function ofOneWidth(middles: readonly Middle[]): Middle[] {
  const usual = medianOf(middles.map(({ width }) => width));
  return middles.filter(({ width }) => Math.abs(width - usual) <= 0.5 * usual + 1);
}

/**
 * The middles that lie on one line: of the lines through two of them that is taken from which most others depart by less
 * than a pixel, so that letters beside a stroke that ends do not turn it (random sample consensus after Fischler and
 * Bolles 1981, over all pairs of every few middles instead of random ones).
 */
function agreeing(middles: readonly Middle[]): Middle[] {
  const step = Math.max(1, Math.floor(middles.length / PROBES));
  let best: Middle[] = [];
  for (let i = 0; i < middles.length; i += step) {
    for (let j = i + step; j < middles.length; j += step) {
      const [a, b] = [middles[i]!, middles[j]!];
      if (b.t - a.t < LEAST_PLACES) continue;
      const slope = (b.across - a.across) / (b.t - a.t);
      if (Math.abs(slope) > MOST_SLOPE) continue;
      const near = middles.filter(
        ({ t, across }) => Math.abs(across - a.across - slope * (t - a.t)) < AGREED_PX,
      );
      if (near.length > best.length) best = near;
    }
  }
  return best;
}

/**
 * across = shift + slope·t by least squares over the middles that agree, those left out that are further off than three
 * median departures; null where too few agree.
 */
function fittedLine(middles: readonly Middle[]): { shift: number; slope: number; agreed: Middle[] } | null {
  let agreed = agreeing(middles);
  if (agreed.length < LEAST_PLACES) return null;
  for (let round = 0; round < 3; round += 1) {
    const fit = leastSquares(agreed);
    const off = (middle: Middle) => Math.abs(middle.across - fit.shift - fit.slope * middle.t);
    const bound = 3 * Math.max(0.15, medianOf(agreed.map(off)));
    const near = agreed.filter((middle) => off(middle) <= bound);
    if (near.length < LEAST_PLACES) break;
    agreed = near;
  }
  return { ...leastSquares(agreed), agreed };
}

function leastSquares(middles: readonly Middle[]): { shift: number; slope: number } {
  const n = middles.length;
  const meanT = middles.reduce((sum, { t }) => sum + t, 0) / n;
  const meanA = middles.reduce((sum, { across }) => sum + across, 0) / n;
  const tt = middles.reduce((sum, { t }) => sum + (t - meanT) ** 2, 0);
  const ta = middles.reduce((sum, { t, across }) => sum + (t - meanT) * (across - meanA), 0);
  const slope = tt > 0 ? ta / tt : 0;
  return { shift: meanA - slope * meanT, slope };
}

function medianOf(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[sorted.length >> 1] ?? 0;
}
