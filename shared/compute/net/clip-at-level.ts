import { lengthOf, type Polyline, polylineOf, vertexOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';

/**
 * The longest piece of a polyline that lies at or below a level. `heightOf` gives the elevation of a place and must
 * be linear along each segment; `level` is in the same unit. The line itself when all of it does; null when none of
 * it does.
 */
export function clipAtLevel(
  line: Polyline,
  heightOf: (x: number, y: number) => number,
  level: number,
): Polyline | null {
  const pieces: Pair[][] = [];
  let current: Pair[] = [];
  let clipped = false;
  for (let i = 0; i < line.cum.length; i += 1) {
    const at = vertexOf(line, i);
    const below = heightOf(at[0], at[1]) <= level;
    if (!below) clipped = true;
    if (i > 0) {
      const before = vertexOf(line, i - 1);
      const wasBelow = heightOf(before[0], before[1]) <= level;
      if (wasBelow !== below) {
        current.push(atLevel(before, at, heightOf, level));
        if (wasBelow) {
          pieces.push(current);
          current = [];
        }
      }
    }
    if (below) current.push(at);
  }
  if (!clipped) return line;
  pieces.push(current);
  const kept = pieces.map((piece) => polylineOf(piece)).filter((piece) => piece !== null);
  return kept.sort((a, b) => lengthOf(b) - lengthOf(a))[0] ?? null;
}

function atLevel(a: Pair, b: Pair, heightOf: (x: number, y: number) => number, level: number): Pair {
  const ha = heightOf(a[0], a[1]);
  const t = Math.min(1, Math.max(0, (level - ha) / (heightOf(b[0], b[1]) - ha)));
  return [a[0] + t * (b[0] - a[0]), a[1] + t * (b[1] - a[1])];
}
