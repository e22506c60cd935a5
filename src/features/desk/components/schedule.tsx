import { Fragment, useState } from 'react';
import { classNames } from '#client/components/class-names.ts';
import { scheduleText as text } from '#client/text/schedule.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading, PointReading } from '#shared/contract/reading.ts';
import { type Edit, removePoint, renamePoint, typePlace } from './schedule-edits.ts';
import {
  ENTERED_ORDER,
  nextSort,
  pointFigures,
  pointRemark,
  type ScheduleColumn,
  type Sort,
  scheduleColumns,
  sortedPoints,
} from './schedule-rows.ts';
import { TableNumber, TableText } from './table-inputs.tsx';

const LONGEST_NAME = 120;
const CELL = 'border-b border-rule-2 px-2 py-[3px]';

interface ScheduleProps {
  document: FlowNetDocument;
  reading: NetReading;
  /** Null where the schedule is frozen or may not be edited. */
  onEdit: ((edit: Edit) => void) | null;
  selectedIds: readonly string[];
  onSelect: ((id: string) => void) | null;
}

/** The table of reading points: sorted by its heads, edited where it stands, each row with its count in words. */
export function Schedule({ document, reading, onEdit, selectedIds, onSelect }: ScheduleProps) {
  const [sort, setSort] = useState<Sort>(ENTERED_ORDER);
  const [openId, setOpenId] = useState<string | null>(null);
  const columns = scheduleColumns(document);
  return (
    <table className="w-full min-w-[700px]">
      <caption className="sr-only">{text.title}</caption>
      <thead>
        <tr>
          {columns.map((column) => (
            <Head key={column.column} column={column} sort={sort} onSort={setSort} />
          ))}
          <th scope="col" className={classNames(CELL, 'border-rule')}>
            <span className="sr-only">{text.head.count}</span>
          </th>
        </tr>
      </thead>
      <tbody>
        {sortedPoints(reading.points, sort).map((point) => (
          <Fragment key={point.id}>
            <Row
              point={point}
              document={document}
              unfinished={reading.state === 'unfinished'}
              onEdit={onEdit}
              selected={selectedIds.includes(point.id)}
              onSelect={onSelect}
              open={openId === point.id}
              onToggle={() => setOpenId(openId === point.id ? null : point.id)}
            />
            {openId === point.id ? (
              <Explanation point={point} onEdit={onEdit} span={columns.length + 1} />
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
}: {
  column: ScheduleColumn;
  sort: Sort;
  onSort: (sort: Sort) => void;
}) {
  const sorted = sort.column === column;
  const direction = sort.descending ? 'descending' : 'ascending';
  const first = column === 'name';
  return (
    <th
      scope="col"
      aria-sort={sorted ? direction : 'none'}
      className={classNames(
        'border-b border-rule px-2 text-sm font-semibold whitespace-nowrap text-ink-2',
        first ? 'sticky left-0 bg-film text-left' : 'text-right',
      )}
    >
      <button
        type="button"
        title={text.sortBy(label)}
        className="py-[5px] font-semibold hover:underline"
        onClick={() => onSort(nextSort(sort, column))}
      >
        {label}
        {sorted ? <span aria-hidden="true">{sort.descending ? ' ↓' : ' ↑'}</span> : null}
      </button>
    </th>
  );
}

interface RowProps {
  point: PointReading;
  document: FlowNetDocument;
  /** The reason is said once above the table, not in every row. */
  unfinished: boolean;
  onEdit: ScheduleProps['onEdit'];
  selected: boolean;
  onSelect: ScheduleProps['onSelect'];
  open: boolean;
  onToggle: () => void;
}

function Row({ point, document, unfinished, onEdit, selected, onSelect, open, onToggle }: RowProps) {
  const name = point.name || text.unnamed;
  return (
    <tr
      className={classNames('group', selected ? 'bg-chosen' : 'hover:bg-hover')}
      aria-selected={selected}
      onFocus={() => onSelect?.(point.id)}
      onClick={() => onSelect?.(point.id)}
    >
      <th
        scope="row"
        className={classNames(
          CELL,
          'sticky left-0 text-left font-semibold',
          selected ? 'bg-chosen' : 'bg-film',
        )}
      >
        <NameCell point={point} document={document} onEdit={onEdit} />
      </th>
      <PlaceCells point={point} document={document} onEdit={onEdit} name={name} />
      <FigureCells point={point} document={document} unfinished={unfinished} />
      <td className={classNames(CELL, 'w-px text-right whitespace-nowrap')}>
        <button
          type="button"
          aria-expanded={open}
          aria-label={text.named(open ? text.hide : text.show, name)}
          className="touch text-sm text-ink-2 underline decoration-rule underline-offset-2 hover:text-ink"
          onClick={onToggle}
        >
          {open ? text.hide : text.show}
        </button>
      </td>
    </tr>
  );
}

function NameCell({ point, document, onEdit }: Pick<RowProps, 'point' | 'document' | 'onEdit'>) {
  const value = document.entities[point.id]?.value;
  const name = point.name || text.unnamed;
  if (!onEdit || value?.kind !== 'readingPoint') return name;
  return (
    <TableText
      label={text.nameOf(name)}
      value={value.name}
      maxLength={LONGEST_NAME}
      onCommit={(next) => onEdit(renamePoint(point.id, value, next))}
    />
  );
}

function PlaceCells({
  point,
  document,
  onEdit,
  name,
}: Pick<RowProps, 'point' | 'document' | 'onEdit'> & { name: string }) {
  const value = document.entities[point.id]?.value;
  const figures = pointFigures(point, document);
  if (!onEdit || value?.kind !== 'readingPoint' || point.offset === null) {
    return (
      <>
        <td className={classNames(CELL, 'text-right')}>{figures.offset}</td>
        <td className={classNames(CELL, 'text-right')}>{figures.elevation}</td>
      </>
    );
  }
  const type = (typed: { offset?: number; elevation?: number }) => {
    const edit = typePlace(value, point, typed);
    if (edit) onEdit(edit);
  };
  // What was typed is shown as typed; what was clicked is rounded to what a click can mean.
  const typed = value.place.on === 'section' ? value.place : null;
  return (
    <>
      <td className={classNames(CELL, 'text-right')}>
        <TableNumber
          label={text.offsetOf(name)}
          value={typed?.offset ?? rounded(point.offset)}
          shown={figures.offset}
          onCommit={(offset) => offset !== null && type({ offset })}
        />
      </td>
      <td className={classNames(CELL, 'text-right')}>
        <TableNumber
          label={text.elevationOf(name)}
          value={typed?.elevation ?? rounded(point.elevation)}
          shown={figures.elevation}
          onCommit={(elevation) => elevation !== null && type({ elevation })}
        />
      </td>
    </>
  );
}

const rounded = (value: number | null) => (value === null ? null : Number(value.toFixed(3)));

function FigureCells({ point, document, unfinished }: Pick<RowProps, 'point' | 'document' | 'unfinished'>) {
  const figures = pointFigures(point, document);
  if (point.status === 'withheld') {
    return (
      <td colSpan={4} className={classNames(CELL, 'text-attention')}>
        {unfinished ? text.unfinishedRow : pointRemark(point) || text.reading}
      </td>
    );
  }
  if (point.status === 'abovePhreatic') {
    return (
      <>
        <td colSpan={3} className={classNames(CELL, 'text-right text-ink-2')}>
          {text.abovePhreatic}
        </td>
        <td className={classNames(CELL, 'text-right font-semibold')}>{figures.porePressure}</td>
      </>
    );
  }
  return (
    <>
      <td className={classNames(CELL, 'text-right')}>{figures.dropsLost}</td>
      <td className={classNames(CELL, 'text-right whitespace-nowrap')}>
        {figures.totalHead}
        <span className="text-ink-2">{figures.totalHeadPlusMinus}</span>
      </td>
      <td className={classNames(CELL, 'text-right')}>{figures.pressureHead}</td>
      <td className={classNames(CELL, 'text-right whitespace-nowrap')}>
        <b className="font-semibold">{figures.porePressure}</b>
        <span className="text-ink-2">{figures.porePressurePlusMinus}</span>
        {point.findings.length > 0 ? <span className="text-attention"> ?</span> : null}
      </td>
    </>
  );
}

function Explanation({
  point,
  onEdit,
  span,
}: {
  point: PointReading;
  onEdit: ScheduleProps['onEdit'];
  span: number;
}) {
  const remark = pointRemark(point);
  return (
    <tr>
      <td colSpan={span} className="border-b border-rule-2 bg-hover px-4 py-2">
        {point.explanation ? <p className="m-0 max-w-[80ch]">{point.explanation}</p> : null}
        {remark && remark !== point.explanation ? (
          <p className="m-0 max-w-[80ch] text-attention">{remark}</p>
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
