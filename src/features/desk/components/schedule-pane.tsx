import { type ReactNode, useEffect, useRef, useState } from 'react';
import { useStore } from 'zustand';
import { buttonClass } from '#client/components/button.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { copyText } from '#client/lib/copy-text.ts';
import { sentenceText } from '#client/lib/figures.ts';
import { scheduleViewText as viewText } from '#client/text/panes.ts';
import { scheduleText as text } from '#client/text/schedule.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading, PointReading } from '#shared/contract/reading.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { DownloadMenu, type NetDownload } from './download-menu.tsx';
import { Schedule } from './schedule.tsx';
import type { Edit } from './schedule-edits.ts';
import {
  ENTERED_ORDER,
  pointsNamed,
  type Sort,
  scheduleColumns,
  scheduleLead,
  sortedPoints,
} from './schedule-rows.ts';
import { scheduleTsv } from './schedule-text.ts';
import { keptColumns, PointFinder, ScheduleColumnsChoice } from './schedule-view.tsx';
import { useDeskState } from './use-desk-state.ts';

/** From so many points on one looks for a point by its name. */
const LONG = 8;

interface SchedulePaneProps {
  store: DeskStore;
  onDownload: (what: NetDownload) => void;
  /** Opens the form for a typed point; null where nothing may be added. */
  onAdd: (() => void) | null;
  /** Shows the sheet, where it is not beside the table already. */
  onSheet: () => void;
  className?: string;
  /** In the place of the heading: the heading beside the other tables below the sheet. */
  views?: ReactNode;
}

/** The schedule below the sheet, with what makes its figures and what may be taken from it. */
export function SchedulePane({
  store,
  onDownload,
  onAdd,
  onSheet,
  className = '',
  views,
}: SchedulePaneProps) {
  const { document, reading, documentRevision, pointsOf, readingFailed, readOnly, selection } = useDeskState(
    store,
    'document',
    'reading',
    'documentRevision',
    'pointsOf',
    'readingFailed',
    'readOnly',
    'selection',
  );
  const [sort, setSort] = useState<Sort>(ENTERED_ORDER);
  const [typed, setTyped] = useState('');
  const [columns] = useState(keptColumns);
  const hidden = useStore(columns);
  const box = useRef<HTMLElement>(null);
  const notice = useNotice();
  const stale = pointsOf !== documentRevision;
  const selectedIds = selection.kind === 'readingPoint' ? selection.ids : [];
  useSelectedInView(box, selectedIds[0]);
  const copy = async () => {
    if (!reading) return;
    const done = await copyText(scheduleTsv(document, reading.points, sort, reading.measured));
    notice(done ? text.copied : text.notCopied);
  };
  const edit = (made: Edit) => {
    store.run(made.label, made.ops);
  };
  const select = (id: string) => {
    if (!selectedIds.includes(id)) store.select({ kind: 'readingPoint', ids: [id] });
  };
  const look = (point: PointReading) => {
    select(point.id);
    if (point.sheetAt) store.lookAt(point.sheetAt);
    onSheet();
  };
  const all = reading?.points ?? [];
  const points = pointsNamed(all, typed);
  return (
    <section
      ref={box}
      aria-label={text.title}
      aria-busy={stale}
      className={`relative flex flex-col bg-film ${className}`}
    >
      <div className="flex shrink-0 flex-wrap items-baseline gap-x-3 gap-y-1 px-2.5 py-2">
        {views ?? <h2 className="m-0 text-base font-bold">{text.title}</h2>}
        <span className="min-w-40 flex-1 text-sm text-ink-2">{leadOf(document, reading, stale)}</span>
        <span className="ml-auto flex flex-wrap items-center gap-2">
          {all.length >= LONG || typed !== '' ? (
            <PointFinder
              typed={typed}
              onType={setTyped}
              found={points.length}
              all={all.length}
              onFirst={() => {
                const [first] = sortedPoints(points, sort, reading?.measured);
                if (first) look(first);
              }}
            />
          ) : null}
          {reading && all.length > 0 ? (
            <ScheduleColumnsChoice
              columns={scheduleColumns(document, reading.measured.length > 0)}
              hidden={hidden}
              onChange={(next) => columns.setState(next, true)}
            />
          ) : null}
          {onAdd ? <SmallButton onClick={onAdd}>{text.add}</SmallButton> : null}
          <SmallButton onClick={() => void copy()}>{text.copy}</SmallButton>
          <DownloadMenu canDraw={reading?.setOut.state === 'fitted'} onDownload={onDownload} />
        </span>
      </div>
      <ScheduleState reading={reading} failed={readingFailed} />
      {/* Where large letters leave it no room below the heads, the pane around it scrolls. */}
      <div className="min-h-24 flex-1 overflow-auto">
        {reading && points.length > 0 ? (
          <div className={stale ? 'opacity-60' : ''}>
            <Schedule
              document={document}
              reading={reading}
              points={points}
              hidden={hidden}
              sort={sort}
              onSort={setSort}
              onEdit={readOnly ? null : edit}
              selectedIds={selectedIds}
              onSelect={select}
              onLook={look}
              onExplain={(id) => store.emitIntent({ type: 'openReading', id })}
              onMeasured={readOnly ? undefined : (id) => store.emitIntent({ type: 'openMeasured', id })}
            />
          </div>
        ) : null}
        {reading && all.length === 0 ? (
          <p className="m-0 px-2.5 py-1 text-ink-2">{readOnly ? text.emptyReadOnly : text.empty}</p>
        ) : null}
        {all.length > 0 && points.length === 0 ? (
          <p className="m-0 px-2.5 py-1 text-ink-2">
            {viewText.none}{' '}
            <button type="button" className="touch underline" onClick={() => setTyped('')}>
              {viewText.clear}
            </button>
          </p>
        ) : null}
        <p className="sticky left-0 m-0 px-2.5 py-2 text-sm text-ink-2">{text.caution}</p>
      </div>
    </section>
  );
}

function leadOf(document: FlowNetDocument, reading: NetReading | null, stale: boolean): string {
  const parts = [scheduleLead(document, reading), text.plusMinus];
  return (stale ? [...parts, text.workingOut] : parts).join(', ');
}

/** Says why there is no figure while the net is unfinished: the gravest thing that stands in the way. */
export function ScheduleState({ reading, failed }: { reading: NetReading | null; failed: boolean }) {
  if (failed) return <p className="m-0 bg-doubt px-2.5 py-1.5 text-wrong">{text.failed}</p>;
  if (!reading || reading.state === 'read') return null;
  const [first] = reading.findings.filter((found) => found.weight === 'wrong' || found.weight === 'missing');
  return (
    <p className="sticky left-0 m-0 bg-doubt px-2.5 py-1.5 text-attention">
      <b className="font-semibold">{text.unfinished}.</b> {sentenceText(first?.text ?? '')}
    </p>
  );
}

/** A button beside the heading of a table below the sheet. */
export function SmallButton({ onClick, children }: { onClick: () => void; children: ReactNode }) {
  return (
    <button type="button" className={buttonClass('quiet', 'px-2 py-[2px] text-sm')} onClick={onClick}>
      {children}
    </button>
  );
}

/** Brings the row of a point into view that was chosen on the sheet. */
function useSelectedInView(box: React.RefObject<HTMLElement | null>, id: string | undefined): void {
  useEffect(() => {
    if (!id || box.current?.contains(document.activeElement)) return;
    box.current?.querySelector('tr[aria-selected="true"]')?.scrollIntoView({ block: 'nearest' });
  }, [box, id]);
}
