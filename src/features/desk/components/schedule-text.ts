import { enteredText, MINUS } from '#client/lib/figures.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { PointReading } from '#shared/contract/reading.ts';
import type { MeasuredReading } from '#shared/contract/reading-measured.ts';
import { measuredFigures } from './measured-words.ts';
import { pointFigures, pointRemark, type Sort, scheduleColumns, sortedPoints } from './schedule-rows.ts';

/** Text a spreadsheet would run as a formula when it is pasted. */
const FORMULA_START = /^[\s\p{Cc}]*[=+\-@＝＋－＠|]/u;

/**
 * The schedule as it stands on the screen, in the order shown there, tabs between columns, for pasting into a
 * spreadsheet: minus signs as spreadsheets read them, decimals with the person's own mark, as their spreadsheet has
 * it, the ± in columns of their own, so that every figure arrives as a number.
 */
export function scheduleTsv(
  document: Pick<FlowNetDocument, 'unitSystem' | 'datum'>,
  points: readonly PointReading[],
  sort: Sort,
  measured: readonly MeasuredReading[] = [],
): string {
  const heads = scheduleColumns(document, measured.length > 0).map((each) => each.label);
  const rows = sortedPoints(points, sort, measured).map((point) => [
    ...rowOf(point, document),
    ...(measured.length > 0 ? measuredCells(measured, point.id, document) : []),
  ]);
  return [withDoubtHeads(heads), ...rows].map((cells) => cells.map(cellText).join('\t')).join('\n');
}

function withDoubtHeads(heads: string[]): string[] {
  const [
    point = '',
    offset = '',
    elevation = '',
    drops = '',
    total = '',
    head = '',
    pressure = '',
    ...measured
  ] = heads;
  return [
    point,
    offset,
    elevation,
    drops,
    total,
    '± at 95 %',
    head,
    pressure,
    '± at 95 %',
    'Remark',
    ...measured.flatMap((each) => [each, '± at 95 %']),
  ];
}

function measuredCells(
  measured: readonly MeasuredReading[],
  id: string,
  { unitSystem }: Pick<FlowNetDocument, 'unitSystem'>,
): string[] {
  const found = measured.find((each) => each.id === id);
  if (!found) return ['', '', '', ''];
  const { head, headPlusMinus, difference, differencePlusMinus } = measuredFigures(found, unitSystem);
  return [head, headPlusMinus, difference.replace('+', ''), differencePlusMinus].map(number);
}

const number = (text: string) => text.replace(MINUS, '-').replace(' ± ', '').replace(/^–$/, '');

function rowOf(point: PointReading, document: Pick<FlowNetDocument, 'unitSystem' | 'datum'>): string[] {
  const figures = pointFigures(point, document);
  return [
    guarded(point.name),
    number(figures.offset),
    number(figures.elevation),
    number(figures.dropsLost),
    number(figures.totalHead),
    number(figures.totalHeadPlusMinus),
    number(figures.pressureHead),
    number(figures.porePressure),
    number(figures.porePressurePlusMinus),
    guarded(pointRemark(point)),
  ];
}

/** Rows as text for pasting into a spreadsheet, tabs between the columns; what would run as a formula is guarded. */
export function tableTsv(rows: ReadonlyArray<ReadonlyArray<string | number | null>>): string {
  const cell = (held: string | number | null) =>
    typeof held === 'string' ? cellText(guarded(held)) : enteredText(held).replace(MINUS, '-');
  return rows.map((row) => row.map(cell).join('\t')).join('\n');
}

const guarded = (text: string) => (FORMULA_START.test(text) ? `'${text}` : text);
const cellText = (text: string) => text.replace(/[\t\r\n]+/g, ' ');
