import { describe, expect, it } from 'vitest';
import { paths } from '#client/lib/paths.ts';
import { compareCautions, haveSameDatum } from '#client/pages/compare/compare-cautions.ts';
import { type ComparedNet, namedApart } from '#client/pages/compare/compared-net.ts';
import { parseSide } from '#client/pages/compare/parse-side.ts';
import { compareText } from '#client/text/compare.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const text = compareText.cautions;
const { net, pxPerUnit } = EXACT_NETS[1]!;
const document = exactNetDocument(net, { pxPerUnit, readings: [{ at: [9, 97.5], clicked: true }] });
const reading = readNet(document);

function compared(id: string, change: Partial<ComparedNet> = {}): ComparedNet {
  return {
    side: { kind: 'net', id },
    netId: id,
    damId: 'dam',
    name: `Net ${id}`,
    netName: `Net ${id}`,
    state: 'Draft',
    section: { id: 'section', name: 'B–B', chainage: '212' },
    drawing: { id: 'drawing', number: 'HF-114', revision: '', title: '' },
    sheet: { id: 'sheet' } as ComparedNet['sheet'],
    frame: null,
    document,
    reading,
    engineVersion: '3',
    ...change,
  };
}
const inDatum = (datum: string): Partial<ComparedNet> => ({ document: { ...document, datum } });
const one = compared('a');

describe('what has to be known before two nets are compared', () => {
  it('is nothing for two nets of one section by one engine', () => {
    expect(compareCautions(one, compared('b'))).toEqual([]);
  });

  it('is that both are the same', () => {
    expect(compareCautions(one, compared('a'))).toEqual([text.same]);
  });

  it('is another datum, above which levels are not subtracted; spelling alone is none', () => {
    const other = compared('b', inDatum('Ordnance datum'));
    expect(haveSameDatum(one, other)).toBe(false);
    expect(compareCautions(one, other)).toEqual([text.datums('LD', 'Ordnance datum')]);
    expect(compareCautions(one, compared('b', inDatum(' ld ')))).toEqual([]);
  });

  it('is a datum that one of the two does not name', () => {
    const other = compared('b', inDatum(''));
    expect(haveSameDatum(one, other)).toBe(true);
    expect(compareCautions(one, other)).toEqual([text.datumMissing]);
  });

  it('is another section on another drawing, another engine, an unfinished net', () => {
    const other = compared('b', {
      section: { ...one.section, id: 'another' },
      drawing: { ...one.drawing, id: 'another' },
      sheet: { id: 'another' } as ComparedNet['sheet'],
      engineVersion: '1',
      reading: { ...reading, state: 'unfinished' },
    });
    expect(compareCautions(one, other)).toEqual([
      text.unfinished('Net b'),
      text.sections,
      text.drawings,
      text.engines('3', '1'),
    ]);
  });

  it('is a section that is drawn the other way round, and one that is set out otherwise', () => {
    const { setOut } = reading;
    const turned = {
      ...setOut,
      offsetsGrowLeft: !setOut.offsetsGrowLeft,
      unitsPerPx: 2 * setOut.unitsPerPx!,
    };
    expect(compareCautions(one, compared('b', { reading: { ...reading, setOut: turned } }))).toEqual([
      text.setOut,
      text.opposite,
    ]);
  });

  it('is a name that two points of one net share', () => {
    const points = [...reading.points, { ...reading.points[0]!, id: 'second' }];
    expect(compareCautions(one, compared('b', { reading: { ...reading, points } }))).toEqual([
      text.sharedNames('P1'),
    ]);
  });
});

describe('the names of both', () => {
  const names = (change: Partial<ComparedNet>) =>
    namedApart(one, compared('b', { name: one.name, ...change })).map(({ name }) => name);

  it('are told apart by the section, else by their side', () => {
    expect(names({ name: 'Flood level' })).toEqual(['Net a', 'Flood level']);
    expect(names({ section: { ...one.section, id: 'c', name: 'C–C' } })).toEqual([
      'Section B–B, Net a',
      'Section C–C, Net a',
    ]);
    expect(names({})).toEqual(['First: Net a', 'Second: Net a']);
  });
});

describe('the address', () => {
  const id = '019a3c00-0000-7000-8000-00000000001e';

  it('names both sides, and is read back', () => {
    const address = paths.compare('dam', { kind: 'net', id }, { kind: 'revision', id });
    const search = new URL(address, 'http://localhost').searchParams;
    expect(parseSide(search.get('one'))).toEqual({ kind: 'net', id });
    expect(parseSide(search.get('other'))).toEqual({ kind: 'revision', id });
    expect(paths.compare('dam')).toBe('/dams/dam/compare');
  });

  it('of anything else names no side', () => {
    for (const named of [null, '', id, `drawing:${id}`, 'net:', 'net:../people'])
      expect(parseSide(named)).toBeNull();
  });
});
