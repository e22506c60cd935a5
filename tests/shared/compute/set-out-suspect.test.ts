import { describe, expect, it } from 'vitest';
import { normalTail, studentTail } from '#shared/compute/doubt/tails.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { suspectAmong } from '#shared/compute/set-out-suspect.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { type Known, known, sectionOf } from '#tests/support/known-points.ts';

/** Five points at 0.05 m a pixel, clicked within half a pixel or so. */
const FIVE = [
  known(100.3, 1400.2, 5, 100),
  known(2099.8, 1399.6, 105, 100),
  known(2100.4, 599.9, 105, 140),
  known(99.7, 600.3, 5, 140),
  known(1100.1, 1000.1, 55, 120, 'check'),
] as const;

function tested(points: readonly Known[], setOut: Parameters<typeof sectionOf>[1] = {}) {
  const document: FlowNetDocument = sectionOf([...points], setOut);
  const { map, reading, grounds } = readSetOut(document);
  return suspectAmong(document, {
    fit: {
      map: map!,
      along: reading.unitsPerPx!,
      up: reading.unitsPerPxUp!,
      rotation: (reading.rotationDeg! * Math.PI) / 180,
      mirrored: reading.offsetsGrowLeft!,
    },
    scales: setOut.scales ?? 'equal',
    turnFromSheet: grounds!.turnFromSheet,
  });
}

const spoiled = (i: number, by: Partial<Known>) =>
  FIVE.map((point, k) => (k === i ? { ...point, ...by } : point));

describe('the one known point that spoils a set-out', () => {
  it('cannot be told among three: more are asked for', () => {
    expect(tested(FIVE.slice(0, 3))).toEqual({ state: 'tooFew', more: 1 });
    expect(tested(FIVE.slice(0, 2))).toEqual({ state: 'tooFew', more: 3 });
  });

  it('is none where all agree', () => {
    expect(tested(FIVE)).toEqual({ state: 'none' });
    expect(readSetOut(sectionOf([...FIVE])).findings).toEqual([]);
  });

  it.each([0, 1, 2, 3, 4])('is found whichever it is: point %i with an elevation mistyped by 2 m', (i) => {
    const test = tested(spoiled(i, { elevation: FIVE[i]!.elevation! + 2 }));
    expect(test).toMatchObject({ state: 'suspect' });
    const { entityIds, text } = readSetOut(
      sectionOf(spoiled(i, { elevation: FIVE[i]!.elevation! + 2 })),
    ).findings.find(({ code }) => code === 'knownPointSuspect')!;
    expect(entityIds).toHaveLength(1);
    expect(text).toMatch(new RegExp(`^K${i + 1} alone spoils the fit`));
    // 2 m are 40 px.
    expect(test.state === 'suspect' && Math.abs(test.missPx - 40) < 3).toBe(true);
  });

  it('is none where two points are wrong, as then neither spoils it alone', () => {
    const two = spoiled(0, { elevation: 102 }).map((point, i) =>
      i === 1 ? { ...point, offset: 102 } : point,
    );
    expect(tested(two)).toEqual({ state: 'none' });
  });

  it('alarms seldom over clicks that scatter as stated', () => {
    // Nine points, each coordinate off by a normal error of 1 px at 95 %: a fixed run of 400 drawings.
    let state = 11;
    const uniform = () => {
      state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
      return (state + 1) / 4294967297;
    };
    const normal = () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
    let alarms = 0;
    for (let run = 0; run < 400; run += 1) {
      const points = Array.from({ length: 9 }, (_, k) => {
        const [x, y] = [200 + 900 * (k % 3), 300 + 500 * Math.floor(k / 3)];
        return known(x + normal() / 1.96, y + normal() / 1.96, x * 0.05, 100 - y * 0.05);
      });
      if (tested(points).state === 'suspect') alarms += 1;
    }
    expect(alarms).toBeLessThan(8);
  });

  it('may have one coordinate only, on a drawing of two scales', () => {
    const profile: Known[] = [
      ...[0, 1, 2, 3, 4].map((k): Known => ({ at: [200 + 500 * k, 1500], offset: 100 * k })),
      { at: [200, 300], offset: 0 },
      ...[0, 1, 2].flatMap((k): Known[] => [
        { at: [200, 1500 - 400 * k], elevation: 10 * k },
        { at: [2200, 1500 - 400 * k], elevation: 10 * k },
      ]),
    ];
    const two = { scales: 'plottingExaggeration' } as const;
    expect(tested(profile, two)).toEqual({ state: 'none' });
    const wrong = profile.map((point, i) => (i === 2 ? { ...point, offset: 210 } : point));
    const test = tested(wrong, two);
    // 10 m are 50 px; in theory w = 50 px times the root of its redundancy over the stated 1/1.96 px.
    expect(test.state === 'suspect' && Math.abs(test.missPx - 50) < 1e-6).toBe(true);
    expect(test.state === 'suspect' && test.w).toBeGreaterThan(30);
  });
});

describe('tails', () => {
  // Abramowitz and Stegun (1964), tables 26.1 and 26.10.
  it.each([
    [0, 1],
    [1.959964, 0.05],
    [3.290527, 0.001],
  ])('of the normal distribution beyond %f', (z, tail) => expect(normalTail(z)).toBeCloseTo(tail, 6));

  it.each([
    [12.706, 1, 0.05],
    [4.303, 2, 0.05],
    [3.182, 3, 0.05],
    [2.776, 4, 0.05],
    [4.604, 4, 0.01],
    [2.228, 10, 0.05],
    [2.947, 15, 0.01],
  ])('of Student’s t beyond %f with %i degrees of freedom', (t, nu, tail) =>
    expect(studentTail(t, nu)).toBeCloseTo(tail, 4),
  );
});
