import type { ExactNet } from '#shared/compute/exact/exact-net.ts';
import type { RandomReading } from '#tests/support/exact-nets/random-readings.ts';
import { seededRandom } from '#tests/support/exact-nets/seeded-noise.ts';

const STEP = 1e-3;

/**
 * Random places inside an exact net, spread evenly over its area: drops and channels drawn evenly, and kept in
 * proportion to the area that a small cell has there.
 */
export function readingsOverArea(net: ExactNet, count: number, seed: number): RandomReading[] {
  const random = seededRandom(seed);
  const draw = (): [number, number] => [
    0.01 + random() * (net.drops - 0.02),
    0.01 + random() * (net.channels - 0.02),
  ];
  const most = Math.max(...Array.from({ length: 3000 }, () => areaAt(net, ...draw())));
  const readings: RandomReading[] = [];
  while (readings.length < count) {
    const place = draw();
    if (random() * most >= areaAt(net, ...place)) continue;
    readings.push({ at: net.placeAt(...place), clicked: random() < 0.5 });
  }
  return readings;
}

/** Area of a small cell of drops and channels, any unit. */
function areaAt(net: ExactNet, drops: number, channel: number): number {
  const [x, y] = net.placeAt(drops, channel);
  const [dx, dy] = net.placeAt(drops + STEP, channel);
  const [cx, cy] = net.placeAt(drops, channel + STEP);
  return Math.abs((dx - x) * (cy - y) - (dy - y) * (cx - x));
}
