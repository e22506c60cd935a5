import * as z from 'zod/mini';
import type { StoreApi } from 'zustand/vanilla';
import { AnchoredList } from '#client/components/anchored-list.tsx';
import { buttonClass } from '#client/components/button.tsx';
import { keptLocally } from '#client/lib/kept-locally.ts';
import { currentPersonId } from '#client/lib/sign-in-state.ts';
import { scheduleViewText as text } from '#client/text/panes.ts';
import type { HideableColumn, ScheduleColumn } from './schedule-rows.ts';

const HIDEABLE = [
  'offset',
  'elevation',
  'dropsLost',
  'totalHead',
  'pressureHead',
  'porePressure',
  'measured',
  'difference',
] as const satisfies readonly HideableColumn[];
const keptNames = z.array(z.enum(HIDEABLE));

/** Columns that this person leaves out of the schedule on this browser. */
export function keptColumns(): StoreApi<readonly HideableColumn[]> {
  return keptLocally(`tracehead schedule columns ${currentPersonId()}`, parseColumns);
}

/** What was kept as text; anything else than columns hides none. */
export function parseColumns(kept: string | null): readonly HideableColumn[] {
  try {
    const parsed = z.safeParse(keptNames, JSON.parse(kept ?? '[]'));
    return parsed.success ? parsed.data : [];
  } catch {
    return [];
  }
}

interface PointFinderProps {
  typed: string;
  onType: (typed: string) => void;
  found: number;
  all: number;
  /** Shows the first of the points found on the sheet. */
  onFirst: () => void;
}

/** Narrows a long schedule to the points of a name; Enter goes to the first of them, Escape shows all again. */
export function PointFinder({ typed, onType, found, all, onFirst }: PointFinderProps) {
  return (
    <span className="flex items-center gap-2">
      <span role="status" className="text-sm text-ink-2">
        {typed === '' ? '' : text.found(found, all)}
      </span>
      <input
        type="search"
        aria-label={text.filter}
        placeholder={text.filter}
        title={text.filterHelp}
        value={typed}
        className="w-[7.5rem] rounded-sheet border border-edge bg-white px-2 py-[2px] text-sm"
        onChange={(event) => onType(event.target.value)}
        onKeyDown={(event) => {
          if (event.key === 'Enter') onFirst();
          if (event.key === 'Escape') onType('');
        }}
      />
    </span>
  );
}

interface ScheduleColumnsChoiceProps {
  columns: readonly ScheduleColumn[];
  hidden: readonly HideableColumn[];
  onChange: (hidden: readonly HideableColumn[]) => void;
}

/** Which columns the schedule shows; the name always stays. */
export function ScheduleColumnsChoice({ columns, hidden, onChange }: ScheduleColumnsChoiceProps) {
  return (
    <AnchoredList
      listLabel={text.columnsTitle}
      button={text.columns}
      buttonClassName={buttonClass('quiet', 'px-2 py-[2px] text-sm')}
      listClassName="w-[13.75rem] py-1.5"
    >
      {() => (
        <>
          {columns.map(({ column, label }) =>
            column === 'name' ? null : (
              <label key={column} className="touch flex items-center gap-2 px-3 py-1 hover:bg-hover">
                <input
                  type="checkbox"
                  checked={!hidden.includes(column)}
                  onChange={({ target }) =>
                    onChange(target.checked ? hidden.filter((each) => each !== column) : [...hidden, column])
                  }
                />
                {label}
              </label>
            ),
          )}
          {hidden.length > 0 ? (
            <button
              type="button"
              className="touch mt-1 block w-full border-0 border-t border-rule bg-transparent px-3 pt-1.5 text-left underline"
              onClick={() => onChange([])}
            >
              {text.allColumns}
            </button>
          ) : null}
        </>
      )}
    </AnchoredList>
  );
}
