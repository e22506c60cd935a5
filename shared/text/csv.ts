import { type DecimalMark, withMark } from '#shared/text/number-text.ts';

/** A cell of a CSV table: text, a number, or nothing. */
export type CsvCell = string | number | null;

/** Characters that make a spreadsheet take a text for a formula, their full-width forms included. */
const FORMULA_START = /^(?:\p{Cc}|[\s\p{Cc}]*[=+\-@＝＋－＠|])/u;

/** Without it some spreadsheets read UTF-8 as Latin letters, and "±" comes out as two signs. */
export const BYTE_ORDER_MARK = '\ufeff';

/**
 * A CSV text after RFC 4180: comma, CRLF, quotes doubled. Text that a spreadsheet would run as a formula gets an
 * apostrophe before it; numbers are written plainly with a point and a hyphen-minus, which no spreadsheet runs. With a
 * decimal comma the cells are parted by semicolons, as spreadsheets expect it where the comma is the decimal mark.
 */
export function csvText(rows: ReadonlyArray<readonly CsvCell[]>, mark: DecimalMark = '.'): string {
  const separator = mark === ',' ? ';' : ',';
  return rows.map((row) => `${row.map((cell) => cellText(cell, mark)).join(separator)}\r\n`).join('');
}

function cellText(cell: CsvCell, mark: DecimalMark): string {
  if (cell === null) return '';
  if (typeof cell === 'number') return Number.isFinite(cell) ? withMark(String(cell), mark) : '';
  const safe = FORMULA_START.test(cell) ? `'${cell}` : cell;
  return (mark === ',' ? /[";\r\n]/ : /[",\r\n]/).test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}
