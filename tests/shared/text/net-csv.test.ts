import { expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import { entitiesOf } from '#shared/contract/document.ts';
import { netCsv } from '#shared/text/net-csv.ts';
import { scheduleCsv } from '#shared/text/schedule-csv.ts';
import { finishedDocument } from '#tests/support/net-fixture.ts';

const document = finishedDocument(1);
const reading = readNet(document);
/** The tables between empty lines, as rows of cells; no text of these has a comma within quotes at its start. */
const tablesOf = (csv: string) => csv.split('\r\n\r\n').map((table) => table.trimEnd().split('\r\n'));
const table = (csv: string, head: string) =>
  tablesOf(csv).find(([first]) => first?.startsWith(`${head},`)) ?? [];

it('an unfinished net has its findings and its state, and no figure of seepage', () => {
  const empty = { ...document, entities: {} };
  const csv = netCsv(empty, readNet(empty));
  expect(table(csv, 'Quantity')).toEqual(
    expect.arrayContaining([
      'State of the net,unfinished,,,',
      expect.stringMatching(/^Seepage,,m³\/s per m,/),
    ]),
  );
  expect(table(csv, 'Finding').length).toBeGreaterThan(1);
  expect(table(csv, 'Outlet')).toEqual([]);
});

it('a net has schedule, quantities, outlets and check, each with its head', () => {
  const csv = netCsv(document, reading);
  expect(csv.startsWith(`${scheduleCsv(document, reading)}\r\n`)).toBe(true);
  expect(table(csv, 'Outlet')).toHaveLength(1 + reading.quantities.outlets.length);
  expect(table(csv, 'Net check')).toHaveLength(2 + reading.netCheck!.faults.length);
});

it('quantities are given to 12 significant figures', () => {
  const row = table(netCsv(document, reading), 'Quantity').find((line) => line.startsWith('Head lost,'))!;
  const printed = Number(row.split(',')[1]);
  expect(Math.abs(printed / reading.quantities.headLost! - 1)).toBeLessThan(1e-11);
});

it('what was measured has columns in the schedule where anything was, and none where nothing was', () => {
  expect(scheduleCsv(document, reading)).not.toContain('Measured');
  const point = entitiesOf(document, 'readingPoint')[0]!;
  const value = { ...point.value, measured: { value: 9, as: 'totalHead' as const, plusMinus: null, on: '' } };
  const measured = { ...document, entities: { ...document.entities, [point.id]: { ...point, value } } };
  const lines = scheduleCsv(measured, readNet(measured)).trimEnd().split('\r\n');
  expect(lines[0]).toMatch(/,"?Measured head, m.*,"?Measured − net, m/);
  expect(lines[1]).toMatch(/,9,,-?[\d.]+,[\d.]+$/);
});
