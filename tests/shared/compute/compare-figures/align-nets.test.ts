import { describe, expect, it } from 'vitest';
import { alignedWith } from '#shared/compute/compare-figures/align-nets.ts';
import { compareRevisions } from '#shared/compute/compare-revisions.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const { net, pxPerUnit } = EXACT_NETS[1]!;
const readings = [{ at: [9, 97.5] as const, clicked: true }];
const original = exactNetDocument(net, { pxPerUnit, readings });
const withReading = (document: FlowNetDocument) => ({ document, reading: readNet(document) });
const one = withReading(original);

/** The net as the product copies it for another load case: everything of it with a new id. */
function copied(change: (document: FlowNetDocument) => void = () => {}) {
  const document = structuredClone(original);
  document.entities = Object.fromEntries(
    Object.values(document.entities).map((entity) => {
      const id = entity.id.replace(/^01930000/, '01930001');
      return [id, { ...entity, id }];
    }),
  );
  change(document);
  return withReading(document);
}

describe('a net that was copied', () => {
  it('has everything of the other, so that nothing was changed', () => {
    const same = compareRevisions(one, alignedWith(one, copied()));
    expect(same).toMatchObject({ lines: [], points: [], inputs: [], quantities: [] });
  });

  it('without being matched would have nothing in common', () => {
    expect(compareRevisions(one, copied()).lines.length).toBeGreaterThan(10);
  });

  it('has a moved equipotential known by its drops, also without a name', () => {
    const moved = copied(({ entities }) => {
      const lines = Object.values(entities).flatMap(({ value }) =>
        value.kind === 'line' && value.line === 'equipotential' ? [value] : [],
      );
      for (const line of lines) line.name = '';
      const line = lines[3]!;
      line.points = line.points.map(([x, y]) => [x + 2, y]);
    });
    const { lines } = compareRevisions(one, alignedWith(one, moved));
    const shifted = lines.filter(({ movedPx }) => (movedPx ?? 0) > 0.05);
    expect(shifted).toHaveLength(1);
    // The fourth equipotential from the headwater.
    expect(shifted[0]!.drops).toBe(4);
    expect(shifted[0]!.movedPx!).toBeLessThanOrEqual(2 + 1e-9);
    expect(lines.every(({ change }) => change === 'changed')).toBe(true);
  });

  it('has its points by their names, and keeps what is new under its own id', () => {
    const other = copied();
    const aligned = alignedWith(one, other);
    expect(aligned.reading.points.map(({ id }) => id)).toEqual(one.reading.points.map(({ id }) => id));
    const extra = structuredClone(other);
    const [id, entity] = Object.entries(extra.document.entities).find(
      ([, { value }]) => value.kind === 'line' && value.line === 'flowLine',
    )!;
    const own = '01930009-0000-7000-8000-000000000001';
    const value = structuredClone(entity.value) as { points: Array<[number, number]>; name: string };
    value.name = 'A line of its own';
    value.points = value.points.map(([x, y]) => [x + 40, y + 3]);
    extra.document.entities[own] = { ...entity, id: own, value: value as never };
    expect(id).not.toBe(own);
    const { lines } = compareRevisions(one, alignedWith(one, extra));
    expect(lines).toMatchObject([{ id: own, change: 'added' }]);
  });

  it('changes nothing of what it is given', () => {
    const other = copied();
    const kept = structuredClone(other);
    alignedWith(one, other);
    expect(other).toEqual(kept);
  });
});
