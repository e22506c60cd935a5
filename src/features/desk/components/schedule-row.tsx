import type { ReactNode } from 'react';
import { classNames } from '#client/components/class-names.ts';
import { measuredText } from '#client/text/measured.ts';
import { scheduleViewText } from '#client/text/panes.ts';
import { scheduleText as text } from '#client/text/schedule.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { PointReading } from '#shared/contract/reading.ts';
import type { MeasuredReading } from '#shared/contract/reading-measured.ts';
import { unitNames } from '#shared/text/unit-text.ts';
import { MEASURED_COLOURS, measuredFigures, measuredState } from './measured-words.ts';
import { type Edit, renamePoint, typePlace } from './schedule-edits.ts';
import { type HideableColumn, pointFigures, pointRemark } from './schedule-rows.ts';
import { TableNumber, TableText } from './table-inputs.tsx';

const LONGEST_NAME = 120;
const CELL = 'border-b border-rule-2 px-2 py-[3px]';
const FIGURE = `${CELL} text-right whitespace-nowrap`;

export type FigureMark = (pointId: string, column: HideableColumn) => ReactNode;

interface RowProps {
  point: PointReading;
  document: FlowNetDocument;
  /** What was measured here, null when nothing was; undefined where the table has no such columns. */
  measured: MeasuredReading | null | undefined;
  hidden: readonly HideableColumn[];
  /** The reason is said once above the table, not in every row. */
  unfinished: boolean;
  onEdit: ((edit: Edit) => void) | null;
  selected: boolean;
  onSelect: ((id: string) => void) | null;
  open: boolean;
  onToggle: () => void;
  /** Shows the point on the sheet; left out where there is none beside the table. */
  onLook?: (() => void) | undefined;
  markOf?: FigureMark | undefined;
}

/** One reading point: its name and place, edited where they stand, and its figures or the reason why there are none. */
export function ScheduleRow({
  point,
  document,
  measured,
  hidden,
  unfinished,
  onEdit,
  selected,
  onSelect,
  open,
  onToggle,
  onLook,
  markOf,
}: RowProps) {
  const name = point.name || text.unnamed;
  return (
    <tr
      className={classNames('group scroll-mt-12', selected ? 'bg-chosen' : 'hover:bg-hover')}
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
        <PressureOnPhone point={point} document={document} />
      </th>
      <PlaceCells
        point={point}
        document={document}
        onEdit={onEdit}
        name={name}
        hidden={hidden}
        markOf={markOf}
      />
      <FigureCells
        point={point}
        document={document}
        unfinished={unfinished}
        hidden={hidden}
        markOf={markOf}
      />
      {measured === undefined ? null : (
        <MeasuredCells measured={measured} document={document} hidden={hidden} />
      )}
      <td className={classNames(CELL, 'w-px text-right whitespace-nowrap')}>
        {onLook ? <LookButton name={name} onLook={onLook} /> : null}
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

function LookButton({ name, onLook }: { name: string; onLook: () => void }) {
  const label = scheduleViewText.showOnSheet(name);
  return (
    <button
      type="button"
      aria-label={label}
      title={label}
      className="touch mr-2 px-1 align-middle text-ink-2 hover:text-ink"
      onClick={onLook}
    >
      <svg width="13" height="13" viewBox="0 0 13 13" aria-hidden="true">
        <path
          d="M6.5 0v4M6.5 9v4M0 6.5h4M9 6.5h4M6.5 3.4a3.1 3.1 0 1 1 0 6.2 3.1 3.1 0 0 1 0-6.2"
          fill="none"
          stroke="currentColor"
          strokeWidth="1.2"
        />
      </svg>
    </button>
  );
}

/** On a phone the last column lies off the screen, so the figure that is wanted stands under the name as well. */
function PressureOnPhone({ point, document }: Pick<RowProps, 'point' | 'document'>) {
  if (point.porePressure === null) return null;
  const { porePressure, porePressurePlusMinus } = pointFigures(point, document);
  return (
    <span aria-hidden="true" className="hidden text-sm font-normal whitespace-nowrap max-sm:block">
      {porePressure}
      {porePressurePlusMinus} {unitNames(document.unitSystem).pressure}
    </span>
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
  hidden,
  markOf,
}: Pick<RowProps, 'point' | 'document' | 'onEdit' | 'hidden' | 'markOf'> & { name: string }) {
  const shows = shownOf(hidden);
  const value = document.entities[point.id]?.value;
  const figures = pointFigures(point, document);
  if (!onEdit || value?.kind !== 'readingPoint' || point.offset === null) {
    return (
      <>
        {shows('offset') ? (
          <td className={FIGURE}>
            {markOf?.(point.id, 'offset')}
            {figures.offset}
          </td>
        ) : null}
        {shows('elevation') ? (
          <td className={FIGURE}>
            {markOf?.(point.id, 'elevation')}
            {figures.elevation}
          </td>
        ) : null}
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
      {shows('offset') ? (
        <td className={FIGURE}>
          <TableNumber
            label={text.offsetOf(name)}
            value={typed?.offset ?? rounded(point.offset)}
            shown={figures.offset}
            onCommit={(offset) => offset !== null && type({ offset })}
          />
        </td>
      ) : null}
      {shows('elevation') ? (
        <td className={FIGURE}>
          <TableNumber
            label={text.elevationOf(name)}
            value={typed?.elevation ?? rounded(point.elevation)}
            shown={figures.elevation}
            onCommit={(elevation) => elevation !== null && type({ elevation })}
          />
        </td>
      ) : null}
    </>
  );
}

const rounded = (value: number | null) => (value === null ? null : Number(value.toFixed(3)));

const FIGURE_COLUMNS = ['dropsLost', 'totalHead', 'pressureHead', 'porePressure'] as const;

function FigureCells({
  point,
  document,
  unfinished,
  hidden,
  markOf,
}: Pick<RowProps, 'point' | 'document' | 'unfinished' | 'hidden' | 'markOf'>) {
  const figures = pointFigures(point, document);
  const columns = FIGURE_COLUMNS.filter(shownOf(hidden));
  if (point.status === 'withheld') {
    const reason = unfinished ? text.unfinishedRow : pointRemark(point) || text.reading;
    return <SpanCell span={columns.length} className="text-attention" words={reason} />;
  }
  const above = point.status === 'abovePhreatic';
  const withPressure = columns.includes('porePressure');
  return (
    <>
      {above ? (
        <SpanCell
          span={columns.length - Number(withPressure)}
          className="text-right text-ink-2"
          words={text.abovePhreatic}
        />
      ) : (
        <HeadCells figures={figures} columns={columns} markOf={(column) => markOf?.(point.id, column)} />
      )}
      {withPressure ? (
        <td className={FIGURE}>
          {markOf?.(point.id, 'porePressure')}
          <b className="font-semibold">{figures.porePressure}</b>
          {above ? null : <span className="text-ink-2">{figures.porePressurePlusMinus}</span>}
          {!above && point.findings.length > 0 ? <span className="text-attention"> ?</span> : null}
        </td>
      ) : null}
    </>
  );
}

/** Words in the place of figures, over the columns that are shown of them. */
function SpanCell({ span, className, words }: { span: number; className: string; words: string }) {
  if (span === 0) return null;
  return (
    <td colSpan={span} className={classNames(CELL, className)}>
      {words}
    </td>
  );
}

function HeadCells({
  figures,
  columns,
  markOf,
}: {
  figures: ReturnType<typeof pointFigures>;
  columns: readonly (typeof FIGURE_COLUMNS)[number][];
  markOf: (column: HideableColumn) => ReactNode;
}) {
  return (
    <>
      {columns.includes('dropsLost') ? (
        <td className={FIGURE}>
          {markOf('dropsLost')}
          {figures.dropsLost}
        </td>
      ) : null}
      {columns.includes('totalHead') ? (
        <td className={FIGURE}>
          {markOf('totalHead')}
          {figures.totalHead}
          <span className="text-ink-2">{figures.totalHeadPlusMinus}</span>
        </td>
      ) : null}
      {columns.includes('pressureHead') ? (
        <td className={FIGURE}>
          {markOf('pressureHead')}
          {figures.pressureHead}
        </td>
      ) : null}
    </>
  );
}

function MeasuredCells({
  measured,
  document,
  hidden,
}: {
  measured: MeasuredReading | null;
  document: FlowNetDocument;
  hidden: readonly HideableColumn[];
}) {
  const shows = shownOf(hidden);
  const columns = (['measured', 'difference'] as const).filter(shows);
  if (measured === null) return <SpanCell span={columns.length} className="" words="" />;
  const figures = measuredFigures(measured, document.unitSystem);
  const state = measuredState(measured);
  return (
    <>
      {shows('measured') ? (
        <td className={FIGURE}>
          {figures.head}
          <span className="text-ink-2">{figures.headPlusMinus}</span>
        </td>
      ) : null}
      {shows('difference') ? (
        <td className={classNames(FIGURE, MEASURED_COLOURS[state])}>
          {state === 'wet' ? measuredText.wetShort : figures.difference}
          <span className="font-normal text-ink-2">{figures.differencePlusMinus}</span>
        </td>
      ) : null}
    </>
  );
}

const shownOf = (hidden: readonly HideableColumn[]) => (column: HideableColumn) => !hidden.includes(column);
