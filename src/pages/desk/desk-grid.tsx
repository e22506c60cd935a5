import { type ReactNode, useId } from 'react';
import { classNames } from '#client/components/class-names.ts';
import { focusSheet, usePartKeys } from '#client/features/desk/components/part-keys.ts';
import { type PaneId, panePx } from '#client/features/desk/model/pane-sizes.ts';
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
 * keeps its view.
 */
export function DeskGrid(props: DeskGridProps) {
  usePartKeys();
  return (
    <main id="content" tabIndex={-1} className="flex min-h-0 flex-1 flex-col">
      <h1 className="sr-only">{props.heading}</h1>
      <button type="button" className={SKIP_LINK} onClick={focusSheet}>
        {text.skipToSheet}
      </button>
      {props.narrow ? <NarrowGrid {...props} /> : <WideGrid {...props} />}
    </main>
  );
}

/** Seen only while it has the focus; takes no room then either. */
const SKIP_LINK =
  'sr-only focus:not-sr-only focus:absolute focus:top-1 focus:left-1 focus:z-20 focus:border focus:border-ink focus:bg-film focus:px-3 focus:py-1';

function WideGrid({ tools, lines, sheet, schedule, notes, block, panes }: DeskGridProps) {
  const id = useId();
  const { sizes, window } = panes;
  const px = (pane: PaneId) => panePx(pane, window, sizes);
  const shown = (pane: PaneId, className: string) =>
    classNames('min-h-0', sizes[pane].folded ? 'hidden' : className);
  return (
    <div
      className="relative grid min-h-0 flex-1 overflow-hidden"
      style={{ gridTemplate: `minmax(0, 1fr) / ${px('tools')}px minmax(0, 1fr) ${px('margin')}px` }}
    >
      <div
        id={`${id}tools`}
        data-desk-part
        className={shown('tools', 'col-start-1 row-start-1 flex flex-col border-r border-rule')}
      >
        {tools}
      </div>
      <div className="relative col-start-2 row-start-1 flex min-h-0 min-w-0 flex-col">
        <div data-desk-part className="flex min-h-0 min-w-0 flex-1 flex-col">
          {lines}
          {sheet}
        </div>
        <div
          id={`${id}figures`}
          data-desk-part
          className={shown('figures', 'min-w-0 shrink-0 border-t border-rule')}
          style={{ height: px('figures') }}
        >
          {schedule}
        </div>
        <DeskPaneEdge pane="figures" side="below" paneId={`${id}figures`} panes={panes} />
      </div>
      <aside
        id={`${id}margin`}
        data-desk-part
        className={shown(
          'margin',
          'col-start-3 row-start-1 flex flex-col border-l-[1.5px] border-ink bg-film',
        )}
      >
        {notes}
        <div data-desk-part className="max-h-[60%] shrink-0 overflow-y-auto">
          {block}
        </div>
      </aside>
      <DeskPaneEdge pane="tools" side="left" paneId={`${id}tools`} panes={panes} />
      <DeskPaneEdge pane="margin" side="right" paneId={`${id}margin`} panes={panes} />
    </div>
  );
}

function NarrowGrid(props: DeskGridProps) {
  const { tools, lines, sheet, schedule, notes, block, pane, onPane } = props;
  const names = props.marginIsForm ? { ...text.panes, notes: text.formPane } : text.panes;
  const place = (own: DeskPane) =>
    classNames('col-start-1 row-start-1 flex min-h-0 min-w-0 flex-col', pane !== own && 'invisible');
  return (
    <>
      {lines}
      <div className="grid min-h-0 flex-1 grid-cols-[minmax(0,1fr)] grid-rows-[minmax(0,1fr)]">
        <div className={place('sheet')}>
          <div data-desk-part className="shrink-0 border-b border-rule">
            {tools}
          </div>
          <div data-desk-part className="flex min-h-0 flex-1 flex-col">
            {sheet}
          </div>
        </div>
        <div data-desk-part className={place('schedule')}>
          {schedule}
        </div>
        <div data-desk-part className={classNames(place('notes'), 'bg-film')}>
          {notes}
        </div>
        <div data-desk-part className={classNames(place('block'), 'overflow-y-auto bg-film')}>
          {block}
        </div>
      </div>
      <PaneSwitch panes={PANES} names={names} pane={pane} onPane={onPane} />
    </>
  );
}
