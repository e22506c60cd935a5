import { createStore, type StoreApi } from 'zustand/vanilla';
import { type ScreenPx, type SheetPx, screenPx, sheetPx } from '#shared/compute/frames.ts';
import type { LinearMap } from '#shared/compute/linear-map.ts';
import {
  centredOn,
  fitFrame,
  keptInSight,
  onWholePixels,
  panBy,
  resized,
  type SheetFrame,
  type SheetSize,
  seenThrough,
  type Viewport,
  zoomAbout,
} from './viewport.ts';

export type ViewState = { readonly view: Viewport };
export type ViewActions = {
  resize(widthPx: number, heightPx: number): void;
  pan(dxPx: number, dyPx: number): void;
  /** Zooms about a place on screen; without one about the middle. */
  zoom(factor: number, at?: ScreenPx): void;
  fit(): void;
  lookAt(at: SheetPx): void;
  /** Shows the sheet through a linear map, or as it is drawn. */
  seeAs(map: LinearMap | null): void;
};
export type ViewStore = StoreApi<ViewState> & ViewActions;

/** A place that is looked at is shown at least so large. */
const LOOK_ZOOM = 0.5;

/** The one viewport of a sheet view; tiles and traces both follow it. `frame`: the section's part of the sheet. */
export function createViewStore(sheet: SheetSize, frame: SheetFrame | null): ViewStore {
  const whole = frame ?? ([0, 0, sheet.widthPx, sheet.heightPx] as const);
  const unmeasured: Viewport = { zoom: 1, origin: sheetPx(0, 0), widthPx: 0, heightPx: 0 };
  const store = createStore<ViewState>(() => ({ view: unmeasured }));
  const set = (view: Viewport) => {
    if (view !== store.getState().view) {
      store.setState({ view: onWholePixels(view, globalThis.devicePixelRatio || 1) });
    }
  };
  const now = () => store.getState().view;
  return {
    ...store,
    resize(widthPx, heightPx) {
      if (widthPx <= 0 || heightPx <= 0) return;
      const view = now();
      if (view.widthPx === widthPx && view.heightPx === heightPx) return;
      set(
        view.widthPx === 0
          ? fitFrame({ ...view, widthPx, heightPx }, whole)
          : resized(view, widthPx, heightPx, sheet),
      );
    },
    pan: (dxPx, dyPx) => set(panBy(now(), dxPx, dyPx, sheet)),
    zoom(factor, at) {
      const view = now();
      set(zoomAbout(view, at ?? screenPx(view.widthPx / 2, view.heightPx / 2), factor, sheet));
    },
    seeAs(map) {
      const view = now();
      if ((view.seenAs ?? null) === map) return;
      set(
        view.widthPx === 0 ? seenThrough(view, map, sheet) : fitFrame(seenThrough(view, map, sheet), whole),
      );
    },
    fit: () => set(fitFrame(now(), whole)),
    lookAt(at) {
      const view = now();
      set(keptInSight(centredOn({ ...view, zoom: Math.max(view.zoom, LOOK_ZOOM) }, at), sheet));
    },
  };
}
