import { describe, expect, it } from 'vitest';
import { beforeSending } from '#shared/compute/before-sending.ts';
import { readNet } from '#shared/compute/read-net.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const [, apron] = EXACT_NETS as [(typeof EXACT_NETS)[number], (typeof EXACT_NETS)[number]];

/** An exact net with points at places of the section, in which everything that is asked for is said. */
function saidInFull(...places: Array<[number, number]>): FlowNetDocument {
  const document = exactNetDocument(apron.net, {
    pxPerUnit: apron.pxPerUnit,
    readings: places.map((at) => ({ at, clicked: true })),
  });
  for (const { value } of Object.values(document.entities)) {
    if (value.kind === 'waterLevels') value.source = 'Gauge';
    if (value.kind === 'permeability') Object.assign(value, { k: 1e-6, factor: 3, source: 'Pumping test' });
  }
  return { ...document, datum: 'Local datum' };
}
const openOf = (document: FlowNetDocument, notes: number[] = []) =>
  beforeSending(document, readNet(document), notes);
const keysOf = (document: FlowNetDocument, notes: number[] = []) =>
  openOf(document, notes).map(({ key }) => key);
const GOOD: Array<[number, number]> = [
  [0, 95],
  [9, 97.5],
];

describe('what is open before a net is sent', () => {
  it('is nothing on an exact net with everything said', () => {
    expect(openOf(saidInFull(...GOOD))).toEqual([]);
  });

  it('is the scale where two known points give it and none checks it', () => {
    const document = saidInFull(...GOOD);
    const known = Object.entries(document.entities).filter(([, { value }]) => value.kind === 'knownPoint');
    expect(known.length).toBeGreaterThan(2);
    for (const [id] of known.slice(2)) delete document.entities[id];
    expect(keysOf(document)).toEqual(['scaleUnchecked']);
  });

  it('is the name of the datum, the sources and the permeability that are not given', () => {
    const document = { ...saidInFull(...GOOD), datum: ' ' };
    for (const { value } of Object.values(document.entities)) {
      if (value.kind === 'waterLevels') value.source = '';
      if (value.kind === 'permeability') value.source = '';
    }
    expect(keysOf(document)).toEqual(['noDatum', 'levelsWithoutSource', 'permeabilityWithoutSource']);
    for (const { value } of Object.values(document.entities))
      if (value.kind === 'permeability') value.k = null;
    expect(keysOf(document)).toContain('noPermeability');
  });

  it('is each point without a figure, by its name, and that there is no point at all', () => {
    const open = openOf(saidInFull([0, 95], [0, 101])).filter(({ about }) => about === 'points');
    expect(open).toHaveLength(1);
    expect(open[0]?.text).toMatch(/^P2: .*outside/);
    expect(keysOf(saidInFull())).toContain('noReadingPoints');
  });

  it('is a point whose ± of the total head passes half a drop', () => {
    const document = saidInFull(...GOOD);
    const reading = readNet(document);
    const half = reading.quantities.headPerDrop! / 2;
    const [point] = reading.points;
    const keys = (plusMinus: number) => {
      const points = [{ ...point!, totalHeadPlusMinus: plusMinus }];
      return beforeSending(document, { ...reading, points }, []).map(({ key }) => key);
    };
    expect(keys(half * 1.01)).toContain(`pointInDoubt ${point!.id}`);
    expect(keys(half * 0.99)).not.toContain(`pointInDoubt ${point!.id}`);
  });

  it('is what the net check and the reading question, under keys that differ', () => {
    const document = saidInFull(...GOOD);
    const reading = readNet(document);
    const crossings = {
      code: 'anglesNotSquare',
      weight: 'question' as const,
      text: '3 of 20 crossings are off square.',
      cell: 'netCheck' as const,
      entityIds: ['a', 'b', 'c', 'd'],
      at: null,
    };
    const note = { ...crossings, weight: 'note' as const, code: 'permeabilityMissing' };
    const open = beforeSending(document, { ...reading, findings: [crossings, crossings, note] }, []);
    expect(open.filter(({ about }) => about === 'net')).toEqual([
      { key: 'anglesNotSquare a b c +1', about: 'net', text: crossings.text },
      { key: 'anglesNotSquare a b c +1 #2', about: 'net', text: crossings.text },
    ]);
  });

  it('is the notes that are not closed; a further note asks for a new reason', () => {
    const document = saidInFull(...GOOD);
    const [one] = openOf(document, [3]).filter(({ about }) => about === 'notes');
    const [two] = openOf(document, [3, 5]).filter(({ about }) => about === 'notes');
    expect([one?.text, two?.text]).toEqual(['Note 3 is not closed.', '2 notes are not closed: 3, 5.']);
    expect(one?.key).not.toBe(two?.key);
  });
});
