import { type ReactNode, useId } from 'react';
import { classNames } from '#client/components/class-names.ts';
import { focusSheet, usePartKeys } from '#client/features/desk/components/part-keys.ts';
import { type PaneId, type PaneSizes, panePx } from '#client/features/desk/model/pane-sizes.ts';
import { deskPageText as text } from '#client/text/desk-page.ts';
import { DeskPaneEdge } from './desk-pane-edge.tsx';
import { PaneSwitch } from './pane-switch.tsx';
import type { Panes } from './use-panes.ts';

export type DeskPane = 'sheet' | 'schedule' | 'notes' | 'block';
const PANES: readonly DeskPane[] = ['sheet', 'schedule', 'notes', 'block'];

interface DeskGridProps {
  /** What the page is about, for those who cannot see the trail. */
  heading: string;
  tools: ReactNode;
  lines: ReactNode;
  sheet: ReactNode;
  schedule: ReactNode;
  notes: ReactNode;
  block: ReactNode;
  /** What the margin shows besides the notes: its pane is named after it on a narrow screen. */
  marginIsForm: boolean;
  narrow: boolean;
  /** The pane shown where they do not fit side by side. */
  pane: DeskPane;
  onPane: (pane: DeskPane) => void;
  /** Sizes of the parts where they stand side by side. */
  panes: Panes;
}

/**
 * The desk laid out as a sheet: tools at the left, drawing, schedule below it, and in the margin notes over the title
 * block. On a narrow screen the four become panes of one place; those not shown keep their size, so that the sheet
 * keeps its view. Both layouts are the same elements in other places: what is typed in a field or drawn by half stays
 * when a tablet is turned.
 */
export function DeskGrid(props: DeskGridProps) {
  usePartKeys();
  const id = useId();
  const { narrow, pane, onPane, panes } = props;
  const { sizes, window, letterScale } = panes;
  const px = (each: PaneId) => panePx(each, window, sizes) * letterScale;
  const look = narrow ? narrowLook(pane) : wideLook(sizes);
  const gridTemplate = narrow
    ? 'auto auto minmax(0, 1fr) / minmax(0, 1fr)'
    : `minmax(0, 1fr) / ${px('tools')}px minmax(0, 1fr) ${px('margin')}px`;
  const edge = (each: PaneId, side: 'left' | 'right' | 'below') =>
    narrow ? null : <DeskPaneEdge pane={each} side={side} paneId={id + each} panes={panes} />;
  return (
    <main id="content" tabIndex={-1} className="flex min-h-0 flex-1 flex-col">
      <h1 className="sr-only">{props.heading}</h1>
      <button type="button" className={SKIP_LINK} onClick={focusSheet}>
        {text.skipToSheet}
      </button>
      <div className="relative grid min-h-0 flex-1 overflow-hidden" style={{ gridTemplate }}>
        <div id={`${id}tools`} data-desk-part className={look.tools}>
          {props.tools}
        </div>
        <div className={look.middle}>
          <div data-desk-part className={look.drawing}>
            <div className={look.lines}>{props.lines}</div>
            <div className={look.sheet}>{props.sheet}</div>
          </div>
          <div
            id={`${id}figures`}
            data-desk-part
            className={look.schedule}
            style={narrow ? undefined : { height: px('figures') }}
          >
            {props.schedule}
          </div>
          {edge('figures', 'below')}
        </div>
        <aside id={`${id}margin`} data-desk-part className={look.margin}>
          <div className={look.notes}>{props.notes}</div>
          <div data-desk-part className={look.block}>
            {props.block}
          </div>
        </aside>
        {edge('tools', 'left')}
        {edge('margin', 'right')}
      </div>
      {narrow ? (
        <PaneSwitch
          panes={PANES}
          names={props.marginIsForm ? { ...text.panes, notes: text.formPane } : text.panes}
          pane={pane}
          onPane={onPane}
        />
      ) : null}
    </main>
  );
}

/** Seen only while it has the focus; takes no room then either. */
const SKIP_LINK =
  'sr-only focus:not-sr-only focus:absolute focus:top-1 focus:left-1 focus:z-20 focus:border focus:border-ink focus:bg-film focus:px-3 focus:py-1';

type Look = Readonly<
  Record<
    'tools' | 'middle' | 'drawing' | 'lines' | 'sheet' | 'schedule' | 'margin' | 'notes' | 'block',
    string
  >
>;

function wideLook(sizes: PaneSizes): Look {
  const shown = (pane: PaneId, className: string) =>
    classNames('min-h-0', sizes[pane].folded ? 'hidden' : className);
  return {
    tools: shown('tools', 'col-start-1 row-start-1 flex flex-col border-r border-rule'),
    middle: 'relative col-start-2 row-start-1 flex min-h-0 min-w-0 flex-col',
    drawing: 'flex min-h-0 min-w-0 flex-1 flex-col',
    lines: 'contents',
    sheet: 'contents',
    schedule: shown('figures', 'min-w-0 shrink-0 overflow-y-auto border-t border-rule'),
    margin: shown('margin', 'col-start-3 row-start-1 flex flex-col border-l-[1.5px] border-ink bg-film'),
    notes: 'contents',
    block: 'max-h-[60%] shrink-0 overflow-y-auto',
  };
}

/** What goes with every pane stands in the first row, the tools over the sheet in the second. */
function narrowLook(shown: DeskPane): Look {
  const place = (own: DeskPane, rows: string, className: string) =>
    classNames('col-start-1 min-h-0 min-w-0', rows, className, shown !== own && 'invisible');
  const whole = 'row-start-2 row-end-4';
  return {
    tools: place('sheet', 'row-start-2', 'border-b border-rule'),
    middle: 'contents',
    drawing: 'contents',
    lines: 'col-start-1 row-start-1 min-w-0',
    sheet: place('sheet', 'row-start-3', 'flex flex-col'),
    schedule: place('schedule', whole, 'flex flex-col overflow-y-auto'),
    margin: 'contents',
    notes: place('notes', whole, 'flex flex-col bg-film'),
    block: place('block', whole, 'overflow-y-auto bg-film'),
  };
}
