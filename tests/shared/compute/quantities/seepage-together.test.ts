import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { commonFactor, type ReadNet, seepageTogether } from '#shared/compute/quantities/seepage-together.ts';

function net(change: Partial<ReadNet> = {}): ReadNet {
  return {
    netId: 'a',
    netName: 'Full supply',
    sectionId: 'section a',
    sectionName: 'A–A',
    chainage: '0',
    headwater: 30,
    tailwater: 5,
    seepage: 1e-6,
    factor: 2,
    figures: 2,
    tracedOnly: false,
    putAway: false,
    ...change,
  };
}
const a = net();
const b = net({ netId: 'b', sectionName: 'B–B', chainage: '100', seepage: 3e-6 });
const c = net({ netId: 'c', sectionName: 'C–C', chainage: '150', seepage: 1e-6 });
const codes = (nets: ReadNet[]) => seepageTogether(nets, 'SI').cautions.map(({ code }) => code);

describe('seepage from one net for each section', () => {
  it('has no total for none, for one, and where only one counts', () => {
    expect(seepageTogether([], 'SI')).toEqual({ chosen: [], reaches: [], total: null, cautions: [] });
    expect(seepageTogether([a], 'SI')).toMatchObject({ total: null, chosen: [{ leftOut: null }] });
    expect(seepageTogether([a, net({ ...b, putAway: true })], 'SI').total).toBeNull();
  });

  it('leaves out what was put away, has no seepage or no chainage, with the reason and a caution', () => {
    const found = seepageTogether(
      [
        net({ netId: 'e', chainage: 'axis' }),
        net({ netId: 'd', chainage: '50', seepage: null, factor: null }),
        net({ ...b, putAway: true }),
        c,
        a,
      ],
      'SI',
    );
    expect(found.chosen.map(({ netId, leftOut }) => [netId, leftOut?.code ?? null])).toEqual([
      ['a', null],
      ['d', 'noSeepage'],
      ['b', 'putAway'],
      ['c', null],
      ['e', 'chainageUnreadable'],
    ]);
    // By hand: ½(1 + 1)·10⁻⁶·150 m.
    expect(found.total?.flow).toBeCloseTo(1.5e-4, 12);
    expect(found.cautions).toEqual([{ code: 'leftOut', text: expect.stringContaining('without') }]);
  });

  it('adds the reaches by the average-end rule (by hand)', () => {
    const { total, reaches } = seepageTogether([c, a, b], 'SI');
    expect(reaches.map(({ from, to, flow }) => [from, to, Number(flow.toPrecision(9))])).toEqual([
      [0, 100, 2e-4],
      [100, 150, 1e-4],
    ]);
    expect(total).toMatchObject({ length: 150, factor: 2, figures: 2 });
    expect(total?.flow).toBeCloseTo(3e-4, 12);
  });

  it('reads the chainages of a dam in feet as feet', () => {
    const { total } = seepageTogether([a, net({ ...b, chainage: '1+00' })], 'US');
    expect(total?.length).toBeCloseTo(30.48, 9);
  });

  it('takes the greatest factor and the fewest figures, and no factor where one is missing', () => {
    expect(seepageTogether([a, net({ ...b, factor: 3, figures: 1 })], 'SI').total).toMatchObject({
      factor: 3,
      figures: 1,
    });
    const bare = seepageTogether([a, net({ ...b, factor: null })], 'SI');
    expect(bare.total?.factor).toBeNull();
    expect(bare.cautions).toMatchObject([{ code: 'noFactor', text: expect.stringContaining('Section B–B') }]);
  });

  it('keeps every sum of seepages that share their error within the common factor', () => {
    const sections = fc.array(
      fc.record({
        seepage: fc.double({ min: 1e-9, max: 1e-3, noNaN: true }),
        factor: fc.double({ min: 1, max: 20, noNaN: true }),
        weight: fc.double({ min: 0.1, max: 500, noNaN: true }),
      }),
      { minLength: 1, maxLength: 8 },
    );
    fc.assert(
      fc.property(sections, fc.double({ min: -1, max: 1, noNaN: true }), (nets, error) => {
        const sum = (of: (each: (typeof nets)[number]) => number) =>
          nets.reduce((total, each) => total + each.weight * of(each), 0);
        const ratio = sum(({ seepage, factor }) => seepage * factor ** error) / sum(({ seepage }) => seepage);
        const factor = commonFactor(nets) ?? Number.NaN;
        expect(Math.abs(Math.log(ratio))).toBeLessThanOrEqual(Math.log(factor) + 1e-9);
      }),
    );
  });
});

describe('cautions of a total', () => {
  it('are none for nets of one load case', () => {
    expect(codes([a, b, c])).toEqual([]);
  });

  it('tell headwaters and tailwaters that differ, in the length unit of the dam', () => {
    expect(seepageTogether([a, net({ ...b, headwater: 32.5 })], 'SI').cautions).toEqual([
      { code: 'headwatersDiffer', text: expect.stringContaining('30.00 to 32.50 m.') },
    ]);
    const inFeet = seepageTogether([a, net({ ...b, headwater: 30.48 })], 'US').cautions;
    expect(inFeet[0]?.text).toContain('98.43 to 100.00 ft.');
    expect(seepageTogether([a, net({ ...b, tailwater: null })], 'SI').cautions).toEqual([
      { code: 'tailwatersDiffer', text: expect.stringContaining('5.00 m and none.') },
    ]);
    expect(codes([a, net({ ...b, headwater: 30.004 })])).toEqual([]);
  });

  it('do not speak of the levels of a net that is left out', () => {
    expect(codes([a, b, net({ ...c, headwater: 40, seepage: null })])).toEqual(['leftOut']);
  });

  it('tell where only the traced channels count', () => {
    expect(seepageTogether([a, net({ ...b, tracedOnly: true })], 'SI').cautions).toMatchObject([
      { code: 'tracedOnly', text: expect.stringContaining('Section B–B') },
    ]);
  });
});
