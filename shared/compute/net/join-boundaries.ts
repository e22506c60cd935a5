import { firstOf, lastOf, type Polyline, polylineOf, verticesOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { Potential } from '#shared/compute/net/potentials.ts';

/**
 * Joins boundaries that are traced in pieces, a bed and the face that rises from it, into one: pieces of one role that
 * carry the same head and whose ends lie within `reach` (pixels) of one another. The joined boundary keeps the id of
 * its first piece and lists all as members. Boundaries along which the head varies are left as they are.
 */
export function joinBoundaries(potentials: readonly Potential[], reach: number): Potential[] {
  const joined = [...potentials];
  for (let i = 0; i < joined.length; i += 1) {
    for (let j = i + 1; j < joined.length; j += 1) {
      const one = joinedPair(joined[i]!, joined[j]!, reach);
      if (one === null) continue;
      joined[i] = one;
      joined.splice(j, 1);
      // The longer piece may reach one that was passed over before.
      j = i;
    }
  }
  return joined;
}

function joinedPair(a: Potential, b: Potential, reach: number): Potential | null {
  if (a.role !== b.role || a.level === null || a.level !== b.level) return null;
  const shape = joinedShape(a.shape, b.shape, reach);
  return shape === null ? null : { ...a, shape, members: [...a.members, ...b.members] };
}

function joinedShape(a: Polyline, b: Polyline, reach: number): Polyline | null {
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
