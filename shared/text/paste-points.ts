/** A pasted place, offset and elevation as written, in the unit of the document. */
export type PastedPoint = readonly [offset: number, elevation: number];

/** What is wrong with one line of a pasted text, counted from 1. */
export type PasteError = { readonly line: number; readonly text: string };

/** The places of a pasted text, all or none: a list with a place missing is another line. */
export type PastedPoints =
  | { readonly ok: true; readonly points: readonly PastedPoint[] }
  | { readonly ok: false; readonly errors: readonly PasteError[] };

/** As many places as a profile may have. */
const MOST_POINTS = 5000;

/** A number with a point or a comma for the decimals, and a hyphen or a proper minus. Digits are not grouped. */
const NUMBER = /^[+\-−]?(?:\d+(?:[.,]\d*)?|[.,]\d+)(?:e[+-]?\d+)?$/i;

/**
 * Places out of two columns copied from a spreadsheet, offset and elevation, one place in a line. Columns are parted by
 * a tab, a semicolon, or, in a line without either, by blanks or by a comma; decimals have a point or a comma. A comma
 * alone between two whole numbers, "12,5", might be either and is refused, as are grouped digits and further columns
 * that hold anything. A first line without any number is taken for the heads of the columns, empty lines are passed
 * over. Every line that cannot be read is named.
 */
export function pastePoints(text: string): PastedPoints {
  const lines = text.split(/\r\n|\r|\n/).map((line, i) => ({ line: i + 1, text: line.trim() }));
  const filled = lines.filter((line) => line.text !== '');
  const rows = filled[0] !== undefined && !/\d/.test(filled[0].text) ? filled.slice(1) : filled;
  if (rows.length === 0) {
    return {
      ok: false,
      errors: [{ line: 1, text: 'No places are in it. Copy two columns, offset and elevation.' }],
    };
  }
  if (rows.length > MOST_POINTS) {
    const text = `More than ${MOST_POINTS} places are in it. Paste fewer.`;
    return { ok: false, errors: [{ line: rows[MOST_POINTS]!.line, text }] };
  }
  const read = rows.map(({ line, text }) => ({ line, found: pointIn(text) }));
  const errors = read.flatMap(({ line, found }) =>
    typeof found === 'string' ? [{ line, text: found }] : [],
  );
  if (errors.length > 0) return { ok: false, errors };
  return { ok: true, points: read.flatMap(({ found }) => (typeof found === 'string' ? [] : [found])) };
}

/** The place in a line, or what is wrong with it. */
function pointIn(line: string): PastedPoint | string {
  const cells = cellsIn(line);
  if (cells === null) {
    return `“${shortened(line)}” may be one number with a decimal comma or two columns. Part the columns by a tab or a semicolon.`;
  }
  if (cells.length !== 2) {
    return cells.length < 2
      ? 'The line has one column only. Offset and elevation are needed.'
      : `The line has ${cells.length} columns. Only offset and elevation are wanted.`;
  }
  const values = cells.map(numberIn);
  const wrong = values.indexOf(null);
  if (wrong >= 0) {
    const cell = cells[wrong]!;
    const which = wrong === 0 ? 'offset' : 'elevation';
    return cell === '' ? `The ${which} is empty.` : `The ${which} “${shortened(cell)}” is no number.`;
  }
  return [values[0]!, values[1]!];
}

/** The columns of a line without surrounding blanks; null where a comma might part or be a decimal. */
function cellsIn(line: string): string[] | null {
  const trimmed = (parts: readonly string[]) => withoutEmptyEnd(parts.map((part) => part.trim()));
  if (line.includes('\t')) return trimmed(line.split('\t'));
  if (line.includes(';')) return trimmed(line.split(';'));
  const commaAndBlank = line.split(/,\s+/);
  if (commaAndBlank.length > 1) return trimmed(commaAndBlank);
  if (/\s/.test(line)) return line.split(/\s+/);
  const parts = line.split(',');
  if (parts.length === 2 && /^[+\-−]?\d+$/.test(parts[0]!) && /^\d+$/.test(parts[1]!)) return null;
  if (parts.length > 2) return parts.every((part) => /^[+\-−]?\d+$/.test(part)) ? null : trimmed(parts);
  return trimmed(parts);
}

function withoutEmptyEnd(cells: readonly string[]): string[] {
  const last = cells.findLastIndex((cell) => cell !== '');
  return cells.slice(0, Math.max(2, last + 1));
}

function numberIn(cell: string): number | null {
  if (!NUMBER.test(cell)) return null;
  const value = Number(cell.replace('−', '-').replace(',', '.'));
  return Number.isFinite(value) ? value : null;
}

function shortened(text: string): string {
  return text.length > 40 ? `${text.slice(0, 40)}…` : text;
}
