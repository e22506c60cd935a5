import { firstOf, lastOf, type Polyline, polylineOf, verticesOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';

/** Two lines through the two of their ends that lie nearest together, when within `reach`; else null. One frame. */
export function joinTouching(a: Polyline, b: Polyline, reach: number): Polyline | null {
  const ways: Array<[Pair, Pair, () => Pair[]]> = [
    [lastOf(a), firstOf(b), () => [...verticesOf(a), ...verticesOf(b)]],
    [lastOf(a), lastOf(b), () => [...verticesOf(a), ...verticesOf(b).reverse()]],
    [firstOf(a), firstOf(b), () => [...verticesOf(b).reverse(), ...verticesOf(a)]],
    [firstOf(a), lastOf(b), () => [...verticesOf(b), ...verticesOf(a)]],
  ];
  const nearest = ways
    .map(([end, start, points]) => ({ gap: Math.hypot(end[0] - start[0], end[1] - start[1]), points }))
    .sort((one, other) => one.gap - other.gap)[0]!;
  return nearest.gap <= reach ? polylineOf(nearest.points()) : null;
}
