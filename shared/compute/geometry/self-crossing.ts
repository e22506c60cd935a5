import { type Polyline, RUN, vertexOf } from '#shared/compute/geometry/polyline.ts';
import { orientation, type Pair } from '#shared/compute/geometry/predicates.ts';

/** Where a polyline crosses itself: the distances along it at which it passes the place, `s` < `t`, and the place. */
export type SelfCrossing = { readonly s: number; readonly t: number; readonly at: Pair };

/**
 * A place at which a polyline crosses itself and does not merely touch itself or run back along itself, a crossing at a
 * vertex of both passages being taken for a touch; null when there is none. A loop of no more than `slack` mean width is the tremor of the hand, or a thin wall outlined down one side
 * and up the other, and passes; of such loops there may be as many as the line has segments. `isWanted` may pass over
 * others. One frame; crossings are decided exactly. Runs of segments whose boxes are apart are never compared, so that
 * an ordinary line costs no more than its length.
 */
export function selfCrossingOf(
  line: Polyline,
  slack: number,
  isWanted: (crossing: SelfCrossing) => boolean = () => true,
): SelfCrossing | null {
  const segments = line.cum.length - 1;
  const moments = momentsOf(line);
  let narrow = 0;
  return firstOfMeeting(line, (i, j) => {
    const crossing = crossingOf(line, i, j);
    if (crossing === null || !isWanted(crossing)) return null;
    if (meanWidth(line, moments, crossing, i, j) > slack) return crossing;
    narrow += 1;
    return narrow > segments ? crossing : null;
  });
}

/** What `crossingAt` finds first among pairs of segments, the first before the second and not its neighbour, whose boxes meet. */
function firstOfMeeting(
  { runs, xy, cum }: Polyline,
  crossingAt: (i: number, j: number) => SelfCrossing | null,
): SelfCrossing | null {
  const segments = cum.length - 1;
  const count = runs.length / 4;
  for (let p = 0; p < count; p += 1) {
    for (let q = p; q < count; q += 1) {
      if (runs[4 * p]! > runs[4 * q + 2]! || runs[4 * p + 2]! < runs[4 * q]!) continue;
      if (runs[4 * p + 1]! > runs[4 * q + 3]! || runs[4 * p + 3]! < runs[4 * q + 1]!) continue;
      const lastI = Math.min(segments, (p + 1) * RUN);
      const lastJ = Math.min(segments, (q + 1) * RUN);
      for (let i = p * RUN; i < lastI; i += 1) {
        for (let j = Math.max(i + 2, q * RUN); j < lastJ; j += 1) {
          const found = segmentsNear(xy, 2 * i, 2 * j) ? crossingAt(i, j) : null;
          if (found !== null) return found;
        }
      }
    }
  }
  return null;
}

/** True when the boxes of the segments that begin at two places of `xy` have a point in common. */
function segmentsNear(xy: Float64Array, i: number, j: number): boolean {
  return (
    Math.max(xy[j]!, xy[j + 2]!) >= Math.min(xy[i]!, xy[i + 2]!) &&
    Math.min(xy[j]!, xy[j + 2]!) <= Math.max(xy[i]!, xy[i + 2]!) &&
    Math.max(xy[j + 1]!, xy[j + 3]!) >= Math.min(xy[i + 1]!, xy[i + 3]!) &&
    Math.min(xy[j + 1]!, xy[j + 3]!) <= Math.max(xy[i + 1]!, xy[i + 3]!)
  );
}

/** Where the line crosses itself between two of its segments, or at the end of one of them; null when it does not. */
function crossingOf(line: Polyline, i: number, j: number): SelfCrossing | null {
  const { xy, cum } = line;
  const [ax, ay, bx, by] = [xy[2 * i]!, xy[2 * i + 1]!, xy[2 * i + 2]!, xy[2 * i + 3]!];
  const [cx, cy, dx, dy] = [xy[2 * j]!, xy[2 * j + 1]!, xy[2 * j + 2]!, xy[2 * j + 3]!];
  const ends = sideOf(line, i, j) * sideOf(line, i, j + 1);
  const others = sideOf(line, j, i) * sideOf(line, j, i + 1);
  if (ends > 0 || others > 0) return null;
  if (!(ends < 0 && others < 0) && !passesThrough(line, i, j)) return null;
  const cross = (bx - ax) * (dy - cy) - (by - ay) * (dx - cx);
  const t = held(((cx - ax) * (dy - cy) - (cy - ay) * (dx - cx)) / cross);
  const u = held(((cx - ax) * (by - ay) - (cy - ay) * (bx - ax)) / cross);
  return {
    s: cum[i]! + t * (cum[i + 1]! - cum[i]!),
    t: cum[j]! + u * (cum[j + 1]! - cum[j]!),
    at: [ax + t * (bx - ax), ay + t * (by - ay)],
  };
}

/** On which side of segment `i` the vertex `k` lies: 1, −1, or 0 on its straight line. */
function sideOf({ xy }: Polyline, i: number, k: number): number {
  return orientation(xy[2 * i]!, xy[2 * i + 1]!, xy[2 * i + 2]!, xy[2 * i + 3]!, xy[2 * k]!, xy[2 * k + 1]!);
}

/** True when one segment's end lies on the other segment and the line goes on from there on the far side. */
function passesThrough(line: Polyline, i: number, j: number): boolean {
  const last = line.cum.length - 1;
  const onto = (k: number, own: number) =>
    own + 2 <= last &&
    sideOf(line, k, own + 1) === 0 &&
    sideOf(line, k, own) * sideOf(line, k, own + 2) < 0 &&
    sideOf(line, own, k) * sideOf(line, own, k + 1) < 0;
  return onto(i, j) || onto(j, i);
}

/** The part 0 to 1; a half where rounding leaves no figure. */
function held(part: number): number {
  return Number.isFinite(part) ? Math.min(1, Math.max(0, part)) : 0.5;
}

/** Twice the area swept about the first vertex up to each vertex. */
function momentsOf(line: Polyline): Float64Array {
  const moments = new Float64Array(line.cum.length);
  for (let i = 1; i < moments.length; i += 1) {
    moments[i] = moments[i - 1]! + swept(line, vertexOf(line, i - 1), vertexOf(line, i));
  }
  return moments;
}

function swept(line: Polyline, a: Pair, b: Pair): number {
  const [x, y] = vertexOf(line, 0);
  return (a[0] - x) * (b[1] - y) - (b[0] - x) * (a[1] - y);
}

/** Area of a loop over half its length: the width of the strip that it would be if it were a narrow one. */
function meanWidth(
  line: Polyline,
  moments: Float64Array,
  { s, t, at }: SelfCrossing,
  i: number,
  j: number,
): number {
  const twice =
    swept(line, at, vertexOf(line, i + 1)) +
    (moments[j]! - moments[i + 1]!) +
    swept(line, vertexOf(line, j), at);
  return Math.abs(twice) / (t - s);
}
