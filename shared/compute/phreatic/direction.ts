import { lengthOf, type Polyline, pointAlong, verticesOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';

/**
 * Direction of a polyline over a window about the distance `s`, a unit vector towards growing distance: the principal
 * axis of its vertices and ends there, so that the tremor of single vertices averages out. `window`: length, the
 * frame's unit.
 */
export function directionOver(line: Polyline, s: number, window: number): Pair {
  const from = Math.max(0, s - window / 2);
  const to = Math.min(lengthOf(line), Math.max(s + window / 2, from + window));
  const start = Math.max(0, Math.min(from, to - window));
  const a = pointAlong(line, start);
  const b = pointAlong(line, to);
  const places = [a, ...verticesOf(line).filter((_, i) => line.cum[i]! > start && line.cum[i]! < to), b];
  const mean: Pair = [average(places.map((p) => p[0])), average(places.map((p) => p[1]))];
  let xx = 0;
  let xy = 0;
  let yy = 0;
  for (const [x, y] of places) {
    xx += (x - mean[0]) ** 2;
    xy += (x - mean[0]) * (y - mean[1]);
    yy += (y - mean[1]) ** 2;
  }
  const angle = Math.atan2(2 * xy, xx - yy) / 2;
  const along: Pair = [Math.cos(angle), Math.sin(angle)];
  const forward = along[0] * (b[0] - a[0]) + along[1] * (b[1] - a[1]) >= 0;
  return forward ? along : [-along[0], -along[1]];
}

/** Angle between two directions without regard to their sense, degrees, 0 to 90. */
export function angleBetween(a: Pair, b: Pair): number {
  const sine = Math.abs(a[0] * b[1] - a[1] * b[0]);
  const cosine = Math.abs(a[0] * b[0] + a[1] * b[1]);
  return (Math.atan2(sine, cosine) * 180) / Math.PI;
}

function average(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}
