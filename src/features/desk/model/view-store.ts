import { createStore, type StoreApi } from 'zustand/vanilla';
import { type ScreenPx, type SheetPx, screenPx, sheetPx } from '#shared/compute/frames.ts';
import type { LinearMap } from '#shared/compute/linear-map.ts';
import { isAffine, linearAt, type PlaneMap, planeProduct } from '#shared/compute/plane-map.ts';
import {
  centredOn,
  fitFrame,
  fitSheet,
  keptInSight,
  onWholePixels,
  panBy,
  resized,
  type SheetFrame,
  type SheetSize,
  seenThrough,
  sheetZoom,
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
  /** A place in the middle, at so many screen pixels to a sheet pixel as near as the view's bounds allow. */
  show(at: SheetPx, screenPxPerSheetPx: number): void;
  /** Shows the sheet through a linear map, or as it is drawn. */
  seeAs(map: LinearMap | null): void;
};
export type ViewStore = StoreApi<ViewState> & ViewActions;

/** A place that is looked at is shown at least so large. */
const LOOK_ZOOM = 0.5;

/**
 * The one viewport of a sheet view; tiles and traces both follow it. `sheet`: the raster that is shown; `frame`: the
 * section's part of the sheet.
 */
export function createViewStore(sheet: SheetSize, frame: SheetFrame | null): ViewStore {
  const asShown = sheet.fromBase ?? null;
  let section: LinearMap | null = null;
  const fitted = (view: Viewport) => (frame === null ? fitSheet(view, sheet) : fitFrame(view, frame));
  const unmeasured: Viewport = {
    zoom: 1,
    origin: sheetPx(0, 0),
    widthPx: 0,
    heightPx: 0,
    ...(asShown && { seenAs: asShown }),
  };
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
        view.widthPx === 0 ? fitted({ ...view, widthPx, heightPx }) : resized(view, widthPx, heightPx, sheet),
      );
    },
    pan: (dxPx, dyPx) => set(panBy(now(), dxPx, dyPx, sheet)),
    zoom(factor, at) {
      const view = now();
      set(zoomAbout(view, at ?? screenPx(view.widthPx / 2, view.heightPx / 2), factor, sheet));
    },
    seeAs(map) {
      if (section === map) return;
      section = map;
      const view = now();
      const through = seenThrough(view, map === null ? asShown : sectionAsShown(map, asShown), sheet);
      set(view.widthPx === 0 ? through : fitted(through));
    },
    fit: () => set(fitted(now())),
    show(at, screenPxPerSheetPx) {
      const view = now();
      const middle = screenPx(view.widthPx / 2, view.heightPx / 2);
      const zoomed = zoomAbout(view, middle, screenPxPerSheetPx / sheetZoom(view), sheet);
      set(keptInSight(centredOn(zoomed, at), sheet));
    },
    lookAt(at) {
      const view = now();
      set(keptInSight(centredOn({ ...view, zoom: Math.max(view.zoom, LOOK_ZOOM) }, at), sheet));
    },
  };
}

/** A view of the section, turned as the cleaned-up picture is; one that slants is seen as it was scanned. */
function sectionAsShown(section: LinearMap, asShown: PlaneMap | null): PlaneMap {
  if (asShown === null || !isAffine(asShown)) return section;
  return planeProduct(linearAt(asShown, 0, 0), section);
}
