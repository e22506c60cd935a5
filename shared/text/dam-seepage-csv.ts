import { FLOW_UNITS, flowIn } from '#shared/compute/quantities/seepage-volume.ts';
import { metresPerLengthUnit } from '#shared/compute/units.ts';
import type { DamSeepageDto } from '#shared/contract/dam-seepage.ts';
import { type CsvCell, csvText } from '#shared/text/csv.ts';
import type { DecimalMark } from '#shared/text/number-text.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';

type Table = ReadonlyArray<readonly CsvCell[]>;

/** Figures of a table that is worked on further: more than any of them means, and no noise of the last bit. */
const FIGURES = 12;

/**
 * Seepage over a length of dam as CSV: the chosen nets, then the reaches with their total in every unit on offer, then
 * the cautions, each a table after an empty line. Chainages, lengths and levels in the dam's length unit, the
 * seepage of a net in its unit system's. Where there is no figure the cell is empty and the remark says why.
 */
export function damSeepageCsv(found: DamSeepageDto, mark: DecimalMark = '.'): string {
  const tables = [netTable(found), reachTable(found), cautionTable(found)].filter(({ length }) => length > 1);
  return tables.map((table) => csvText(table, mark)).join('\r\n');
}

function netTable({ unitSystem, datum, chosen }: DamSeepageDto): Table {
  const units = unitNames(unitSystem);
  const metres = metresPerLengthUnit(unitSystem);
  const level = elevationUnit(unitSystem, datum);
  const length = (value: number | null) => full(value === null ? null : value / metres);
  return [
    [
      'Section',
      'Chainage as written',
      `Chainage, ${units.length}`,
      'Net',
      `Headwater, ${level}`,
      `Tailwater, ${level}`,
      `Seepage, ${units.seepage}`,
      'Factor (×/÷) at 95 %',
      'In the total',
      'Remark',
    ],
    ...chosen.map((net): CsvCell[] => [
      net.sectionName,
      net.chainage,
      length(net.chainageMetres),
      net.netName,
      length(net.headwater),
      length(net.tailwater),
      full(net.seepage === null ? null : net.seepage / metres ** 2),
      full(net.factor),
      net.leftOut === null ? 'yes' : 'no',
      net.leftOut?.text ?? (net.tracedOnly ? 'Traced channels only.' : ''),
    ]),
  ];
}

function reachTable({ unitSystem, reaches, total }: DamSeepageDto): Table {
  const { length } = unitNames(unitSystem);
  const metres = metresPerLengthUnit(unitSystem);
  const flows = (flow: number) => FLOW_UNITS.map((unit) => full(flowIn(unit, flow, 'SI')));
  return [
    [
      `From, ${length}`,
      `To, ${length}`,
      `Length, ${length}`,
      ...FLOW_UNITS.map((unit) => `Seepage, ${unit}`),
      'Factor (×/÷) at 95 %',
    ],
    ...reaches.map((reach): CsvCell[] => [
      ...[reach.from, reach.to, reach.length].map((value) => full(value / metres)),
      ...flows(reach.flow),
      null,
    ]),
    ...(total === null
      ? []
      : [['Total', null, full(total.length / metres), ...flows(total.flow), full(total.factor)]]),
  ];
}

const cautionTable = ({ cautions }: DamSeepageDto): Table => [
  ['To be known'],
  ...cautions.map(({ text }) => [text]),
];

const full = (value: number | null): number | null =>
  value === null ? null : Number(value.toPrecision(FIGURES));
