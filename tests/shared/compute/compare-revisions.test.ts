import { describe, expect, it } from 'vitest';
import { compareRevisions, greatestDistance } from '#shared/compute/compare-revisions.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const [, apron] = EXACT_NETS as [(typeof EXACT_NETS)[number], (typeof EXACT_NETS)[number]];
const original = (): FlowNetDocument =>
  exactNetDocument(apron.net, {
    pxPerUnit: apron.pxPerUnit,
    readings: [
      { at: [0, 95], clicked: true },
      { at: [9, 97.5], clicked: true },
    ],
  });
const frozen = (document: FlowNetDocument) => ({ document, reading: readNet(document) });
const before = frozen(original());

/** The net after a change of its entities. */
function changed(change: (document: FlowNetDocument) => void) {
  const document = structuredClone(before.document);
  change(document);
  return compareRevisions(before, frozen(document));
}
const idOf = (document: FlowNetDocument, kind: string) =>
  Object.entries(document.entities).find(([, { value }]) => value.kind === kind)?.[0] ?? '';

describe('how far a line strays from another', () => {
  it('is nothing for a vertex added on a straight piece, and for the way in which it was drawn', () => {
    expect(
      greatestDistance(
        [
          [0, 0],
          [10, 0],
        ],
        [
          [10, 0],
          [4, 0],
          [0, 0],
        ],
      ),
    ).toBe(0);
  });

  it('is the greatest distance of either from the other', () => {
    expect(
      greatestDistance(
        [
          [0, 0],
          [10, 0],
        ],
        [
          [0, 0],
          [5, 3],
          [10, 0],
        ],
      ),
    ).toBe(3);
    expect(
      greatestDistance(
        [
          [0, 0],
          [10, 0],
        ],
        [
          [0, 0],
          [14, 0],
        ],
      ),
    ).toBe(4);
    expect(greatestDistance([[0, 0]], [[1, 1]])).toBeNull();
  });
});

describe('what changed from a revision to the next', () => {
  it('is nothing when nothing did; the figures stand side by side without a difference', () => {
    const same = changed(() => {});
    expect(same).toMatchObject({ lines: [], points: [], inputs: [], quantities: [] });
    expect(same.figures).toHaveLength(2);
    for (const { porePressure } of same.figures)
      expect(porePressure).toEqual({
        before: porePressure.after,
        after: porePressure.after,
        difference: 0,
      });
  });

  it('is a line that was moved, by how much on the sheet and in the section, with both courses', () => {
    const id = idOf(before.document, 'line');
    const { lines } = changed(({ entities }) => {
      const value = entities[id]!.value as { points: Array<[number, number]> };
      value.points = value.points.map(([x, y]) => [x + 3, y + 4]);
    });
    expect(lines).toHaveLength(1);
    const [line] = lines;
    expect(line).toMatchObject({ id, change: 'changed', facts: [] });
    // The whole line moved by 5 px, so no vertex strays farther than that, and its ends on a bent course do not less.
    expect(line!.movedPx!).toBeGreaterThan(0);
    expect(line!.movedPx!).toBeLessThanOrEqual(5 + 1e-9);
    expect(line!.moved!).toBeCloseTo(line!.movedPx! / apron.pxPerUnit, 9);
    expect(line!.before).not.toEqual(line!.after);
  });

  it('is a line taken away or added, and a typed head', () => {
    const id = idOf(before.document, 'line');
    const gone = changed(({ entities }) => delete entities[id]);
    const { drops } = before.reading.lines.find((line) => line.id === id)!;
    const { line } = before.document.entities[id]!.value as { line: string };
    const counted = line === 'equipotential' ? drops : null;
    expect(gone.lines).toMatchObject([{ id, change: 'removed', drops: counted, movedPx: null, after: [] }]);
    const added = changed(({ entities }) => {
      entities['019a3c00-0000-7000-8000-0000000000ff'] = structuredClone(entities[id]!);
    });
    expect(added.lines).toMatchObject([{ change: 'added', before: [] }]);
    const typed = changed(({ entities }) => {
      (entities[id]!.value as { head: number | null }).head = 101.25;
    });
    expect(typed.lines[0]?.facts).toContainEqual({ label: 'Head', before: null, after: 101.25 });
  });

  it('is the levels, the datum and the known points', () => {
    const known = idOf(before.document, 'knownPoint');
    const { inputs } = changed((document) => {
      document.datum = 'Another datum';
      const levels = document.entities[idOf(document, 'waterLevels')]!.value as { headwater: number };
      levels.headwater += 1;
      (document.entities[known]!.value as { elevation: number }).elevation += 0.5;
    });
    expect(inputs.map(({ label }) => label.replace(/ point .*/, ' point'))).toEqual([
      'Datum',
      'Headwater',
      'Known point',
    ]);
  });

  it('is a raised headwater in the pressures, by the part of the head that arrives at each point', () => {
    const { figures, quantities } = changed(({ entities }) => {
      const levels = entities[idOf(before.document, 'waterLevels')]!.value as { headwater: number };
      levels.headwater += 1;
    });
    expect(quantities.map(({ label }) => label)).toContain('Head lost');
    const drops = before.reading.quantities.drops!;
    figures.forEach(({ id, totalHead, porePressure }) => {
      const { dropsLost } = before.reading.points.find((point) => point.id === id)!;
      // h = Hw − n·(Hw − Ht)/Nd, so a metre more upstream arrives as 1 − n/Nd.
      expect(totalHead.difference!).toBeCloseTo(1 - dropsLost! / drops, 6);
      expect(porePressure.difference!).toBeCloseTo(9.81 * (1 - dropsLost! / drops), 5);
    });
  });

  it('is a point added or taken away, without a difference of figures', () => {
    const id = idOf(before.document, 'readingPoint');
    const { points, figures } = changed(({ entities }) => delete entities[id]);
    expect(points).toMatchObject([{ id, change: 'removed' }]);
    const gone = figures.find((each) => each.id === id)!;
    expect(gone.porePressure.before).not.toBeNull();
    expect(gone.porePressure).toMatchObject({ after: null, difference: null });
  });
});
