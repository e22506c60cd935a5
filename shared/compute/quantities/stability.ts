import type { PreparedNet } from '#shared/compute/prepare-net.ts';
import { creepRead } from '#shared/compute/quantities/contact.ts';
import { heavePrisms } from '#shared/compute/quantities/heave-prisms.ts';
import type { StabilityReading } from '#shared/contract/reading-quantities.ts';

/** What a reading holds while nothing may be worked out. */
export const NO_STABILITY: StabilityReading = { heave: [], creep: null };

/** Heave beside walls and creep along the contact of a prepared net; nothing while it is not finished. Never throws. */
export function stabilityRead(prepared: PreparedNet): StabilityReading {
  return { heave: heavePrisms(prepared), creep: creepRead(prepared) };
}
