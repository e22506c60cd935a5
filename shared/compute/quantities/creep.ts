import type { Pair } from '#shared/compute/geometry/predicates.ts';

/** Creep along the contact of a structure with its ground, in the unit of its places. */
export type CreepLength = {
  /** Pieces of 45° and steeper, and flatter ones, along the contact. */
  readonly steep: number;
  readonly flat: number;
  /** Lane's weighted length, steep + flat/3. */
  readonly weighted: number;
  /** Bligh's length, steep + flat. */
  readonly whole: number;
};

/**
 * Creep length along a contact, (offset, elevation) in order from headwater to tailwater. A piece of 45° or steeper
 * counts as vertical with its whole length, a flatter one with a third of it. Sources: Bligh (1910), whole length; Lane
 * (1935), Security from under-seepage, Trans. ASCE 100: weighted length.
 */
export function creepLength(contact: readonly Pair[]): CreepLength {
  let [steep, flat] = [0, 0];
  for (let i = 1; i < contact.length; i += 1) {
    const dx = Math.abs(contact[i]![0] - contact[i - 1]![0]);
    const dz = Math.abs(contact[i]![1] - contact[i - 1]![1]);
    if (dz >= dx) steep += Math.hypot(dx, dz);
    else flat += Math.hypot(dx, dz);
  }
  return { steep, flat, weighted: steep + flat / 3, whole: steep + flat };
}

/**
 * Creep ratio, creep length over the head lost H in the same unit: weighted for Lane's ratio, whole for Bligh's. A rough
 * cross-check beside the net, which knows the way of the water better. Null without a head lost.
 */
export function creepRatio(length: number, headLost: number): number | null {
  const ratio = length / headLost;
  return headLost > 0 && Number.isFinite(ratio) ? ratio : null;
}
