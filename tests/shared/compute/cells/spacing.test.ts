import { describe, expect, it } from 'vitest';
import { PLAIN_FACTS } from '#shared/compute/cells/common-ratio.ts';
import { spacingOf } from '#shared/compute/cells/spacing.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { withLines } from '#tests/support/exact-nets/edit-net.ts';
import { cellsOfDocument } from '#tests/support/exact-nets/exact-cells.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const missingIn = (document: FlowNetDocument, facts = PLAIN_FACTS) => {
  const { model, net } = cellsOfDocument(document);
  return spacingOf(model, net, 1, facts);
};

const without = (document: FlowNetDocument, kind: 'equipotential' | 'flowLine', index: number) =>
  withLines(document, kind, (line, i) => (i === index ? null : line));

describe.each(EXACT_NETS)('spacing of the lines of an exact net: $name', ({ net, pxPerUnit }) => {
  const whole = exactNetDocument(net, { pxPerUnit, jitterPx: 1.5 });

  it('tells of no missing line when none is, with flow lines or without', () => {
    expect(missingIn(whole)).toEqual([]);
    expect(missingIn(withLines(whole, 'flowLine', () => null))).toEqual([]);
  });

  it('tells of any equipotential that is left out, with its neighbours and a factor of about two', () => {
    const ids = Object.values(whole.entities)
      .filter(({ value }) => value.kind === 'line' && value.line === 'equipotential')
      .map(({ id }) => id);
    for (let i = 1; i < ids.length - 1; i += 1) {
      const missing = missingIn(without(whole, 'equipotential', i));
      expect(missing).toHaveLength(1);
      expect(missing[0]!.kind).toBe('equipotential');
      expect(missing[0]!.between).toEqual([ids[i - 1], ids[i + 1]]);
      expect(missing[0]!.factor).toBeGreaterThan(1.7);
      expect(missing[0]!.factor).toBeLessThan(2.3);
    }
  });

  it('takes two drops typed between two lines for no missing line', () => {
    const gap = without(whole, 'equipotential', 2);
    const { model, net: cells } = cellsOfDocument(gap);
    const between = missingIn(gap)[0]!.between;
    const facts = {
      ...PLAIN_FACTS,
      dropsBetween: (before: string, after: string) =>
        before === between[0] && after === between[1] ? 2 : 1,
    };
    expect(spacingOf(model, cells, 1, facts)).toEqual([]);
  });

  it('tells of a flow line that is left out', () => {
    const missing = missingIn(without(whole, 'flowLine', net.channels > 3 ? 2 : 1));
    expect(missing).toHaveLength(1);
    expect(missing[0]!.kind).toBe('flowLine');
    expect(missing[0]!.factor).toBeGreaterThan(1.7);
    expect(missing[0]!.factor).toBeLessThan(2.3);
  });
});

it('tells of an equipotential left out of a bounded net without flow lines', () => {
  const { net, pxPerUnit } = EXACT_NETS[0]!;
  const bare = withLines(exactNetDocument(net, { pxPerUnit, jitterPx: 1.5 }), 'flowLine', () => null);
  for (const left of [2, 5, 7]) {
    const missing = missingIn(without(bare, 'equipotential', left));
    expect(missing).toHaveLength(1);
    expect(missing[0]!.factor).toBeCloseTo(2, 0);
  }
});

it('tells nothing of a net with two strips', () => {
  const { net, pxPerUnit } = EXACT_NETS[0]!;
  const short = withLines(exactNetDocument(net, { pxPerUnit }), 'equipotential', (line, i) =>
    i === 4 ? line : null,
  );
  expect(missingIn(short)).toEqual([]);
});
