import { describe, expect, it } from 'vitest';
import { flatApronNet } from '#shared/compute/exact/flat-apron-net.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { DocumentEntity, FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { seededNoise } from '#tests/support/exact-nets/seeded-noise.ts';

const HALF = {
  knownPx: 6,
  tracingPx: 4,
  headwater: 0.25,
  tailwater: 0.15,
  gammaW: 0.08,
  tip: 0.2,
};
/** Half-widths hold 95 % of a normal distribution. */
const DEVIATION = 1 / 1.96;
const RUNS = 180;

function document(): FlowNetDocument {
  const net = flatApronNet({
    width: 20,
    headwater: 106,
    tailwater: 100,
    drops: 6,
    channels: 3,
    middle: [0, 98],
  });
  const readings = [
    { at: net.placeAt(1.5, 1.4), clicked: true },
    { at: net.placeAt(4.3, 0.8), clicked: true },
    { at: net.placeAt(2.4, 1.6), clicked: false },
    { at: net.placeAt(5.2, 1.1), clicked: false },
  ];
  const traced = exactNetDocument(net, { pxPerUnit: 55, spacingPx: 40, readings });
  return withValues(traced, (value) => {
    if (value.kind === 'waterLevels') {
      return {
        ...value,
        headwaterPlusMinus: HALF.headwater,
        tailwaterPlusMinus: HALF.tailwater,
        gammaWPlusMinus: HALF.gammaW,
      };
    }
    if (value.kind === 'netCount') {
      return { ...value, tracingAccuracyPx: HALF.tracingPx, knownPointAccuracyPx: HALF.knownPx };
    }
    if (value.kind === 'readingPoint' && value.place.on === 'section') {
      return { ...value, elevationPlusMinus: HALF.tip };
    }
    return value;
  });
}

function withValues(of: FlowNetDocument, change: (value: DocumentEntity) => DocumentEntity): FlowNetDocument {
  const entities = Object.values(of.entities).map((entity) => [
    entity.id,
    { ...entity, value: change(entity.value) },
  ]);
  return { ...of, entities: Object.fromEntries(entities) };
}

/** The document with every doubtful input drawn anew from its distribution. */
function drawn(of: FlowNetDocument, noise: () => number): FlowNetDocument {
  const off = (half: number) => half * DEVIATION * noise();
  const moved = ([x, y]: SheetPoint, half: number): SheetPoint => [x + off(half), y + off(half)];
  return withValues(of, (value) => {
    switch (value.kind) {
      case 'knownPoint':
        return { ...value, at: moved(value.at, HALF.knownPx) };
      case 'line':
        return { ...value, points: shiftedAcross(value.points, off(HALF.tracingPx)) };
      case 'waterLevels':
        return {
          ...value,
          headwater: value.headwater! + off(HALF.headwater),
          tailwater: value.tailwater! + off(HALF.tailwater),
          gammaW: value.gammaW + off(HALF.gammaW),
        };
      case 'readingPoint':
        return value.place.on === 'sheet'
          ? { ...value, place: { on: 'sheet', at: moved(value.place.at, HALF.tracingPx) } }
          : { ...value, place: { ...value.place, elevation: value.place.elevation + off(HALF.tip) } };
      default:
        return value;
    }
  });
}

/** A line that is off by one amount all along. */
function shiftedAcross(points: readonly SheetPoint[], by: number): SheetPoint[] {
  return points.map((at, i) => {
    const before = points[Math.max(0, i - 1)]!;
    const after = points[Math.min(points.length - 1, i + 1)]!;
    const [dx, dy] = [after[0] - before[0], after[1] - before[1]];
    const length = Math.hypot(dx, dy) || 1;
    return [at[0] - (by * dy) / length, at[1] + (by * dx) / length];
  });
}

// Propagation of distributions by a Monte Carlo method after JCGM 101 (2008), 7: the half-width of first order must be
// that of the drawn results. With 180 runs a standard deviation is itself known within 10 % at 95 %.
describe('the ± of first order is that of a Monte Carlo run', () => {
  const of = document();
  const first = readNet(of);
  const noise = seededNoise(7);
  const runs = Array.from({ length: RUNS }, () => readNet(drawn(of, noise)).points);

  it.each([0, 1, 2, 3])('for point %d', (i) => {
    const point = first.points[i]!;
    expect(point.status).toBe('read');
    const results = runs.map((points) => points[i]!).filter(({ status }) => status === 'read');
    expect(results.length).toBeGreaterThan(0.95 * RUNS);
    const half = (of_: (result: (typeof results)[number]) => number) => 1.96 * deviationOf(results.map(of_));
    const ratios = [
      point.totalHeadPlusMinus! / half((result) => result.totalHead!),
      point.porePressurePlusMinus! / half((result) => result.porePressure!),
    ];
    for (const ratio of ratios) {
      expect(ratio).toBeGreaterThan(0.8);
      expect(ratio).toBeLessThan(1.25);
    }
  });
});

function deviationOf(values: readonly number[]): number {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  return Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (values.length - 1));
}
