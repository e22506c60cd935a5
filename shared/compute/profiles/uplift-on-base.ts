import { type Contributions, halfWidth, weightedSum } from '#shared/compute/doubt/contributions.ts';
import type { ReadingDoubt } from '#shared/compute/doubt/point-doubt.ts';
import type { ReadingGround } from '#shared/compute/net/reading-ground.ts';
import { type PressedPlace, type Resultant, resultantOf } from '#shared/compute/quantities/uplift.ts';
import type { DoubtSource } from '#shared/contract/reading-doubt.ts';
import type { ProfileReading, ProfileSample } from '#shared/contract/reading-quantities.ts';

type Uplift = NonNullable<ProfileReading['uplift']>;

/** A sample with the doubt of its head, cause by cause; null where nothing was read. */
export type ReadSample = { readonly sample: ProfileSample; readonly doubt: ReadingDoubt | null };

const LEFT_OUT = 'Drains and a cracked length are not in it: their effect is the engineer’s to add.';

/**
 * Uplift on a base from the samples along it: the resultant of u = γw(h − z), tailwater included, and that of the excess
 * u − γw·max(0, tailwater − z) over the tailwater's own pressure. A pressure below zero counts as zero: water does not
 * hold a structure down. No resultant when any sample could not be read, for one over the rest would be too small.
 * `samples` pressures in kPa or lb/ft² and lengths in m or ft; `tailwater` null without one.
 */
export function upliftOn(
  read: readonly ReadSample[],
  ground: Pick<ReadingGround, 'gammaW' | 'doubt'>,
  tailwater: number | null,
): Uplift {
  const samples = read.map(({ sample }) => sample);
  const { gammaW } = ground;
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
    total: finite(
      resultantOf(pressed(() => 0)),
      read,
      read.map(({ doubt }) => doubt?.porePressure ?? []),
    ),
    excess:
      tailwater === null
        ? null
        : finite(
            resultantOf(pressed(still)),
            read,
            read.map((each) => excessDoubt(each, ground, tailwater)),
          ),
    note: samples.some(({ porePressure }) => porePressure !== null && porePressure < 0)
      ? `Pressures below zero count as zero. ${LEFT_OUT}`
      : LEFT_OUT,
  };
}

/** Of γw(h − tailwater): the elevation of the base drops out, and so does an error of the datum. */
function excessDoubt(
  { sample, doubt }: ReadSample,
  { gammaW, doubt: net }: Pick<ReadingGround, 'gammaW' | 'doubt'>,
  tailwater: number,
): Contributions {
  if (doubt === null) return [];
  const { datumPlusMinus, tailwaterPlusMinus, gammaWPlusMinus } = net.water;
  const of = (cause: string, source: DoubtSource, amount: number | null) => [
    { cause, source, amount: amount ?? 0 },
  ];
  return weightedSum([
    [gammaW, doubt.totalHead],
    [-gammaW, of('datum', 'datum', datumPlusMinus)],
    [-gammaW, of('tailwater', 'waterLevels', tailwaterPlusMinus)],
    [(sample.totalHead ?? tailwater) - tailwater, of('gammaW', 'gammaW', gammaWPlusMinus)],
  ]);
}

function finite(
  { horizontal, vertical, size, actsAt, arm }: Resultant,
  read: readonly ReadSample[],
  doubts: readonly Contributions[],
): Uplift['total'] {
  if (![horizontal, vertical, size, arm ?? 0, ...(actsAt ?? [])].every(Number.isFinite)) return null;
  const along: [number, number] = size > 0 ? [horizontal / size, vertical / size] : [0, 1];
  const spans = tributarySpans(
    read.map(({ sample }) => sample),
    along,
  );
  const plusMinus = halfWidth(weightedSum(spans.map((span, i) => [span, doubts[i]!])));
  return {
    horizontal,
    vertical,
    size,
    plusMinus: Number.isFinite(plusMinus) ? plusMinus : null,
    actsAt: actsAt === null ? null : [actsAt[0], actsAt[1]],
    arm,
  };
}

/** Length of base that each place presses on, seen along a direction: half of each piece beside it. */
function tributarySpans(samples: readonly ProfileSample[], [ux, uz]: readonly [number, number]): number[] {
  const turned = (samples.at(-1)?.offset ?? 0) >= (samples[0]?.offset ?? 0) ? 1 : -1;
  const piece = (a: ProfileSample | undefined, b: ProfileSample | undefined) =>
    a === undefined || b === undefined
      ? 0
      : turned * ((b.offset - a.offset) * uz - (b.elevation - a.elevation) * ux);
  return samples.map((sample, i) => (piece(samples[i - 1], sample) + piece(sample, samples[i + 1])) / 2);
}
