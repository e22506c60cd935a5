import { type InkMap, type InkWindow, inkMapOf } from '#shared/compute/ink/ink-window.ts';
import { type NormalLine, type StraightStroke, straightStroke } from '#shared/compute/ink/straight-stroke.ts';

type Place = readonly [x: number, y: number];

/** Where two drawn straight lines cross, in the window's frame, and the angle between them. */
export type StrokeCrossing = { readonly at: Place; readonly angleDeg: number };

/** Half the length of a stroke that is looked at, pixels: longer than letters are high. */
export const STROKE_RADIUS = 44;
/** Ink below this is paper. */
const LEAST_INK = 90;
const ANGLES = 90;
const CANDIDATES = 20;
/** Strokes that meet at less than this do not tell where they cross. */
const LEAST_ANGLE = (20 * Math.PI) / 180;
/** Least part of its length over which a stroke must carry ink: a line that ends at the crossing has half. */
const LEAST_INKED = 0.28;
/** How near to the crossing a stroke must carry ink, and over how much of its length, pixels. */
const NEAR_CROSSING = 24;
const INKED_NEAR = 8;

/**
 * The crossing of two drawn straight lines that is nearest to a place, to a fraction of a pixel: crossings, corners and
 * T-junctions alike. Of several the nearer is taken, and that of the longer lines. `about`: the place, in the window's frame (base-raster pixels from its corner); `reach`: how far
 * off the crossing may be. Lines are found as the straight lines near the place that carry most ink (Hough 1962, in the
 * normal form of Duda and Hart 1972), each is fitted to the middle of its stroke, and two are crossed. Null where no two
 * lines that meet at 20° or more cross within reach.
 */
export function crossingOfStrokes(window: InkWindow, about: Place, reach: number): StrokeCrossing | null {
  const map = inkMapOf(window);
  const strokes: StraightStroke[] = [];
  for (const line of likelyLines(map, about, reach)) {
    const stroke = straightStroke(map, line, STROKE_RADIUS);
    if (stroke === null || stroke.inked.length < LEAST_INKED * (2 * STROKE_RADIUS + 1)) continue;
    if (!strokes.some((known) => isSame(known, stroke))) strokes.push(stroke);
  }
  return nearestCrossing(strokes, about, reach);
}

/** Straight lines within reach of a place, those with most ink first. */
function likelyLines(map: InkMap, about: Place, reach: number): NormalLine[] {
  const half = Math.ceil(reach) + 2;
  const rows = 2 * half + 1;
  const votes = new Float64Array(ANGLES * rows);
  const cos = Float64Array.from({ length: ANGLES }, (_, a) => Math.cos((a * Math.PI) / ANGLES));
  const sin = Float64Array.from({ length: ANGLES }, (_, a) => Math.sin((a * Math.PI) / ANGLES));
  const [x0, x1] = [Math.max(0, about[0] - STROKE_RADIUS), Math.min(map.width, about[0] + STROKE_RADIUS)];
  const [y0, y1] = [Math.max(0, about[1] - STROKE_RADIUS), Math.min(map.height, about[1] + STROKE_RADIUS)];
  for (let y = Math.floor(y0); y < y1; y += 1) {
    for (let x = Math.floor(x0); x < x1; x += 1) {
      const ink = map.ink[y * map.width + x]!;
      if (ink < LEAST_INK) continue;
      const [dx, dy] = [x + 0.5 - about[0], y + 0.5 - about[1]];
      if (dx * dx + dy * dy > STROKE_RADIUS * STROKE_RADIUS) continue;
      for (let a = 0; a < ANGLES; a += 1) {
        const rho = dx * cos[a]! + dy * sin[a]!;
        if (rho > -half && rho < half) votes[a * rows + Math.round(rho) + half]! += ink;
      }
    }
  }
  return peaksOf(votes, rows).map(([a, row]) => ({ about, phi: (a * Math.PI) / ANGLES, rho: row - half }));
}

/** The greatest votes, each at some distance from those before it. */
function peaksOf(votes: Float64Array, rows: number): Array<[angle: number, row: number]> {
  const order = Array.from(votes.keys())
    .filter((i) => votes[i]! > LEAST_INK * LEAST_INKED * 2 * STROKE_RADIUS)
    .sort((i, j) => votes[j]! - votes[i]!);
  const peaks: Array<[number, number]> = [];
  for (const i of order) {
    const [a, row] = [Math.floor(i / rows), i % rows];
    const isTaken = peaks.some(([b, other]) => {
      const apart = Math.abs(a - b);
      // Half a turn further on the same line has the opposite ρ.
      return apart <= 3
        ? Math.abs(row - other) <= 3
        : ANGLES - apart <= 3 && Math.abs(row + other - rows + 1) <= 3;
    });
    if (!isTaken) peaks.push([a, row]);
    if (peaks.length === CANDIDATES) break;
  }
  return peaks;
}

function isSame(a: NormalLine, b: NormalLine): boolean {
  if (angleBetween(a, b) > 0.06) return false;
  const side = Math.cos(a.phi - b.phi) < 0 ? -1 : 1;
  return Math.abs(a.rho - side * b.rho) < 2;
}

/** Angle between two lines, 0 to a right angle. */
function angleBetween(a: NormalLine, b: NormalLine): number {
  return Math.asin(Math.min(1, Math.abs(Math.sin(a.phi - b.phi))));
}

/** Strokes that carry ink nowhere but at letters count as so much of the reach further off. */
const FAINT_COST = 0.6;

function nearestCrossing(
  strokes: readonly StraightStroke[],
  about: Place,
  reach: number,
): StrokeCrossing | null {
  let nearest: StrokeCrossing | null = null;
  let least = Number.POSITIVE_INFINITY;
  strokes.forEach((a, i) => {
    for (const b of strokes.slice(i + 1)) {
      const angle = angleBetween(a, b);
      if (angle < LEAST_ANGLE) continue;
      const at = meetingOf(a, b);
      const far = Math.hypot(at[0] - about[0], at[1] - about[1]);
      if (far > reach || !isInkedNear(a, at) || !isInkedNear(b, at)) continue;
      const weaker = Math.min(a.inked.length, b.inked.length) / (2 * STROKE_RADIUS + 1);
      const cost = far + reach * FAINT_COST * (1 - weaker);
      if (cost >= least) continue;
      least = cost;
      nearest = { at, angleDeg: (angle * 180) / Math.PI };
    }
  });
  return nearest;
}

function meetingOf(a: NormalLine, b: NormalLine): Place {
  const det = Math.sin(b.phi - a.phi);
  return [
    a.about[0] + (a.rho * Math.sin(b.phi) - b.rho * Math.sin(a.phi)) / det,
    a.about[1] + (b.rho * Math.cos(a.phi) - a.rho * Math.cos(b.phi)) / det,
  ];
}

/** True when a stroke carries ink close to a place on it: not one that ended long before. */
function isInkedNear(stroke: StraightStroke, [x, y]: Place): boolean {
  const t = -(x - stroke.about[0]) * Math.sin(stroke.phi) + (y - stroke.about[1]) * Math.cos(stroke.phi);
  const near = NEAR_CROSSING + stroke.widthPx;
  return stroke.inked.filter((each) => Math.abs(each - t) <= near).length >= INKED_NEAR;
}
