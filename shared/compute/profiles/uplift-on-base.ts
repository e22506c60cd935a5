import { type PressedPlace, type Resultant, resultantOf } from '#shared/compute/quantities/uplift.ts';
import type { ProfileReading, ProfileSample } from '#shared/contract/reading-quantities.ts';

type Uplift = NonNullable<ProfileReading['uplift']>;

const LEFT_OUT = 'Drains and a cracked length are not in it: their effect is the engineer’s to add.';

/**
 * Uplift on a base from the samples along it: the resultant of u = γw(h − z), tailwater included, and that of the excess
 * u − γw·max(0, tailwater − z) over the tailwater's own pressure. A pressure below zero counts as zero: water does not
 * hold a structure down. No resultant when any sample could not be read, for one over the rest would be too small.
 * `samples` pressures in kPa or lb/ft² and lengths in m or ft; `tailwater` null without one.
 */
export function upliftOn(
  samples: readonly ProfileSample[],
  gammaW: number,
  tailwater: number | null,
): Uplift {
  const missing = samples.filter(({ porePressure }) => porePressure === null).length;
  if (samples.length < 2 || missing > 0) {
    const note =
      samples.length < 2
        ? 'The base needs two places at least for a resultant.'
        : `At ${missing} of ${samples.length} places nothing could be read, so that there is no resultant. Draw the base within the traced net.`;
    return { total: null, excess: null, note };
  }
  const pressed = (less: (elevation: number) => number): PressedPlace[] =>
    samples.map(({ offset, elevation, porePressure }) => ({
      offset,
      elevation,
      pressure: Math.max(0, porePressure ?? 0) - less(elevation),
    }));
  const still = (elevation: number) => gammaW * Math.max(0, (tailwater ?? elevation) - elevation);
  return {
    total: finite(resultantOf(pressed(() => 0))),
    excess: tailwater === null ? null : finite(resultantOf(pressed(still))),
    note: samples.some(({ porePressure }) => porePressure !== null && porePressure < 0)
      ? `Pressures below zero count as zero. ${LEFT_OUT}`
      : LEFT_OUT,
  };
}

function finite({ horizontal, vertical, size, actsAt, arm }: Resultant): Uplift['total'] {
  if (![horizontal, vertical, size, arm ?? 0, ...(actsAt ?? [])].every(Number.isFinite)) return null;
  return { horizontal, vertical, size, actsAt: actsAt === null ? null : [actsAt[0], actsAt[1]], arm };
}
