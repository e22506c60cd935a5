import { classNames } from '#client/components/class-names.ts';
import { measuredText } from '#client/text/measured.ts';
import { scheduleText as text } from '#client/text/schedule.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { PointReading } from '#shared/contract/reading.ts';
import type { MeasuredReading } from '#shared/contract/reading-measured.ts';
import { unitNames } from '#shared/text/unit-text.ts';
import { MEASURED_COLOURS, measuredFigures, measuredState } from './measured-words.ts';
import { type Edit, renamePoint, typePlace } from './schedule-edits.ts';
import { pointFigures, pointRemark } from './schedule-rows.ts';
import { TableNumber, TableText } from './table-inputs.tsx';

const LONGEST_NAME = 120;
const CELL = 'border-b border-rule-2 px-2 py-[3px]';

interface RowProps {
  point: PointReading;
  document: FlowNetDocument;
  /** What was measured here, null when nothing was; undefined where the table has no such columns. */
  measured: MeasuredReading | null | undefined;
  /** The reason is said once above the table, not in every row. */
  unfinished: boolean;
  onEdit: ((edit: Edit) => void) | null;
  selected: boolean;
  onSelect: ((id: string) => void) | null;
  open: boolean;
  onToggle: () => void;
}

/** One reading point: its name and place, edited where they stand, and its figures or the reason why there are none. */
export function ScheduleRow({
  point,
  document,
  measured,
  unfinished,
  onEdit,
  selected,
  onSelect,
  open,
  onToggle,
}: RowProps) {
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
        <PressureOnPhone point={point} document={document} />
      </th>
      <PlaceCells point={point} document={document} onEdit={onEdit} name={name} />
      <FigureCells point={point} document={document} unfinished={unfinished} />
      {measured === undefined ? null : <MeasuredCells measured={measured} document={document} />}
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

function MeasuredCells({
  measured,
  document,
}: {
  measured: MeasuredReading | null;
  document: FlowNetDocument;
}) {
  if (measured === null) return <td colSpan={2} className={CELL} />;
  const figures = measuredFigures(measured, document.unitSystem);
  const state = measuredState(measured);
  return (
    <>
      <td className={classNames(CELL, 'text-right whitespace-nowrap')}>
        {figures.head}
        <span className="text-ink-2">{figures.headPlusMinus}</span>
      </td>
      <td className={classNames(CELL, 'text-right whitespace-nowrap', MEASURED_COLOURS[state])}>
        {state === 'wet' ? measuredText.wetShort : figures.difference}
        <span className="font-normal text-ink-2">{figures.differencePlusMinus}</span>
      </td>
    </>
  );
}
