import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import { csvText } from '#shared/text/csv.ts';
import { scheduleCsv } from '#shared/text/schedule-csv.ts';
import { changed } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const { net, pxPerUnit } = EXACT_NETS[0]!;
const [offset, elevation] = net.placeAt(4, 0);
const document = exactNetDocument(net, {
  pxPerUnit,
  readings: [
    { at: net.placeAt(3.4, 1.5), clicked: true },
    { at: [offset, elevation + 3], clicked: false },
    { at: [0, 90], clicked: false },
  ],
});

describe('the schedule as CSV', () => {
  it('has its units in the heads and a row for each point', () => {
    const rows = scheduleCsv(document, readNet(document)).trimEnd().split('\r\n');
    expect(rows).toHaveLength(4);
    expect(rows[0]).toContain('"Elevation, m LD"');
    expect(rows[0]).toContain('"Pore pressure, kPa"');
    expect(rows[1]!.split(',')).toHaveLength(10);
  });

  it('exports the pressure above the phreatic line as 0 and says so', () => {
    const rows = scheduleCsv(document, readNet(document)).split('\r\n');
    const cells = rows[2]!.split(',');
    expect(cells[7]).toBe('0');
    expect(cells[4]).toBe('');
    expect(rows[2]).toContain('above the phreatic line, suction left out');
  });

  it('gives the reason where there is no figure', () => {
    const rows = scheduleCsv(document, readNet(document)).split('\r\n');
    expect(rows[3]).toMatch(/^P3,0,90,,,,,,,The point lies outside the traced net\./);
  });

  it('lets no name start a formula', () => {
    const named = changed(document, 'readingPoint', (value) => ({ ...value, name: '=1+1' }));
    expect(scheduleCsv(named, readNet(named)).split('\r\n')[1]).toMatch(/^'=1\+1,/);
  });
});

describe('CSV text', () => {
  it('never starts a text cell with what a spreadsheet runs, whatever the text', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary' }), (text) => {
        const cell = csvText([[text]]).replace(/^"/, '');
        expect(cell).not.toMatch(/^\s*[=+\-@]/);
      }),
    );
  });

  it('quotes commas, quotes and line ends, and writes numbers plainly', () => {
    expect(csvText([['a,b', 'say "x"', 'two\nlines', -24.5, null]])).toBe(
      '"a,b","say ""x""","two\nlines",-24.5,\r\n',
    );
  });
});
