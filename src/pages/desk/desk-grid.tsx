import type { ReactNode } from 'react';
import { classNames } from '#client/components/class-names.ts';
import { deskPageText as text } from '#client/text/desk-page.ts';
import { PaneSwitch } from './pane-switch.tsx';

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
}

/**
 * The desk laid out as a sheet: tools at the left, drawing, schedule below it, and in the margin notes over the title
 * block. On a narrow screen the four become panes of one place; those not shown keep their size, so that the sheet
 * keeps its view.
 */
export function DeskGrid(props: DeskGridProps) {
  return (
    <main id="content" className="flex min-h-0 flex-1 flex-col">
      <h1 className="sr-only">{props.heading}</h1>
      {props.narrow ? <NarrowGrid {...props} /> : <WideGrid {...props} />}
    </main>
  );
}

function WideGrid({ tools, lines, sheet, schedule, notes, block }: DeskGridProps) {
  return (
    <div className="grid min-h-0 flex-1 grid-cols-[168px_minmax(0,1fr)_320px] grid-rows-[minmax(0,1fr)_232px] lg:grid-cols-[188px_minmax(0,1fr)_340px] xl:grid-cols-[188px_minmax(0,1fr)_372px]">
      <div className="row-span-2 flex min-h-0 flex-col border-r border-rule">{tools}</div>
      <div className="flex min-h-0 min-w-0 flex-col">
        {lines}
        {sheet}
      </div>
      <aside className="row-span-2 flex min-h-0 flex-col border-l-[1.5px] border-ink bg-film">
        {notes}
        <div className="max-h-[60%] shrink-0 overflow-y-auto">{block}</div>
      </aside>
      <div className="min-h-0 min-w-0 border-t border-rule">{schedule}</div>
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
          <div className="shrink-0 border-b border-rule">{tools}</div>
          {sheet}
        </div>
        <div className={place('schedule')}>{schedule}</div>
        <div className={classNames(place('notes'), 'bg-film')}>{notes}</div>
        <div className={classNames(place('block'), 'overflow-y-auto bg-film')}>{block}</div>
      </div>
      <PaneSwitch panes={PANES} names={names} pane={pane} onPane={onPane} />
    </>
  );
}
