import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import { type CsvCell, csvText } from '#shared/text/csv.ts';
import { scheduleCsv } from '#shared/text/schedule-csv.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';

type Frame = Pick<FlowNetDocument, 'unitSystem' | 'datum'>;
type Table = ReadonlyArray<readonly CsvCell[]>;

/** Figures of a table that is worked on further: more than any of them means, and no noise of the last bit. */
const FIGURES = 12;

/**
 * A whole reading as CSV: the schedule, then the quantities, the outlets, the net check and what was found, each a
 * table with a head of its own after an empty line. Quantities in full (12 significant figures), the schedule rounded
 * as it is elsewhere. Units stand in the heads or in a column of their own.
 */
export function netCsv(document: Frame, reading: NetReading): string {
  const tables: Table[] = [
    quantityTable(document, reading),
    outletTable(document, reading),
    checkTable(document, reading),
    findingTable(reading),
  ].filter((table) => table.length > 1);
  return [scheduleCsv(document, reading), ...tables.map((table) => csvText(table))].join('\r\n');
}

function quantityTable({ unitSystem }: Frame, { quantities, doubt, state }: NetReading): Table {
  const units = unitNames(unitSystem);
  const { length } = units;
  const { channels, channelsComplete } = quantities;
  return [
    ['Quantity', 'Value', 'Unit', '± at 95 %', 'Factor (×/÷) at 95 %'],
    ['State of the net', state, null, null, null],
    ['Drops Nd', full(quantities.drops), null, null, null],
    [channelsComplete ? 'Channels Nf' : 'Channels Nf, traced only', full(channels), null, null, null],
    ['Shape factor Nf/Nd', full(quantities.shapeFactor), null, null, null],
    ['Head lost', full(quantities.headLost), length, full(doubt.headLost), null],
    ['Head per drop', full(quantities.headPerDrop), length, full(doubt.headPerDrop), null],
    ['Seepage', full(quantities.seepage), units.seepage, null, full(doubt.seepageFactor)],
    ['Unit weight of water', full(quantities.gammaW), units.unitWeight, null, null],
  ];
}

function outletTable({ unitSystem, datum }: Frame, { quantities }: NetReading): Table {
  const units = unitNames(unitSystem);
  return [
    [
      'Outlet',
      `Head, ${elevationUnit(unitSystem, datum)}`,
      `Head lost, ${units.length}`,
      'Drops',
      'Channels',
      `Seepage, ${units.seepage}`,
    ],
    ...quantities.outlets.map(({ label, head, headLost, drops, channels, seepage }) => [
      label,
      ...[head, headLost, drops, channels, seepage].map(full),
    ]),
  ];
}

/** What the check of the drawing found poor, the greatest effect first. */
function checkTable({ unitSystem }: Frame, { netCheck }: NetReading): Table {
  const { length, pressure } = unitNames(unitSystem);
  return [
    ['Net check', 'x, px', 'y, px', 'Effect, drops', `Effect, ${length}`, `Effect, ${pressure}`],
    ...(netCheck === null ? [] : [[netCheck.summary.text, null, null, null, null, null]]),
    ...(netCheck?.faults ?? []).map(({ text, at, effect }) => [
      text,
      ...[at[0], at[1], effect.drops, effect.head, effect.pressure].map(full),
    ]),
  ];
}

function findingTable({ findings }: NetReading): Table {
  return [
    ['Finding', 'Weight', 'Code', 'x, px', 'y, px'],
    ...findings.map(({ text, weight, code, at }) => [
      text,
      weight,
      code,
      full(at?.[0] ?? null),
      full(at?.[1] ?? null),
    ]),
  ];
}

const full = (value: number | null): number | null =>
  value === null ? null : Number(value.toPrecision(FIGURES));
