import { joinTouching } from '#shared/compute/geometry/join-touching.ts';
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
  const shape = joinTouching(a.shape, b.shape, reach);
  return shape === null ? null : { ...a, shape, members: [...a.members, ...b.members] };
}
