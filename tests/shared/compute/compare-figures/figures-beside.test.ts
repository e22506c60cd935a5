import { describe, expect, it } from 'vitest';
import type { Figure, FigureGroup } from '#shared/compute/compare-figures/figure-types.ts';
import { figuresBeside } from '#shared/compute/compare-figures/figures-beside.ts';
import { figuresIn } from '#shared/compute/compare-figures/figures-in.ts';
import { figuresOf } from '#shared/compute/compare-figures/net-figures.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { exactNetDocument, type Tracing } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const SI = { unitSystem: 'SI', sameDatum: true } as const;

const head = (value: number | null, plusMinus: number | null = null): Figure => ({
  what: 'totalHead',
  quantity: 'totalHead',
  value,
  plusMinus,
  digits: null,
});
const point = (id: string, name: string, ...figures: Figure[]): FigureGroup => ({
  kind: 'point',
  id,
  name,
  status: 'read',
  reason: '',
  figures,
});

describe('two figures beside one another', () => {
  const likeness = (a: number | null, b: number | null) =>
    figuresBeside([point('a', 'P1', head(a))], [point('a', 'P1', head(b))], SI)[0]!.figures[0]!;

  it('differ when only one is there', () => {
    expect(likeness(null, null)).toMatchObject({ values: 'none', difference: null });
    expect(likeness(12, null)).toMatchObject({ values: 'differ', difference: null });
  });

  it('are the same but for the last bits, equal as shown, or different', () => {
    expect(likeness(0.1 + 0.2, 0.3).values).toBe('same');
    expect(likeness(112.341, 112.344)).toMatchObject({ values: 'shown' });
    expect(likeness(112.344, 112.346)).toMatchObject({ values: 'differ' });
    expect(likeness(112.25, 112.75).difference).toBeCloseTo(0.5, 12);
  });

  it('have a ± each, which is compared by itself', () => {
    const [group] = figuresBeside([point('a', 'P1', head(5, 0.1))], [point('a', 'P1', head(5, 0.4))], SI);
    expect(group!.figures[0]).toMatchObject({ values: 'same', plusMinuses: 'differ' });
  });

  it('are levels above two datums, which are not subtracted, while pressures are', () => {
    const pressure: Figure = { ...head(60), what: 'porePressure', quantity: 'pressure' };
    const one = [point('a', 'P1', head(110), pressure)];
    const other = [point('b', 'P1', head(98), { ...pressure, value: 50 })];
    const [group] = figuresBeside(one, other, { unitSystem: 'SI', sameDatum: false });
    expect(group!.figures.map(({ difference }) => difference)).toEqual([null, -10]);
  });
});

describe('which point belongs to which', () => {
  const pairs = (one: FigureGroup[], other: FigureGroup[]) =>
    figuresBeside(one, other, SI).map((group) => [group.one?.id ?? null, group.other?.id ?? null]);

  it('is said by the id first, whatever the names, then by the name', () => {
    expect(pairs([point('a', 'P1'), point('b', 'P2')], [point('a', 'P2'), point('c', ' p2 ')])).toEqual([
      ['a', 'a'],
      ['b', 'c'],
    ]);
  });

  it('is not said by a name that two points share, nor by none', () => {
    expect(pairs([point('a', 'P1')], [point('c', 'P1'), point('d', 'P1')])).toEqual([
      ['a', null],
      [null, 'c'],
      [null, 'd'],
    ]);
    expect(pairs([point('a', '')], [point('c', '')])).toEqual([
      ['a', null],
      [null, 'c'],
    ]);
  });
});

describe('figures in the other units', () => {
  it('follow the tables of NIST SP 811 (2008), App. B', () => {
    const of = (quantity: Figure['quantity'], value: number) =>
      figuresIn('US', 'SI', [point('a', '', { ...head(value, value), quantity })])[0]!.figures[0]!;
    // 1 m = 3.280 840 ft; 1 kPa = 20.885 43 lb/ft²; 1 kN/m³ = 6.365 880 lb/ft³; 1 kN/m = 68.521 77 lb/ft.
    expect(of('totalHead', 1)).toMatchObject({ value: expect.closeTo(3.28084, 5) });
    expect(of('pressure', 1)).toMatchObject({ value: expect.closeTo(20.88543, 5) });
    expect(of('unitWeight', 1)).toMatchObject({ value: expect.closeTo(6.36588, 5) });
    expect(of('force', 1)).toMatchObject({ value: expect.closeTo(68.52177, 5) });
    expect(of('seepage', 1)).toMatchObject({ plusMinus: expect.closeTo(10.76391, 5) });
    expect(of('permeability', 1)).toMatchObject({ value: expect.closeTo(3.28084, 5) });
    expect(of('drops', 7)).toMatchObject({ value: 7, plusMinus: 7 });
  });

  it('are the same net traced in metres and in feet, to the last digit shown', () => {
    const { net, pxPerUnit } = EXACT_NETS[1]!;
    const drawn = (tracing: Tracing) => {
      const readings = [{ at: [9, 97.5] as const, clicked: true }];
      const document = exactNetDocument(net, { readings, ...tracing });
      const groups = figuresOf({ document, reading: readNet(document) });
      return figuresIn('SI', document.unitSystem, groups);
    };
    const metres = drawn({ pxPerUnit });
    const feet = drawn({
      pxPerUnit: pxPerUnit * 0.3048,
      unitSystem: 'US',
      lengthFactor: 1 / 0.3048,
      gammaW: 9.81 / 0.157087463,
    });
    const beside = figuresBeside(metres, feet, SI);
    const seen = beside.filter(({ kind }) => kind === 'point' || kind === 'net');
    expect(seen.length).toBe(2);
    const apart = seen
      .flatMap(({ figures }) => figures)
      .filter(({ values, plusMinuses }) => values === 'differ' || plusMinuses === 'differ');
    expect(apart.map(({ what }) => what)).toEqual([]);
  });
});
