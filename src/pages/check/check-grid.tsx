import type { ReactNode } from 'react';
import { classNames } from '#client/components/class-names.ts';
import { useMedia } from '#client/lib/use-media.ts';
import { ROOMY_QUERY } from '#client/lib/width-queries.ts';
import { checkText as text } from '#client/text/revisions.ts';
import { PaneSwitch } from '../desk/pane-switch.tsx';

const PANES = ['sheet', 'schedule', 'notes', 'check'] as const;
export type CheckPane = (typeof PANES)[number];

interface CheckGridProps {
  heading: string;
  sheet: ReactNode;
  schedule: ReactNode;
  notes: ReactNode;
  block: ReactNode;
  check: ReactNode;
  narrow: boolean;
  pane: CheckPane;
  onPane: (pane: CheckPane) => void;
}

/**
 * Sheet and schedule as on the desk; in the margin the check, the notes and the title block. All layouts are the same
 * elements in other places: what is typed of a decision stays when a tablet is turned.
 */
export function CheckGrid(props: CheckGridProps) {
  const { narrow, pane, onPane } = props;
  // With room for three columns the check stands at the left, where the tools are on the desk.
  const roomy = useMedia(ROOMY_QUERY);
  const look = narrow ? narrowLook(pane) : roomy ? ROOMY_LOOK : CLOSE_LOOK;
  return (
    <main id="content" className="flex min-h-0 flex-1 flex-col">
      <h1 className="sr-only">{props.heading}</h1>
      <div className={`grid min-h-0 flex-1 grid-rows-[minmax(0,1fr)_auto] ${look.grid}`}>
        <div className={look.middle}>
          <div className={look.sheet}>{props.sheet}</div>
          <div className={look.schedule}>{props.schedule}</div>
        </div>
        <aside className={look.margin}>
          <div className={look.scrolled}>
            <div className={look.check}>{props.check}</div>
            <div className={look.notes}>{props.notes}</div>
          </div>
          <div className={look.block}>{props.block}</div>
        </aside>
      </div>
      {narrow ? <PaneSwitch panes={PANES} names={text.panes} pane={pane} onPane={onPane} /> : null}
    </main>
  );
}

type Look = Readonly<
  Record<
    'grid' | 'middle' | 'sheet' | 'schedule' | 'margin' | 'scrolled' | 'check' | 'notes' | 'block',
    string
  >
>;

const BOTH_ROWS = 'row-start-1 row-end-3 min-h-0 min-w-0';
const SHEET_OVER_SCHEDULE = {
  sheet: 'flex min-h-0 min-w-0 flex-1 flex-col',
  schedule: 'h-58 min-w-0 shrink-0 border-t border-rule',
};

const ROOMY_LOOK: Look = {
  ...SHEET_OVER_SCHEDULE,
  grid: 'grid-cols-[min(16.875rem,25vw)_minmax(0,1fr)_min(21.25rem,32vw)] xl:grid-cols-[min(17.5rem,21vw)_minmax(0,1fr)_min(23.25rem,28vw)]',
  middle: `col-start-2 flex flex-col ${BOTH_ROWS}`,
  margin: 'contents',
  scrolled: 'contents',
  check: `col-start-1 overflow-y-auto border-r border-rule bg-film ${BOTH_ROWS}`,
  notes: 'col-start-3 row-start-1 flex min-h-0 flex-col overflow-y-auto border-l-[1.5px] border-ink bg-film',
  block: 'col-start-3 row-start-2 max-h-[55dvh] overflow-y-auto border-l-[1.5px] border-ink bg-film',
};

const CLOSE_LOOK: Look = {
  ...SHEET_OVER_SCHEDULE,
  grid: 'grid-cols-[minmax(0,1fr)_min(20rem,40vw)]',
  middle: `col-start-1 flex flex-col ${BOTH_ROWS}`,
  margin: `col-start-2 flex flex-col border-l-[1.5px] border-ink bg-film ${BOTH_ROWS}`,
  scrolled: 'flex min-h-0 flex-1 flex-col overflow-y-auto',
  check: 'shrink-0 border-b border-rule',
  notes: 'contents',
  block: 'max-h-[60%] shrink-0 overflow-y-auto',
};

/** One part at a time; the sheet keeps its size meanwhile, and so its view. The title block goes with the check. */
function narrowLook(shown: CheckPane): Look {
  const whole = classNames('col-start-1 flex flex-col', BOTH_ROWS);
  const place = (own: CheckPane) => classNames(whole, shown !== own && 'invisible');
  const checking = shown === 'check';
  return {
    grid: 'grid-cols-[minmax(0,1fr)]',
    middle: 'contents',
    sheet: place('sheet'),
    schedule: place('schedule'),
    margin: checking ? `${whole} overflow-y-auto bg-film` : 'contents',
    scrolled: 'contents',
    check: checking ? 'shrink-0' : 'hidden',
    notes: shown === 'notes' ? `${whole} bg-film` : 'hidden',
    block: checking ? 'shrink-0' : 'hidden',
  };
}
