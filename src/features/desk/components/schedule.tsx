import { Fragment, useState } from 'react';
import { classNames } from '#client/components/class-names.ts';
import { sentenceText } from '#client/lib/figures.ts';
import { explanationText } from '#client/text/explanation.ts';
import { measuredText } from '#client/text/measured.ts';
import { scheduleText as text } from '#client/text/schedule.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading, PointReading } from '#shared/contract/reading.ts';
import { type Edit, removePoint } from './schedule-edits.ts';
import { type FigureMark, ScheduleRow } from './schedule-row.tsx';
import {
  type HideableColumn,
  nextSort,
  pointRemark,
  type ScheduleColumn,
  type Sort,
  scheduleColumns,
  sortedPoints,
} from './schedule-rows.ts';

interface ScheduleProps {
  document: FlowNetDocument;
  reading: NetReading;
  /** The points shown; left out = all of the reading. */
  points?: readonly PointReading[];
  /** Columns left out. */
  hidden?: readonly HideableColumn[];
  /** The order shown, held by whoever copies the table too. */
  sort: Sort;
  onSort: (sort: Sort) => void;
  /** Null where the schedule is frozen or may not be edited. */
  onEdit: ((edit: Edit) => void) | null;
  selectedIds: readonly string[];
  onSelect: ((id: string) => void) | null;
  /** Opens the form of what was measured at a point; left out where nothing may be typed. */
  onMeasured?: ((id: string) => void) | undefined;
  /** Shows how a point is read; left out where there is no sheet to show it on. */
  onExplain?: ((id: string) => void) | undefined;
  /** Brings a point into view on the sheet; left out where there is none beside the table. */
  onLook?: ((point: PointReading) => void) | undefined;
  /** What stands before a figure, such as a tick; left out where nothing does. */
  markOf?: FigureMark | undefined;
}

const NONE: readonly HideableColumn[] = [];

/** The table of reading points: sorted by its heads, edited where it stands, each row with its count in words. */
export function Schedule({
  document,
  reading,
  points = reading.points,
  hidden = NONE,
  sort,
  onSort,
  onEdit,
  selectedIds,
  onSelect,
  onMeasured,
  onExplain,
  onLook,
  markOf,
}: ScheduleProps) {
  const [openId, setOpenId] = useState<string | null>(null);
  const { measured } = reading;
  const columns = scheduleColumns(document, measured.length > 0).filter(
    ({ column }) => column === 'name' || !hidden.includes(column),
  );
  return (
    <table className="w-full min-w-[43.75rem]">
      <caption className="sr-only">{text.title}</caption>
      <thead className="sticky top-0 z-[2] bg-film">
        <tr>
          {columns.map((column) => (
            <Head
              key={column.column}
              column={column}
              sort={sort}
              onSort={onSort}
              // With the columns of measured values the heads need two lines, so that all of them fit beside the margin.
              wraps={measured.length > 0}
            />
          ))}
          <th scope="col" className="border-b border-rule px-2">
            <span className="sr-only">{text.head.count}</span>
          </th>
        </tr>
      </thead>
      <tbody>
        {sortedPoints(points, sort, measured).map((point) => (
          <Fragment key={point.id}>
            <ScheduleRow
              point={point}
              document={document}
              measured={
                measured.length > 0 ? (measured.find(({ id }) => id === point.id) ?? null) : undefined
              }
              hidden={hidden}
              unfinished={reading.state === 'unfinished'}
              onEdit={onEdit}
              selected={selectedIds.includes(point.id)}
              onSelect={onSelect}
              open={openId === point.id}
              onToggle={() => setOpenId(openId === point.id ? null : point.id)}
              markOf={markOf}
              onLook={onLook && point.sheetAt !== null ? () => onLook(point) : undefined}
            />
            {openId === point.id ? (
              <Explanation
                point={point}
                onEdit={onEdit}
                onMeasured={onMeasured}
                onExplain={onExplain}
                hasMeasured={measured.some(({ id }) => id === point.id)}
                span={columns.length + 1}
              />
            ) : null}
          </Fragment>
        ))}
      </tbody>
    </table>
  );
}

function Head({
  column: { column, label },
  sort,
  onSort,
  wraps,
}: {
  column: ScheduleColumn;
  sort: Sort;
  onSort: (sort: Sort) => void;
  wraps: boolean;
}) {
  const sorted = sort.column === column;
  const direction = sort.descending ? 'descending' : 'ascending';
  const first = column === 'name';
  return (
    <th
      scope="col"
      aria-sort={sorted ? direction : 'none'}
      className={classNames(
        'border-b border-rule px-2 align-bottom text-sm font-semibold text-ink-2',
        wraps ? 'whitespace-normal' : 'whitespace-nowrap',
        first ? 'sticky left-0 bg-film text-left' : 'text-right',
      )}
    >
      <button
        type="button"
        title={text.sortBy(label)}
        className={classNames('py-[5px] font-semibold hover:underline', first ? 'text-left' : 'text-right')}
        onClick={() => onSort(nextSort(sort, column))}
      >
        {label}
        {sorted ? <span aria-hidden="true">{sort.descending ? ' ↓' : ' ↑'}</span> : null}
      </button>
    </th>
  );
}

function Explanation({
  point,
  onEdit,
  onMeasured,
  onExplain,
  hasMeasured,
  span,
}: {
  point: PointReading;
  onEdit: ScheduleProps['onEdit'];
  onMeasured: ScheduleProps['onMeasured'];
  onExplain: ScheduleProps['onExplain'];
  hasMeasured: boolean;
  span: number;
}) {
  const remark = pointRemark(point);
  return (
    <tr>
      <td colSpan={span} className="border-b border-rule-2 bg-hover px-4 py-2">
        {point.explanation ? <p className="m-0 max-w-[80ch]">{sentenceText(point.explanation)}</p> : null}
        {remark && remark !== point.explanation ? (
          <p className="m-0 max-w-[80ch] text-attention">{remark}</p>
        ) : null}
        {onExplain ? (
          <button
            type="button"
            className="touch mt-1 mr-4 text-sm text-ink-2 underline"
            onClick={() => onExplain(point.id)}
          >
            {explanationText.open}
          </button>
        ) : null}
        {onMeasured ? (
          <button
            type="button"
            className="touch mt-1 mr-4 text-sm text-ink-2 underline"
            onClick={() => onMeasured(point.id)}
          >
            {hasMeasured ? measuredText.change : measuredText.open}
          </button>
        ) : null}
        {onEdit ? (
          <button
            type="button"
            className="touch mt-1 text-sm text-ink-2 underline"
            onClick={() => onEdit(removePoint(point.id, point.name))}
          >
            {text.remove}
          </button>
        ) : null}
      </td>
    </tr>
  );
}
