import { thinned } from '#shared/compute/geometry/thin.ts';
import { centred } from '#shared/compute/ink/centre-line.ts';
import { type InkMap, type InkWindow, inkMapOf } from '#shared/compute/ink/ink-window.ts';
import { leastCostPath } from '#shared/compute/ink/least-cost-path.ts';

type Place = readonly [x: number, y: number];

/** A click takes hold of the darkest stroke within this distance, pixels. */
const GRIP = 4;
/** Vertices are left out while the line stays this near, pixels. */
const SIMPLIFY_PX = 0.4;

/**
 * The drawn line between two clicks: the least-cost way over the ink, moved to the middle of the stroke and thinned to
 * few vertices. Places in the window's frame (base-raster pixels from its corner), clicks included as first and last
 * vertex, moved to the stroke where one is near. Where nothing is drawn the answer is the straight join.
 */
export function followInk(window: InkWindow, from: Place, to: Place): Place[] {
  const map = inkMapOf(window);
  const start = gripped(map, from);
  const end = gripped(map, to);
  if (start[0] === end[0] && start[1] === end[1]) return [from, to];
  const way = leastCostPath(map, start, end).map(([x, y]): Place => [x + 0.5, y + 0.5]);
  const line = thinned(centred(map, way), SIMPLIFY_PX);
  return line.length >= 2 ? line : [from, to];
}

/** The pixel with most ink about a click, nearer ones preferred; the click's own where all is paper. */
function gripped(map: InkMap, [x, y]: Place): readonly [number, number] {
  const i = Math.min(map.width - 1, Math.max(0, Math.floor(x)));
  const j = Math.min(map.height - 1, Math.max(0, Math.floor(y)));
  let best: readonly [number, number] = [i, j];
  let most = 40;
  for (let v = Math.max(0, j - GRIP); v <= Math.min(map.height - 1, j + GRIP); v += 1) {
    for (let u = Math.max(0, i - GRIP); u <= Math.min(map.width - 1, i + GRIP); u += 1) {
      const worth = map.ink[v * map.width + u]! - 12 * Math.hypot(u - i, v - j);
      if (worth <= most) continue;
      most = worth;
      best = [u, v];
    }
  }
  return best;
}
