import { type ReactNode, useState } from 'react';
import { useStore } from 'zustand';
import { buttonClass } from '#client/components/button.tsx';
import { Schedule } from '#client/features/desk/components/schedule.tsx';
import { ScheduleState } from '#client/features/desk/components/schedule-pane.tsx';
import { ENTERED_ORDER, type Sort, scheduleLead } from '#client/features/desk/components/schedule-rows.ts';
import type { DeskStore } from '#client/features/desk/model/desk-state.ts';
import { TickBox } from '#client/features/revisions/components/tick-box.tsx';
import { downloadFrom, downloadText } from '#client/lib/download.ts';
import { apiUrl } from '#client/lib/http.ts';
import { localeStore } from '#client/lib/locale.ts';
import { downloadsText } from '#client/text/downloads.ts';
import { checkText } from '#client/text/revisions.ts';
import { scheduleText as text } from '#client/text/schedule.ts';
import type { RevisionPayload } from '#shared/contract/revisions.ts';
import { BYTE_ORDER_MARK } from '#shared/text/csv.ts';
import { pointKey } from '#shared/text/figures-to-check.ts';
import { scheduleCsv } from '#shared/text/schedule-csv.ts';

interface FrozenScheduleProps {
  payload: RevisionPayload;
  store: DeskStore;
  /** The heading, beside which the other tables are named. */
  views: ReactNode;
}

/** The schedule as it was frozen: shown, sorted and kept as CSV, never worked out again. */
export function FrozenSchedule({ payload, store, views }: FrozenScheduleProps) {
  const { document, reading } = payload;
  const [sort, setSort] = useState<Sort>(ENTERED_ORDER);
  const selection = useStore(store, (state) => state.selection);
  const download = () => {
    const name = `${payload.drawing.number || 'net'}-${payload.label}-schedule.csv`;
    const csv = scheduleCsv(document, reading, localeStore.getState().mark);
    downloadText(BYTE_ORDER_MARK + csv, name, 'text/csv;charset=utf-8');
  };
  return (
    <section aria-label={text.title} className="h-full overflow-auto bg-film">
      <div className="sticky left-0 flex flex-wrap items-baseline gap-x-3 gap-y-1 px-2.5 py-2">
        {views}
        <span className="text-ink-2">
          {scheduleLead(document, reading)},{' '}
          {payload.engineVersion === '1' ? text.provisional : text.plusMinus}
        </span>
        <button
          type="button"
          className={buttonClass('quiet', 'ml-auto px-2 py-[2px] text-sm')}
          onClick={download}
        >
          {checkText.downloadCsv}
        </button>
        <button
          type="button"
          className={buttonClass('quiet', 'px-2 py-[2px] text-sm')}
          onClick={() => downloadFrom(apiUrl(`/revisions/${payload.revisionId}/traces.dxf`))}
        >
          {downloadsText.tracesOf}
        </button>
      </div>
      <ScheduleState reading={reading} failed={false} />
      {reading.points.length === 0 ? (
        <p className="m-0 px-2.5 py-1 text-ink-2">{text.emptyReadOnly}</p>
      ) : (
        <Schedule
          document={document}
          reading={reading}
          sort={sort}
          onSort={setSort}
          onEdit={null}
          markOf={(pointId, column) => <TickBox figureKey={pointKey(pointId, column)} />}
          selectedIds={selection.kind === 'readingPoint' ? selection.ids : []}
          onSelect={(id) => store.select({ kind: 'readingPoint', ids: [id] })}
        />
      )}
      <p className="sticky left-0 m-0 px-2.5 py-2 text-sm text-ink-2">{text.caution}</p>
    </section>
  );
}
