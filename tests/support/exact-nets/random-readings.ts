import type { ExactNet, ExactPlace } from '#shared/compute/exact/exact-net.ts';
import { seededRandom } from '#tests/support/exact-nets/seeded-noise.ts';

export type RandomReading = { at: ExactPlace; clicked: boolean };

/**
 * Random places inside an exact net, spread evenly over its drops and channels, so that the small cells near tips and
 * drains are asked as often as the large ones. `margin` keeps off the net's outline, in drops and channels.
 */
export function randomReadings(net: ExactNet, count: number, seed: number, margin = 0.02): RandomReading[] {
  const random = seededRandom(seed);
  return Array.from({ length: count }, () => ({
    at: net.placeAt(
      margin + random() * (net.drops - 2 * margin),
      margin + random() * (net.channels - 2 * margin),
    ),
    clicked: random() < 0.5,
  }));
}
