import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { randomReadings } from '#tests/support/exact-nets/random-readings.ts';
import { seededRandom } from '#tests/support/exact-nets/seeded-noise.ts';

/** An end moved along the line, outwards for a positive distance in pixels. */
function moveEnd(end: SheetPoint, before: SheetPoint, distance: number): SheetPoint {
  const length = Math.hypot(end[0] - before[0], end[1] - before[1]);
  return [
    end[0] + ((end[0] - before[0]) * distance) / length,
    end[1] + ((end[1] - before[1]) * distance) / length,
  ];
}

/** Every line stops short of or runs past its boundary by up to `gapPx`, and some are drawn the other way round. */
function traceCarelessly(document: FlowNetDocument, gapPx: number, seed: number): FlowNetDocument {
  const random = seededRandom(seed);
  const careless = structuredClone(document);
  for (const { value } of Object.values(careless.entities)) {
    if (value.kind !== 'line') continue;
    const points = value.points.filter((_, i) => i === 0 || i === value.points.length - 1 || i % 3 === 0);
    const last = points.length - 1;
    points[0] = moveEnd(points[0]!, points[1]!, (2 * random() - 1) * gapPx);
    points[last] = moveEnd(points[last]!, points[last - 1]!, (2 * random() - 1) * gapPx);
    value.points = random() < 0.5 ? points : points.reverse();
  }
  return careless;
}

/**
 * A basic parabola once read 5 drops wrong here, with no word of warning: its base stopped short of the upstream
 * face, and the first strip was closed the long way round, along a flow line and back along the base.
 */
describe.each(EXACT_NETS)('a carelessly traced net: $name', ({ net, pxPerUnit }) => {
  const readings = randomReadings(net, 60, 23, 0.1);
  const document = exactNetDocument(net, { pxPerUnit, readings, jitterPx: 1.5 });
  const drop = (net.headwater - net.outHead) / net.drops;

  // Beyond 45 px the gaps outgrow the cells at the floor's edges: then it is another net, not a careless one.
  it.each([4, 12, 25, 45])('with gaps of up to %i px is read right or not at all', (gapPx) => {
    for (let seed = 1; seed <= 12; seed += 1) {
      const reading = readNet(traceCarelessly(document, gapPx, seed));
      reading.points.forEach((point, i) => {
        if (point.totalHead === null) return;
        const error = Math.abs(point.totalHead - net.headAt(...readings[i]!.at)) / drop;
        // Where a wall ends some 45 px short, field and hand part, and the point is questioned.
        const isQuestioned = point.findings.some(({ code }) => code === 'rulesDiffer');
        expect(error, `seed ${seed}, ${point.name}: ${point.explanation}`).toBeLessThan(
          isQuestioned ? 0.6 : 0.35,
        );
      });
    }
  });

  it('with gaps of up to 4 px is read at every point', () => {
    for (let seed = 1; seed <= 12; seed += 1) {
      const { state, points } = readNet(traceCarelessly(document, 4, seed));
      expect(state).toBe('read');
      expect(points.filter((point) => point.status !== 'read')).toEqual([]);
    }
  });
});
