import type { BenchRow } from './bench.ts';

const HEADS = ['name', 'value', 'unit', 'reference', 'ratio', 'samples'];

/** The rows as a text table, numbers aligned right. */
export function tableOf(rows: readonly BenchRow[]): string {
  const cells = [HEADS, ...rows.map(cellsOf)];
  const widths = HEADS.map((_head, column) => Math.max(...cells.map((row) => row[column]?.length ?? 0)));
  const isText = (column: number) => column === 0 || column === 2;
  return cells
    .map((row) =>
      row
        .map((cell, column) =>
          isText(column) ? cell.padEnd(widths[column] ?? 0) : cell.padStart(widths[column] ?? 0),
        )
        .join('  ')
        .trimEnd(),
    )
    .join('\n');
}

function cellsOf(row: BenchRow): string[] {
  const figure = (value: number | null) =>
    value === null ? 'none' : Number(value.toPrecision(4)).toString();
  return [
    row.name,
    figure(row.value),
    row.unit,
    figure(row.reference),
    row.ratio === null ? 'none' : row.ratio.toFixed(2),
    String(row.samples),
  ];
}
