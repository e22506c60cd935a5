import { useEffect, useMemo, useState } from 'react';
import { useStore } from 'zustand';
import { classNames } from '#client/components/class-names.ts';
import { sectionViewText as text } from '#client/text/section-view.ts';
import type { FrameReading } from '#shared/contract/reading-frame.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { type SectionView, sectionViews } from '../model/section-views.ts';
import type { ViewStore } from '../model/view-store.ts';

/** Chooses between the sheet as drawn and the natural or the transformed section, where there is a difference. */
export function SectionViewSwitch({ store, views }: { store: DeskStore; views: ViewStore }) {
  const frame = useSteadyFrame(useStore(store, (state) => state.reading?.frame ?? null));
  const [asked, setAsked] = useState<SectionView>('sheet');
  const offered = useMemo(() => sectionViews(frame), [frame]);
  // A way of seeing that the inputs no longer allow gives way to the drawing.
  const shown = offered.has(asked) ? asked : 'sheet';
  const map = offered.get(shown) ?? null;
  useEffect(() => views.seeAs(map), [views, map]);
  const remark = frame?.kind === 'none' ? <Remark>{text.noCommon}</Remark> : null;
  if (offered.size < 2) return remark;
  const isDrawnTransformed = frame?.kind === 'transformed' && !offered.has('transformed');
  return (
    <>
      {remark}
      <fieldset data-over-sheet className="m-0 flex rounded-sheet border border-rule bg-film p-0">
        <legend className="sr-only">{text.title}</legend>
        {[...offered.keys()].map((view) => (
          <button
            key={view}
            type="button"
            aria-pressed={view === shown}
            title={view === 'sheet' && isDrawnTransformed ? text.drawnTransformed : text.titles[view]}
            className={classNames(
              'touch border-0 px-2.5 py-1 leading-[1.4] hover:bg-hover',
              view === shown ? 'bg-chosen font-semibold' : 'bg-transparent',
            )}
            onClick={() => setAsked(view)}
          >
            {text.views[view]}
          </button>
        ))}
      </fieldset>
    </>
  );
}

function Remark({ children }: { children: string }) {
  return (
    <p data-over-sheet className="m-0 max-w-80 rounded-sheet border border-rule bg-film px-2.5 py-1 text-sm">
      {children}
    </p>
  );
}

/** The frame of the reading as long as it says the same: each reading brings a new one, and the view must stay. */
function useSteadyFrame(frame: FrameReading | null): FrameReading | null {
  const key = JSON.stringify(frame);
  return useMemo((): FrameReading | null => JSON.parse(key), [key]);
}
