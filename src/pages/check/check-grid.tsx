import type { ReactNode } from 'react';
import { classNames } from '#client/components/class-names.ts';
import { useMedia } from '#client/lib/use-media.ts';
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

/** Sheet and schedule as on the desk; in the margin the check, the notes and the title block. */
export function CheckGrid(props: CheckGridProps) {
  return (
    <main id="content" className="flex min-h-0 flex-1 flex-col">
      <h1 className="sr-only">{props.heading}</h1>
      {props.narrow ? <NarrowGrid {...props} /> : <WideGrid {...props} />}
    </main>
  );
}

/** With room for three columns the check stands at the left, where the tools are on the desk. */
const ROOMY = '(min-width: 1080px)';

function WideGrid({ sheet, schedule, notes, block, check }: CheckGridProps) {
  const roomy = useMedia(ROOMY);
  const columns = roomy
    ? 'grid-cols-[270px_minmax(0,1fr)_340px] xl:grid-cols-[280px_minmax(0,1fr)_372px]'
    : 'grid-cols-[minmax(0,1fr)_320px]';
  return (
    <div className={`grid min-h-0 flex-1 grid-rows-[minmax(0,1fr)_232px] ${columns}`}>
      {roomy ? (
        <div className="row-span-2 min-h-0 overflow-y-auto border-r border-rule bg-film">{check}</div>
      ) : null}
      <div className="flex min-h-0 min-w-0 flex-col">{sheet}</div>
      <aside className="row-span-2 flex min-h-0 flex-col border-l-[1.5px] border-ink bg-film">
        <div className="flex min-h-0 flex-1 flex-col overflow-y-auto">
          {roomy ? null : <div className="shrink-0 border-b border-rule">{check}</div>}
          {notes}
        </div>
        <div className="max-h-[60%] shrink-0 overflow-y-auto">{block}</div>
      </aside>
      <div className="min-h-0 min-w-0 border-t border-rule">{schedule}</div>
    </div>
  );
}

function NarrowGrid({ sheet, schedule, notes, block, check, pane, onPane }: CheckGridProps) {
  const place = (own: CheckPane) =>
    classNames('col-start-1 row-start-1 flex min-h-0 min-w-0 flex-col', pane !== own && 'invisible');
  return (
    <>
      <div className="grid min-h-0 flex-1 grid-cols-[minmax(0,1fr)] grid-rows-[minmax(0,1fr)]">
        <div className={place('sheet')}>{sheet}</div>
        <div className={place('schedule')}>{schedule}</div>
        <div className={classNames(place('notes'), 'bg-film')}>{notes}</div>
        <div className={classNames(place('check'), 'overflow-y-auto bg-film')}>
          {check}
          {block}
        </div>
      </div>
      <PaneSwitch panes={PANES} names={text.panes} pane={pane} onPane={onPane} />
    </>
  );
}
