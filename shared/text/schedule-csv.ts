import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading, PointReading } from '#shared/contract/reading.ts';
import { type CsvCell, csvText } from '#shared/text/csv.ts';
import type { DecimalMark } from '#shared/text/number-text.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';

/**
 * The schedule of reading points as CSV, units in the heads of the columns, figures rounded to a tenth of what the
 * schedule shows. Points in the order of the schedule. Where there is no figure the cell is empty and the remark says
 * why; above the phreatic line the pressure is 0 and the remark says so. What was measured has columns of its own where
 * anything was.
 */
export function scheduleCsv(
  document: Pick<FlowNetDocument, 'unitSystem' | 'datum'>,
  reading: NetReading,
  mark: DecimalMark = '.',
): string {
  const units = unitNames(document.unitSystem);
  const elevation = elevationUnit(document.unitSystem, document.datum);
  const head: CsvCell[] = [
    'Point',
    `Offset, ${units.length}`,
    `Elevation, ${elevation}`,
    'Drops lost',
    `Total head, ${elevation}`,
    `Total head ± at 95 %, ${units.length}`,
    `Pressure head, ${units.length}`,
    `Pore pressure, ${units.pressure}`,
    `Pore pressure ± at 95 %, ${units.pressure}`,
    'Remark',
    ...(reading.measured.length === 0
      ? []
      : [
          `Measured head, ${elevation}`,
          `Measured head ± at 95 %, ${units.length}`,
          `Measured − net, ${units.length}`,
          `Measured − net ± at 95 %, ${units.length}`,
        ]),
  ];
  const measured = new Map(reading.measured.map((each) => [each.id, each]));
  const measuredCells = (id: string): CsvCell[] => {
    if (measured.size === 0) return [];
    const found = measured.get(id);
    const { head = null, headPlusMinus = null, difference = null, differencePlusMinus = null } = found ?? {};
    return [head, headPlusMinus, difference, differencePlusMinus].map((value) => rounded(value, 3));
  };
  const rows = reading.points.map((point) => [...rowOf(point), ...measuredCells(point.id)]);
  return csvText([head, ...rows], mark);
}

function rowOf(point: PointReading): CsvCell[] {
  return [
    point.name,
    rounded(point.offset, 3),
    rounded(point.elevation, 3),
    rounded(point.dropsLost, 3),
    rounded(point.totalHead, 3),
    rounded(point.totalHeadPlusMinus, 3),
    rounded(point.pressureHead, 3),
    rounded(point.porePressure, 2),
    rounded(point.porePressurePlusMinus, 2),
    [point.reason?.text, ...point.findings.map((found) => found.text)].filter(Boolean).join(' '),
  ];
}

function rounded(value: number | null, decimals: number): number | null {
  if (value === null) return null;
  const kept = Number(value.toFixed(decimals));
  return kept === 0 ? 0 : kept;
}
