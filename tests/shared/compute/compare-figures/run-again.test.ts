import { describe, expect, it } from 'vitest';
import { besideFrozen } from '#shared/compute/compare-figures/run-again.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { type FlowNetDocument, flowNetDocument } from '#shared/contract/document.ts';
import { upgradeDocument } from '#shared/contract/document-versions.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { completeReading } from '#shared/contract/reading-versions.ts';
import { firstDocument, firstReading } from '#tests/support/first-version/first-version.ts';

const document: FlowNetDocument = flowNetDocument.parse(upgradeDocument(firstDocument()));
const frozen = completeReading(firstReading()) as NetReading;
const now = readNet(document);

describe('a net frozen by the first engine, run again', () => {
  const again = besideFrozen(document, frozen, now);
  const figureOf = (name: string, what: string) =>
    again.groups.find((group) => group.name === name)?.figures.find((figure) => figure.what === what);

  it('sets each frozen figure beside the one of now, with the difference between them', () => {
    for (const [index, name] of ['P1', 'P2'].entries()) {
      const figure = figureOf(name, 'totalHead')!;
      expect(figure.one.value).toBe(firstReading().points[index]!.totalHead);
      expect(figure.other.value).toBe(now.points[index]!.totalHead);
      expect(figure.difference).toBe(figure.other.value! - figure.one.value!);
    }
  });

  it('leaves as they were the figures that the engines work out alike', () => {
    const net = again.groups.find(({ kind }) => kind === 'net')!;
    const alike = (what: string) => net.figures.find((figure) => figure.what === what)!.values;
    expect(['drops', 'channels', 'headLost', 'seepage'].map(alike)).toEqual(['same', 'same', 'same', 'same']);
  });

  it('shows what the first engine did not work out as missing then', () => {
    const shape = figureOf('', 'shapeFactor')!;
    // Nf/Nd of the three channels and ten drops frozen.
    expect(shape).toMatchObject({ one: { value: null }, values: 'differ', difference: null });
    expect(shape.other.value).toBeCloseTo(3 / 10, 9);
  });

  it('counts what differs and lists no input, as the inputs are the same', () => {
    const differing = again.groups.flatMap((group) =>
      group.figures.filter(({ values, plusMinuses }) => values === 'differ' || plusMinuses === 'differ'),
    );
    expect(again.counts.differ).toBe(differing.length);
    expect(differing.length).toBeGreaterThan(0);
    expect(again.counts.all).toBeGreaterThan(again.counts.differ);
    expect(again.groups.map(({ kind }) => kind)).not.toContain('levels');
  });

  it('changes neither the frozen document nor the frozen reading', () => {
    expect(document).toEqual(flowNetDocument.parse(upgradeDocument(firstDocument())));
    expect(frozen).toEqual(completeReading(firstReading()));
  });
});

describe('a net run again by the engine that froze it', () => {
  it('is equal in every figure, also when only bits differ that no page shows', () => {
    const twice = besideFrozen(document, now, structuredClone(now));
    expect(twice.counts).toMatchObject({ differ: 0, shown: 0 });
    expect(twice).toMatchObject({ newFindings: [], goneFindings: [] });
    const nearly = structuredClone(now);
    nearly.points[0]!.totalHead! += 1e-4 * (nearly.points[0]!.totalHead! % 0.01 > 0.005 ? -1 : 1);
    expect(besideFrozen(document, now, nearly).counts).toMatchObject({ differ: 0, shown: 1 });
  });

  it('finds again what lies between the same lines twice', () => {
    const heave = (factor: number) => ({
      wall: 'wall',
      outlet: 'bed',
      at: [0, 0] as [number, number],
      depth: 4,
      width: 2,
      meanExcessHead: 1,
      meanExcessHeadPlusMinus: null,
      factor,
      note: '',
    });
    const both = { ...now, stability: { heave: [heave(2), heave(3)], creep: null } };
    const groups = besideFrozen(document, both, both).groups.filter(({ kind }) => kind === 'heave');
    const factors = groups.map(({ figures }) => figures.find(({ what }) => what === 'heaveFactor'));
    expect(factors.map((each) => [each?.one.value, each?.other.value])).toEqual([
      [2, 2],
      [3, 3],
    ]);
  });

  it('says what is found now and what no more', () => {
    const finding = { ...now.findings[0]!, code: 'onlyThen', entityIds: ['b', 'a'] };
    const before = { ...now, findings: [...now.findings, finding] };
    const after = {
      ...now,
      findings: [...now.findings, { ...finding, entityIds: ['a', 'b'], text: 'Said anew.' }],
    };
    expect(besideFrozen(document, before, after)).toMatchObject({ newFindings: [], goneFindings: [] });
    expect(besideFrozen(document, before, now).goneFindings).toEqual([finding]);
    expect(besideFrozen(document, now, after).newFindings).toMatchObject([{ code: 'onlyThen' }]);
  });
});
