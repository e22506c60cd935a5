import type { InkMap } from '#shared/compute/ink/ink-window.ts';

type Place = readonly [x: number, y: number];

/** Half the width across the way in which the stroke's middle is looked for, pixels. */
const REACH = 4;
/** Samples to a pixel across the stroke. */
const FINENESS = 2;
/** Places on either side of one with which its shift is compared and smoothed. */
const NEIGHBOURS = 6;
/** Ink below this counts as paper when the middle is weighed. */
const FLOOR = 60;

/**
 * Moves a way that runs along a stroke onto the stroke's middle: across the way the ink is weighed, the shift taken is
 * the median of those nearby, so that a crossing stroke or a speck does not pull, and the whole is smoothed. `way`:
 * pixel middles of the map's frame, a pixel apart; over gaps the way stays where it is. Both ends are kept by number.
 */
export function centred(map: InkMap, way: readonly Place[]): Place[] {
  const smooth = smoothedWay(smoothedWay(way));
  const normals = smooth.map((_, i) => normalAt(smooth, i));
  const shifts = smooth.map((place, i) => shiftAt(map, place, normals[i]!));
  const settled = shifts.map((_, i) =>
    medianOf(shifts.slice(Math.max(0, i - NEIGHBOURS), i + NEIGHBOURS + 1)),
  );
  const moved = smooth.map(
    ([x, y], i): Place => [x + settled[i]! * normals[i]![0], y + settled[i]! * normals[i]![1]],
  );
  return smoothedWay(moved);
}

/** Shift across the way to the middle of the ink; null where there is none. */
function shiftAt(map: InkMap, [x, y]: Place, [nx, ny]: Place): number | null {
  let weight = 0;
  let moment = 0;
  for (let k = -REACH * FINENESS; k <= REACH * FINENESS; k += 1) {
    const t = k / FINENESS;
    const ink = inkAt(map, x + t * nx, y + t * ny) - FLOOR;
    if (ink <= 0) continue;
    weight += ink;
    moment += ink * t;
  }
  return weight > 0 ? moment / weight : null;
}

/** Ink at a place, between the middles of four pixels; paper outside. */
function inkAt({ width, height, ink }: InkMap, x: number, y: number): number {
  const u = x - 0.5;
  const v = y - 0.5;
  const i = Math.floor(u);
  const j = Math.floor(v);
  if (i < 0 || j < 0 || i + 1 >= width || j + 1 >= height) return 0;
  const [fu, fv] = [u - i, v - j];
  const at = j * width + i;
  const upper = ink[at]! * (1 - fu) + ink[at + 1]! * fu;
  const lower = ink[at + width]! * (1 - fu) + ink[at + width + 1]! * fu;
  return upper * (1 - fv) + lower * fv;
}

function normalAt(way: readonly Place[], i: number): Place {
  const a = way[Math.max(0, i - NEIGHBOURS)]!;
  const b = way[Math.min(way.length - 1, i + NEIGHBOURS)]!;
  const length = Math.hypot(b[0] - a[0], b[1] - a[1]);
  return length > 0 ? [-(b[1] - a[1]) / length, (b[0] - a[0]) / length] : [0, 0];
}

/** Each place is drawn half-way to the mean of those beside it; the ends stay. */
function smoothedWay(way: readonly Place[]): Place[] {
  const half = 3;
  return way.map((place, i): Place => {
    const reach = Math.min(half, i, way.length - 1 - i);
    if (reach === 0) return place;
    const near = way.slice(i - reach, i + reach + 1);
    return [
      near.reduce((sum, each) => sum + each[0], 0) / near.length,
      near.reduce((sum, each) => sum + each[1], 0) / near.length,
    ];
  });
}

function medianOf(values: ReadonlyArray<number | null>): number {
  const known = values.filter((value) => value !== null).sort((a, b) => a - b);
  return known[known.length >> 1] ?? 0;
}
