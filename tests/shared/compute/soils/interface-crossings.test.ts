import { describe, expect, it } from 'vitest';
import { polylineOf } from '#shared/compute/geometry/polyline.ts';
import { withoutTremor } from '#shared/compute/geometry/tremor.ts';
import { interfaceCrossings } from '#shared/compute/soils/interface-crossings.ts';
import type { Soil, Tensor } from '#shared/compute/soils/soil-list.ts';
import { type SheetPoint, UNSAID } from '#shared/contract/document.ts';
import { seededNoise } from '#tests/support/exact-nets/seeded-noise.ts';
import { PUBLISHED } from '#tests/support/published-checks.ts';

function soil(label: string, k: number): Soil {
  const value = {
    kind: 'permeability' as const,
    ...UNSAID.soil,
    k,
    unit: 'm/s' as const,
    factor: null,
    source: '',
  };
  return { id: label, label, kh: k, kv: k, dipDeg: 0, places: [], value };
}

/** A level boundary at y = 500 between a soil above it and a tighter one below. */
const above = soil('above', 1e-5);
const below = soil('below', 1e-6);
const ground = {
  soilAt: (_x: number, y: number) => (y < 500 ? above : below),
  tensorOf: ({ kh }: Soil): Tensor => ({ xx: kh!, xy: 0, yy: kh! }),
  window: 250,
  accuracyPx: 1.5,
};
const boundary = {
  id: 'boundary',
  shape: polylineOf(Array.from({ length: 72 }, (_, i) => [i * 14, 500] as const))!,
};

/** A line that comes down at one angle from the normal and goes on at another, with the hand's tremor. */
function bent(beforeDeg: number, afterDeg: number, tremorPx: number, seed: number) {
  const noise = seededNoise(seed);
  const points = Array.from({ length: 43 }, (_, i): SheetPoint => {
    const by = (i - 21) * 14;
    const angle = ((by < 0 ? beforeDeg : afterDeg) * Math.PI) / 180;
    return [500 + by * Math.sin(angle) + tremorPx * noise(), 500 + by * Math.cos(angle) + tremorPx * noise()];
  });
  return polylineOf(withoutTremor(points, 1.5))!;
}

const crossingsOf = (shape: ReturnType<typeof bent>, isFlow = true) =>
  interfaceCrossings([{ id: 'line', isFlow, shape }], [boundary], ground);

describe('a line that passes from one soil to another', () => {
  it.each([0, 1.5])('bends as published (check 3-05, Harr 1962) with a tremor of %d px', (tremorPx) => {
    for (let seed = 1; seed <= 12; seed += 1) {
      const [crossing, ...others] = crossingsOf(bent(60, PUBLISHED['3-05'].alpha2, tremorPx, seed));
      expect(others).toEqual([]);
      expect(crossing!.from).toBe(above);
      expect(crossing!.to).toBe(below);
      expect(crossing!.departureDeg).toBeLessThan(Math.max(10, crossing!.toleranceDeg));
      if (tremorPx === 0) expect(crossing!.departureDeg).toBeLessThan(3);
    }
  });

  it('is told by how many degrees it departs where it goes straight on', () => {
    const [crossing] = crossingsOf(bent(60, 60, 0, 1));
    expect(crossing!.departureDeg).toBeCloseTo(60 - PUBLISHED['3-05'].alpha2, 1);
    expect(crossing!.at[1]).toBeCloseTo(500, 6);
    expect(crossing!.departureDeg).toBeGreaterThan(crossing!.toleranceDeg);
  });

  it('bends the other way where it is an equipotential', () => {
    const [crossing] = crossingsOf(bent(30, 90 - PUBLISHED['3-05'].alpha2, 0, 1), false);
    expect(crossing!.departureDeg).toBeLessThan(3);
    expect(crossingsOf(bent(30, 90 - PUBLISHED['3-05'].alpha2, 0, 1), true)[0]!.departureDeg).toBeGreaterThan(
      20,
    );
  });

  it('is not judged along a boundary between parts of one soil, nor where a permeability is missing', () => {
    const shape = bent(60, 10, 0, 1);
    const lines = [{ id: 'line', isFlow: true, shape }];
    expect(interfaceCrossings(lines, [boundary], { ...ground, soilAt: () => above })).toEqual([]);
    expect(interfaceCrossings(lines, [boundary], { ...ground, tensorOf: () => null })).toEqual([]);
  });
});
