import type { StripMesh } from '#shared/compute/field/strip-mesh.ts';
import { lengthOfVector } from '#shared/compute/geometry/length.ts';

/** Head at a place of a strip, and its gradient by working pixels. */
export type FieldPlace = { readonly head: number; readonly gradient: readonly [number, number] };

/**
 * Reads a solved strip at places. `heads`: at each corner of each triangle, in the order of `mesh.triangles`; NaN where
 * no held line is reached. Inside a triangle the head is linear; the gradient is the mean of those of the triangles
 * about each corner, by area, taken linearly between the corners, which is nearer to the truth than a triangle's own
 * (Zienkiewicz and Zhu 1992).
 */
export function placesOf(
  mesh: StripMesh,
  heads: Float64Array,
): (x: number, y: number, slack: number) => FieldPlace | null {
  let slopes: Float64Array | null = null;
  return (x, y, slack) => {
    const found = nearestTriangle(mesh, heads, x, y, slack);
    if (found === null) return null;
    slopes ??= slopesOf(mesh, heads);
    const { t, parts } = found;
    let head = 0;
    const gradient: [number, number] = [0, 0];
    for (let k = 0; k < 3; k += 1) {
      const part = parts[k]!;
      const unknown = mesh.unknowns[t + k]!;
      head += part * heads[t + k]!;
      gradient[0] += part * slopes[2 * unknown]!;
      gradient[1] += part * slopes[2 * unknown + 1]!;
    }
    return { head, gradient };
  };
}

type Nearest = { readonly t: number; readonly parts: readonly [number, number, number] };

/**
 * The triangle that holds a place. A place outside all by up to `slack` pixels, as a point on a traced boundary is,
 * takes the nearest place inside: nothing is extrapolated. Null where the field has no head.
 */
function nearestTriangle(
  { xy, triangles }: StripMesh,
  heads: Float64Array,
  x: number,
  y: number,
  slack: number,
): Nearest | null {
  let nearest = slack;
  let best: Nearest | null = null;
  for (let t = 0; t < triangles.length; t += 3) {
    const i = 2 * triangles[t]!;
    const j = 2 * triangles[t + 1]!;
    const k = 2 * triangles[t + 2]!;
    const ax = xy[i]!;
    const bx = xy[j]!;
    const cx = xy[k]!;
    if (x < Math.min(ax, bx, cx) - nearest || x > Math.max(ax, bx, cx) + nearest) continue;
    const ay = xy[i + 1]!;
    const by = xy[j + 1]!;
    const cy = xy[k + 1]!;
    if (y < Math.min(ay, by, cy) - nearest || y > Math.max(ay, by, cy) + nearest) continue;
    if (Number.isNaN(heads[t]! + heads[t + 1]! + heads[t + 2]!)) continue;
    const whole = (bx - ax) * (cy - ay) - (by - ay) * (cx - ax);
    const b = ((x - ax) * (cy - ay) - (y - ay) * (cx - ax)) / whole;
    const c = ((bx - ax) * (y - ay) - (by - ay) * (x - ax)) / whole;
    if (b >= 0 && c >= 0 && b + c <= 1) return { t, parts: [1 - b - c, b, c] };
    const corners = [ax, ay, bx, by, cx, cy];
    for (let side = 0; side < 3; side += 1) {
      const next = (side + 1) % 3;
      const { distance, along } = toSide(corners, 2 * side, 2 * next, x, y);
      if (distance > nearest || (distance === nearest && best !== null)) continue;
      const parts: [number, number, number] = [0, 0, 0];
      parts[side] = 1 - along;
      parts[next] = along;
      nearest = distance;
      best = { t, parts };
    }
  }
  return best;
}

function toSide(
  corners: readonly number[],
  a: number,
  b: number,
  x: number,
  y: number,
): { distance: number; along: number } {
  const [ax, ay] = [corners[a]!, corners[a + 1]!];
  const [dx, dy] = [corners[b]! - ax, corners[b + 1]! - ay];
  const square = dx * dx + dy * dy;
  const along = square > 0 ? Math.min(1, Math.max(0, ((x - ax) * dx + (y - ay) * dy) / square)) : 0;
  return { distance: lengthOfVector(ax + along * dx - x, ay + along * dy - y), along };
}

/** Gradient of the head at each unknown: the mean of the triangles about it, by area. */
function slopesOf({ xy, triangles, unknowns, unknownCount }: StripMesh, heads: Float64Array): Float64Array {
  const slopes = new Float64Array(2 * unknownCount);
  const weight = new Float64Array(unknownCount);
  for (let t = 0; t < triangles.length; t += 3) {
    const i = 2 * triangles[t]!;
    const j = 2 * triangles[t + 1]!;
    const k = 2 * triangles[t + 2]!;
    const ux = xy[j]! - xy[i]!;
    const uy = xy[j + 1]! - xy[i + 1]!;
    const vx = xy[k]! - xy[i]!;
    const vy = xy[k + 1]! - xy[i + 1]!;
    const du = heads[t + 1]! - heads[t]!;
    const dv = heads[t + 2]! - heads[t]!;
    const twice = ux * vy - uy * vx;
    if (twice === 0 || Number.isNaN(du + dv)) continue;
    const sign = Math.sign(twice);
    for (let corner = 0; corner < 3; corner += 1) {
      const u = unknowns[t + corner]!;
      slopes[2 * u] = slopes[2 * u]! + sign * (du * vy - dv * uy);
      slopes[2 * u + 1] = slopes[2 * u + 1]! + sign * (dv * ux - du * vx);
      weight[u] = weight[u]! + Math.abs(twice);
    }
  }
  for (let u = 0; u < unknownCount; u += 1) {
    if (weight[u] === 0) continue;
    slopes[2 * u] = slopes[2 * u]! / weight[u]!;
    slopes[2 * u + 1] = slopes[2 * u + 1]! / weight[u]!;
  }
  return slopes;
}
