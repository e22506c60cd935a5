import { enteredText, fixedText, NO_FIGURE, sentenceText } from '#client/lib/figures.ts';
import { measuredText } from '#client/text/measured.ts';
import { scheduleText as text } from '#client/text/schedule.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading, PointReading } from '#shared/contract/reading.ts';
import type { MeasuredReading } from '#shared/contract/reading-measured.ts';
import { DECIMALS, elevationUnit, unitNames } from '#shared/text/unit-text.ts';

export type SortColumn =
  | 'order'
  | 'name'
  | 'offset'
  | 'elevation'
  | 'dropsLost'
  | 'totalHead'
  | 'pressureHead'
  | 'porePressure'
  | 'measured'
  | 'difference';
export interface Sort {
  column: SortColumn;
  descending: boolean;
}

export const ENTERED_ORDER: Sort = { column: 'order', descending: false };
const byName = new Intl.Collator('en-GB', { numeric: true });

/** Points in the order asked for; those without a figure in that column come last either way. */
export function sortedPoints(
  points: readonly PointReading[],
  sort: Sort,
  measured: readonly MeasuredReading[] = [],
): PointReading[] {
  const sign = sort.descending ? -1 : 1;
  const figure = figureIn(sort.column, measured);
  return [...points].sort((a, b) => {
    if (sort.column === 'name') return sign * byName.compare(a.name, b.name) || a.order - b.order;
    const [left, right] = [figure(a), figure(b)];
    if (left === null || right === null) return Number(left === null) - Number(right === null);
    return sign * (left - right) || a.order - b.order;
  });
}

function figureIn(
  column: SortColumn,
  measured: readonly MeasuredReading[],
): (point: PointReading) => number | null {
  if (column === 'name') return (point) => point.order;
  if (column !== 'measured' && column !== 'difference') return (point) => point[column];
  const found = new Map(measured.map((each) => [each.id, each]));
  return ({ id }) => found.get(id)?.[column === 'measured' ? 'head' : 'difference'] ?? null;
}

/** The order after a press on a column's head: ascending, descending, back to the order they were entered in. */
export function nextSort(sort: Sort, column: SortColumn): Sort {
  if (sort.column !== column) return { column, descending: false };
  return sort.descending ? ENTERED_ORDER : { column, descending: true };
}

type Units = Pick<FlowNetDocument, 'unitSystem' | 'datum'>;

export interface ScheduleColumn {
  column: Exclude<SortColumn, 'order'>;
  label: string;
}

/** Columns with the units in their heads; those of measured values where there are any. */
export function scheduleColumns({ unitSystem, datum }: Units, withMeasured = false): ScheduleColumn[] {
  const { length, pressure } = unitNames(unitSystem);
  const level = elevationUnit(unitSystem, datum);
  const { head } = text;
  return [
    { column: 'name', label: head.point },
    { column: 'offset', label: head.offset(length) },
    { column: 'elevation', label: head.elevation(level) },
    { column: 'dropsLost', label: head.drops },
    { column: 'totalHead', label: head.totalHead(level) },
    { column: 'pressureHead', label: head.pressureHead(length) },
    { column: 'porePressure', label: head.pressure(pressure) },
    ...(withMeasured
      ? ([
          { column: 'measured', label: measuredText.column(level) },
          { column: 'difference', label: measuredText.difference(length) },
        ] as const)
      : []),
  ];
}

/** Columns that may be left out of the table: all but the name, by which a row is known. */
export type HideableColumn = Exclude<ScheduleColumn['column'], 'name'>;

/** Points whose name holds what was typed, whatever the case; all of them when nothing was. */
export function pointsNamed(points: readonly PointReading[], typed: string): readonly PointReading[] {
  const wanted = typed.trim().toLocaleLowerCase();
  return wanted === '' ? points : points.filter(({ name }) => name.toLocaleLowerCase().includes(wanted));
}

/** A point's figures as text, with the decimals that mean something; the ± stands in its own place. */
export function pointFigures(point: PointReading, { unitSystem }: Units) {
  const decimals = DECIMALS[unitSystem];
  return {
    offset: fixedText(point.offset, decimals.offset),
    elevation: fixedText(point.elevation, decimals.elevation),
    dropsLost: fixedText(point.dropsLost, decimals.drops),
    totalHead: fixedText(point.totalHead, decimals.head),
    totalHeadPlusMinus: plusMinus(point.totalHeadPlusMinus, decimals.head),
    pressureHead: fixedText(point.pressureHead, decimals.pressureHead),
    porePressure: fixedText(point.porePressure, decimals.pressure),
    porePressurePlusMinus: plusMinus(point.porePressurePlusMinus, decimals.pressure),
  };
}

const plusMinus = (value: number | null, decimals: number) =>
  value === null ? '' : ` ± ${fixedText(value, decimals)}`;

/** Why a point has no figure, or what has to be known about the one it has; empty when there is nothing to say. */
export function pointRemark(point: PointReading): string {
  const own = point.status === 'abovePhreatic' ? text.abovePhreatic : (point.reason?.text ?? '');
  return sentenceText([own, ...point.findings.map((found) => found.text)].filter(Boolean).join(' '));
}

/** The line above the table: datum, γw and what the ± is. */
export function scheduleLead(document: Units, reading: NetReading | null): string {
  const gammaW = reading?.quantities.gammaW ?? null;
  const unit = unitNames(document.unitSystem).unitWeight;
  return text.lead(document.datum, gammaW === null ? NO_FIGURE : enteredText(gammaW), unit);
}
