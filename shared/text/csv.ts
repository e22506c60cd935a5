/** A cell of a CSV table: text, a number, or nothing. */
export type CsvCell = string | number | null;

/** Characters that make a spreadsheet take a text for a formula, their full-width forms included. */
const FORMULA_START = /^(?:\p{Cc}|[\s\p{Cc}]*[=+\-@＝＋－＠|])/u;

/**
 * A CSV text after RFC 4180: comma, CRLF, quotes doubled. Text that a spreadsheet would run as a formula gets an
 * apostrophe before it; numbers are written plainly with a point and a hyphen-minus, which no spreadsheet runs.
 */
export function csvText(rows: ReadonlyArray<readonly CsvCell[]>): string {
  return rows.map((row) => `${row.map(cellText).join(',')}\r\n`).join('');
}

function cellText(cell: CsvCell): string {
  if (cell === null) return '';
  if (typeof cell === 'number') return Number.isFinite(cell) ? String(cell) : '';
  const safe = FORMULA_START.test(cell) ? `'${cell}` : cell;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}
