import { describe, expect, it } from 'vitest';
import { polylineOf } from '#shared/compute/geometry/polyline.ts';
import { countDrops } from '#shared/compute/net/count.ts';
import type { NetLine } from '#shared/compute/net/net-lines.ts';
import { PUBLISHED } from '#tests/support/published-checks.ts';

function lines(...typed: Array<{ head?: number; drops?: number }>): NetLine[] {
  return typed.map(({ head, drops }, i) => ({
    id: `line-${i + 1}`,
    kind: 'equipotential',
    shape: polylineOf([
      [i, 0],
      [i, 1],
    ])!,
    value: {
      kind: 'line',
      origin: 'traced',
      line: 'equipotential',
      name: '',
      points: [
        [i, 0],
        [i, 1],
      ],
      finished: true,
      water: null,
      head: head ?? null,
      drops: drops ?? null,
    },
  }));
}
const untyped = (count: number) => lines(...Array.from({ length: count }, () => ({})));
const dropsOf = (count: ReturnType<typeof countDrops>) => count.lines.map((line) => line.drops);

describe('counting drops', () => {
  it('makes n lines n + 1 drops: 11 lines with both boundaries are 10 drops', () => {
    const count = countDrops(untyped(9), 118, 98, 10);
    expect(dropsOf(count)).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9]);
    expect(count.lines[3]!.head).toBeCloseTo(110, 12);
    expect(count.headPerDrop).toBe(2);
  });

  it('gives the rises of the worked nets (published checks 8-01 Das, 8-06 Craig)', () => {
    const das = countDrops(untyped(5), 5.6, 2.2, 6);
    // The printed example mixes 5.6 and 5.61; its tolerance covers both.
    expect(Math.abs(das.lines[0]!.head - PUBLISHED['8-01'].rise_a)).toBeLessThan(0.012);
    expect(Math.abs(das.lines[4]!.head - PUBLISHED['8-01'].rise_b)).toBeLessThan(0.012);
    const craig = countDrops(untyped(11), 4, 0, 12);
    expect(craig.lines[1]!.head).toBeCloseTo(PUBLISHED['8-06'].head_after_2_of_12_drops, 8);
  });

  it('takes one drop without any line', () => {
    expect(countDrops([], 10, 8, 1).findings).toEqual([]);
    expect(countDrops([], 10, 8, 2).findings.map((found) => found.code)).toEqual(['countDisagrees']);
  });

  it('takes a part drop at the outlet but not in the middle', () => {
    expect(dropsOf(countDrops(untyped(9), 118, 98, 9.6))).toHaveLength(9);
    expect(countDrops(untyped(9), 118, 98, 8.9).findings).toHaveLength(1);
    expect(countDrops(lines({}, {}, { drops: 2.5 }), 118, 98, 4).findings).toHaveLength(1);
  });

  it('counts untyped lines between typed ones', () => {
    const count = countDrops(lines({}, { head: 114 }, {}, {}, { drops: 5 }), 118, 98, 10);
    expect(dropsOf(count)).toEqual([1, 2, 3, 4, 5]);
    expect(count.unequal).toBe(true);
  });

  it('reports typed heads that rise along the flow', () => {
    const count = countDrops(lines({ head: 112 }, { head: 114 }), 118, 98, 3);
    expect(count.findings.map((found) => found.code)).toEqual(['typedOutOfOrder']);
    expect(count.lines).toEqual([]);
  });

  it('keeps unequal heads as typed and counts their lines', () => {
    const count = countDrops(lines({ head: 115.1 }, { head: 108 }), 118, 98, 3);
    expect(count.lines.map((line) => line.head)).toEqual([115.1, 108]);
    expect(dropsOf(count)).toEqual([1, 2]);
    expect(count.unequal).toBe(true);
  });

  it('finds no loss when the outlet is as high as the headwater', () => {
    expect(countDrops(untyped(1), 100, 100, 2).findings.map((found) => found.code)).toEqual(['noHeadLost']);
  });
});
