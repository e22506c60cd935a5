import { ringContains } from '#shared/compute/geometry/polygon.ts';
import { lengthOf, type Polyline, pointAlong } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { Strip } from '#shared/compute/net/strips.ts';
import type { Soil, SoilList } from '#shared/compute/soils/soil-list.ts';
import type { SoilRegions } from '#shared/compute/soils/soil-regions.ts';

/** Part of the sampled net that the soil of the section must fill to be counted as one of the net's soils. */
const LEAST_PART = 0.02;
/** Places beside each soil boundary at which it is asked what lies there, and how far to either side, pixels. */
const BESIDE = 12;
const BESIDE_PX = 2;

/**
 * Soils that lie within the net, those of its section first. Each strip is sampled evenly; a soil that fills less than a
 * sample, as a slurry wall does, is found by its own places and beside the soil boundaries, since it may take most of
 * the head. Strips, regions and places in one frame.
 */
export function usedSoils(
  strips: readonly Strip[],
  { soilAt, boundaries }: SoilRegions,
  { section, placed }: SoilList,
): Soil[] {
  if (placed.length === 0) return [section];
  const samples = strips.flatMap(placesWithin).map(([x, y]) => soilAt(x, y));
  const found = new Set(samples);
  const narrow = [...placed.flatMap(({ places }) => places), ...boundaries.flatMap(placesBeside)];
  for (const [x, y] of narrow) {
    if (strips.some(({ ring }) => ringContains(ring, x, y))) found.add(soilAt(x, y));
  }
  const ofSection = samples.filter((soil) => soil === section).length;
  return [section, ...placed].filter((soil) =>
    soil === section ? ofSection > LEAST_PART * samples.length : found.has(soil),
  );
}

/** Places spread over a strip. */
function placesWithin({ beforeShape, afterShape }: Strip): Pair[] {
  return Array.from({ length: 24 }, (_, i): Pair => {
    const along = ((i >> 2) + 0.5) / 6;
    const across = ((i & 3) + 0.5) / 4;
    const [ax, ay] = pointAlong(beforeShape, along * lengthOf(beforeShape));
    const [bx, by] = pointAlong(afterShape, along * lengthOf(afterShape));
    return [ax + across * (bx - ax), ay + across * (by - ay)];
  });
}

/** Places close to either side of a soil boundary, spread along it. */
function placesBeside(boundary: Polyline): Pair[] {
  const length = lengthOf(boundary);
  return Array.from({ length: BESIDE }, (_, i) => (i + 0.5) / BESIDE).flatMap((part): Pair[] => {
    const [x, y] = pointAlong(boundary, part * length);
    const [nx, ny] = pointAlong(boundary, Math.min(length, part * length + 1));
    const size = Math.hypot(nx - x, ny - y);
    if (!(size > 0)) return [];
    const [across, down] = [(-BESIDE_PX * (ny - y)) / size, (BESIDE_PX * (nx - x)) / size];
    return [
      [x + across, y + down],
      [x - across, y - down],
    ];
  });
}
