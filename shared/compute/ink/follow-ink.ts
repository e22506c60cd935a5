import { thinned } from '#shared/compute/geometry/thin.ts';
import { centred } from '#shared/compute/ink/centre-line.ts';
import { type InkMap, type InkWindow, inkMapOf } from '#shared/compute/ink/ink-window.ts';
import { leastCostPath } from '#shared/compute/ink/least-cost-path.ts';

type Place = readonly [x: number, y: number];

/** A line along the ink, in pixels of the window from its corner, and the part of its length that runs on ink, 0 to 1. */
export type Followed = { readonly line: Place[]; readonly onInk: number };

/** A click takes hold of the darkest stroke within this distance, pixels, unless another is asked for. */
export const GRIP = 4;
/** Ink at least this dark is a stroke and no texture of the paper; of 255. */
const STROKE = 90;
/** What a pixel of distance takes from the worth of a stroke at the usual grip. */
const NEARNESS = 12;
/** A pixel less worth than this is paper, and not taken hold of. */
const LEAST_WORTH = 40;
/** Vertices are left out while the line stays this near, pixels. */
const SIMPLIFY_PX = 0.4;

/**
 * The drawn line between two clicks: the least-cost way over the ink, moved to the middle of the stroke and thinned to
 * few vertices. Places in the window's frame (base-raster pixels from its corner), clicks included as first and last
 * vertex, moved to the stroke where one is within `grip`. Where nothing is drawn the answer is the straight join.
 */
export function followInk(window: InkWindow, from: Place, to: Place, grip = GRIP): Followed {
  return followOnMap(inkMapOf(window), from, to, grip);
}

/** `followInk` on a map of ink that is there already. */
export function followOnMap(map: InkMap, from: Place, to: Place, grip = GRIP): Followed {
  const start = gripped(map, from, grip);
  const end = gripped(map, to, grip);
  if (start[0] === end[0] && start[1] === end[1]) return { line: [from, to], onInk: 0 };
  const cells = leastCostPath(map, start, end);
  const way = centred(
    map,
    cells.map(([x, y]): Place => [x + 0.5, y + 0.5]),
  );
  const line = thinned(way, SIMPLIFY_PX);
  return { line: line.length >= 2 ? line : [from, to], onInk: partOnInk(map, way) };
}

/** Told on the smooth middle line: a way over the paper's texture winds from dark pixel to dark pixel, its middle does not. */
function partOnInk({ width, height, ink }: InkMap, way: readonly Place[]): number {
  const on = way.filter(([x, y]) => {
    const i = Math.min(width - 1, Math.max(0, Math.floor(x)));
    const j = Math.min(height - 1, Math.max(0, Math.floor(y)));
    return ink[j * width + i]! >= STROKE;
  });
  return on.length / way.length;
}

/** The pixel with most ink about a click, nearer ones preferred; the click's own where all is paper. */
function gripped(map: InkMap, [x, y]: Place, grip: number): readonly [number, number] {
  const i = Math.min(map.width - 1, Math.max(0, Math.floor(x)));
  const j = Math.min(map.height - 1, Math.max(0, Math.floor(y)));
  const reach = Math.ceil(grip);
  const perPixel = (NEARNESS * GRIP) / Math.max(GRIP, grip);
  let best: readonly [number, number] = [i, j];
  let most = LEAST_WORTH;
  for (let v = Math.max(0, j - reach); v <= Math.min(map.height - 1, j + reach); v += 1) {
    for (let u = Math.max(0, i - reach); u <= Math.min(map.width - 1, i + reach); u += 1) {
      const worth = map.ink[v * map.width + u]! - perPixel * Math.hypot(u - i, v - j);
      if (worth <= most) continue;
      most = worth;
      best = [u, v];
    }
  }
  return best;
}
