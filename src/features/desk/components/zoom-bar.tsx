import { useStore } from 'zustand';
import { deskViewText as text } from '#client/text/desk-view.ts';
import type { ViewStore } from '../model/view-store.ts';

const STEP = 1.25;
const BUTTON = 'border-0 bg-transparent px-2.5 py-1 leading-[1.4] hover:bg-hover touch';

/** Zooms the sheet and shows it whole. The percentage is screen pixels per pixel of the scan. */
export function ZoomBar({ views }: { views: ViewStore }) {
  const zoom = useStore(views, (state) => state.view.zoom);
  return (
    <fieldset data-over-sheet className="m-0 flex rounded-sheet border border-rule bg-film p-0">
      <legend className="sr-only">{text.zoomBar}</legend>
      <button type="button" className={BUTTON} aria-label={text.zoomOut} onClick={() => views.zoom(1 / STEP)}>
        −
      </button>
      <output className="flex min-w-16 items-center justify-center border-x border-rule px-2.5 py-1">
        {text.zoomShown(zoom)}
      </output>
      <button type="button" className={BUTTON} aria-label={text.zoomIn} onClick={() => views.zoom(STEP)}>
        +
      </button>
      <button
        type="button"
        className={`${BUTTON} border-l border-rule`}
        title={text.fitTitle}
        onClick={() => views.fit()}
      >
        {text.fit}
      </button>
    </fieldset>
  );
}
