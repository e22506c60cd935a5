import { type ScreenPx, type SheetPx, screenPx, sheetPx } from '#shared/compute/frames.ts';
import { inverted, mapped } from '#shared/compute/linear-map.ts';
import {
  areaScaleAt,
  isAffine,
  linearAt,
  type PlaneMap,
  type ProjectiveMap,
  planeInverse,
  planeProduct,
  throughPlane,
} from '#shared/compute/plane-map.ts';

/**
 * The window through which the sheet is seen. Screen pixels are CSS pixels. The sheet may be seen through a map,
 * as the natural or the transformed section or as a cleaned-up picture has it: what the map makes of the sheet is the
 * picture, and places on the sheet are mapped back from it, so that tracing goes on as before.
 */
export type Viewport = {
  /** Screen pixels per pixel of the picture. */
  readonly zoom: number;
  /** Place of the picture seen at the view's top-left corner; the picture is the sheet where there is no map. */
  readonly origin: SheetPx;
  /** Sheet pixels to pixels of the picture; without one the sheet is seen as it is drawn. */
  readonly seenAs?: PlaneMap;
  readonly widthPx: number;
  readonly heightPx: number;
};

/** What is to be seen, with the map from its pixels to the sheet's where it is not the sheet's own raster. */
export type SheetSize = {
  readonly widthPx: number;
  readonly heightPx: number;
  readonly toBase?: ProjectiveMap | null;
  readonly fromBase?: ProjectiveMap | null;
};
/** `[left, top, width, height]` in sheet pixels. */
export type SheetFrame = readonly [number, number, number, number];

/** Enough to see each pixel of a scan as a square of its own. */
export const MAX_ZOOM = 40;
/** How much smaller than fitted the sheet may be seen. */
const SMALLEST_OF_FIT = 0.4;
/** Free margin around what is fitted, screen pixels. */
const FIT_MARGIN_PX = 16;
/** How much of the sheet must stay in sight, screen pixels. */
const IN_SIGHT_PX = 60;

export function toScreen(view: Viewport, at: SheetPx): ScreenPx {
  const [x, y] = view.seenAs === undefined ? at : throughPlane(view.seenAs, at[0], at[1]);
  return screenPx((x - view.origin[0]) * view.zoom, (y - view.origin[1]) * view.zoom);
}

export function toSheet(view: Viewport, at: ScreenPx): SheetPx {
  const x = at[0] / view.zoom + view.origin[0];
  const y = at[1] / view.zoom + view.origin[1];
  return view.seenAs === undefined
    ? sheetPx(x, y)
    : sheetPx(...throughPlane(planeInverse(view.seenAs), x, y));
}

/** The part of the sheet's plane that is seen, `[left, top, width, height]`: about all of it through a slanting map. */
export function seenFrame(view: Viewport): SheetFrame {
  const seen = seenOfPicture(view);
  return view.seenAs === undefined ? seen : frameThrough(planeInverse(view.seenAs), seen);
}

function seenOfPicture({ origin, zoom, widthPx, heightPx }: Viewport): SheetFrame {
  return [origin[0], origin[1], widthPx / zoom, heightPx / zoom];
}

/** From pixels of the raster that is shown to those of the picture; null where they are the same. */
export function rasterMap(view: Viewport, { toBase, fromBase }: SheetSize): PlaneMap | null {
  if (!toBase) return view.seenAs ?? null;
  if (view.seenAs === fromBase) return null;
  return view.seenAs === undefined ? toBase : planeProduct(view.seenAs, toBase);
}

/** The part of the raster's plane that is seen, in its pixels. */
export function seenOfRaster(view: Viewport, sheet: SheetSize): SheetFrame {
  const seen = seenOfPicture(view);
  const map = rasterMap(view, sheet);
  if (map === null) return seen;
  // What lies beyond the picture of a slanting view may lie beyond its horizon.
  const within = isAffine(map) ? seen : shared(seen, extentOf(view, sheet));
  return frameThrough(planeInverse(map), within);
}

/** The whole of what there is to be seen, in pixels of the picture. */
function extentOf(view: Viewport, sheet: SheetSize): SheetFrame {
  return frameThrough(rasterMap(view, sheet) ?? undefined, [0, 0, sheet.widthPx, sheet.heightPx]);
}

/** What two frames share; a frame without area at the edge of the second where they share nothing. */
function shared(a: SheetFrame, b: SheetFrame): SheetFrame {
  const left = Math.min(Math.max(a[0], b[0]), b[0] + b[2]);
  const top = Math.min(Math.max(a[1], b[1]), b[1] + b[3]);
  const right = Math.max(left, Math.min(a[0] + a[2], b[0] + b[2]));
  const bottom = Math.max(top, Math.min(a[1] + a[3], b[1] + b[3]));
  return [left, top, right - left, bottom - top];
}

/** The upright frame about what a map makes of a frame. */
export function frameThrough(map: PlaneMap | undefined, frame: SheetFrame): SheetFrame {
  if (map === undefined) return frame;
  const [left, top, width, height] = frame;
  const corners = [
    throughPlane(map, left, top),
    throughPlane(map, left + width, top),
    throughPlane(map, left, top + height),
    throughPlane(map, left + width, top + height),
  ];
  const xs = corners.map(([x]) => x);
  const ys = corners.map(([, y]) => y);
  const [x, y] = [Math.min(...xs), Math.min(...ys)];
  return [x, y, Math.max(...xs) - x, Math.max(...ys) - y];
}

/** Screen pixels per sheet pixel in the middle of the view, the mean where they differ with the direction. */
export function sheetZoom(view: Viewport): number {
  const { zoom, seenAs } = view;
  if (seenAs === undefined) return zoom;
  const [x, y] = toSheet(view, screenPx(view.widthPx / 2, view.heightPx / 2));
  return zoom * Math.sqrt(Math.abs(areaScaleAt(seenAs, x, y)));
}

/** The same place in the middle, through another map or none. */
export function seenThrough(view: Viewport, seenAs: PlaneMap | null, sheet: SheetSize): Viewport {
  const { seenAs: _, ...window } = view;
  const middle = toSheet(view, screenPx(view.widthPx / 2, view.heightPx / 2));
  return keptInSight(centredOn(seenAs === null ? window : { ...window, seenAs }, middle), sheet);
}

/** A place so many sheet pixels from another, in a direction as it is seen on screen. */
export function steppedOnScreen(view: Viewport, from: SheetPx, dx: number, dy: number): SheetPx {
  if (view.seenAs === undefined) return sheetPx(from[0] + dx, from[1] + dy);
  const [x, y] = mapped(inverted(linearAt(view.seenAs, from[0], from[1])), dx, dy);
  const scale = Math.hypot(dx, dy) / Math.hypot(x, y);
  return sheetPx(from[0] + scale * x, from[1] + scale * y);
}

/** The step on the sheet that goes in a direction as it is seen in the middle of the view, so many sheet pixels long. */
export function stepAsSeen(view: Viewport, dx: number, dy: number): [number, number] {
  if (view.seenAs === undefined) return [dx, dy];
  const middle = toSheet(view, screenPx(view.widthPx / 2, view.heightPx / 2));
  const to = steppedOnScreen(view, middle, dx, dy);
  return [to[0] - middle[0], to[1] - middle[1]];
}

/** A view in which a frame of the sheet is seen whole and centred. */
export function fitFrame(view: Viewport, frame: SheetFrame): Viewport {
  return fitPicture(view, frameThrough(view.seenAs, frame));
}

/** A view in which the whole of what there is to be seen is seen. */
export function fitSheet(view: Viewport, sheet: SheetSize): Viewport {
  return fitPicture(view, extentOf(view, sheet));
}

function fitPicture(view: Viewport, [left, top, width, height]: SheetFrame): Viewport {
  const margin = Math.min(FIT_MARGIN_PX, view.widthPx / 10, view.heightPx / 10);
  const zoom = heldZoom(
    Math.min((view.widthPx - 2 * margin) / width, (view.heightPx - 2 * margin) / height),
    0,
  );
  return centredOnPicture({ ...view, zoom }, left + width / 2, top + height / 2);
}

/** The view moved so that a place of the sheet is seen in its middle. */
export function centredOn(view: Viewport, at: SheetPx): Viewport {
  const [x, y] = view.seenAs === undefined ? at : throughPlane(view.seenAs, at[0], at[1]);
  return centredOnPicture(view, x, y);
}

function centredOnPicture(view: Viewport, x: number, y: number): Viewport {
  const origin = sheetPx(x - view.widthPx / 2 / view.zoom, y - view.heightPx / 2 / view.zoom);
  return { ...view, origin };
}

/** Zoomed by a factor about a place on screen, under which the sheet stays where it is. */
export function zoomAbout(view: Viewport, at: ScreenPx, factor: number, sheet: SheetSize): Viewport {
  const smallest = fitSheet(view, sheet).zoom * SMALLEST_OF_FIT;
  const zoom = heldZoom(view.zoom * factor, smallest);
  const origin = sheetPx(
    view.origin[0] + at[0] / view.zoom - at[0] / zoom,
    view.origin[1] + at[1] / view.zoom - at[1] / zoom,
  );
  return keptInSight({ ...view, zoom, origin }, sheet);
}

/** Moved by a distance on screen, as when the sheet is dragged by it. */
export function panBy(view: Viewport, dxPx: number, dyPx: number, sheet: SheetSize): Viewport {
  const origin = sheetPx(view.origin[0] - dxPx / view.zoom, view.origin[1] - dyPx / view.zoom);
  return keptInSight({ ...view, origin }, sheet);
}

/** The view in a window of another size, with the same place in its middle. */
export function resized(view: Viewport, widthPx: number, heightPx: number, sheet: SheetSize): Viewport {
  const middle = toSheet(view, screenPx(view.widthPx / 2, view.heightPx / 2));
  return keptInSight(centredOn({ ...view, widthPx, heightPx }, middle), sheet);
}

/** The view with a part of the sheet held in sight, so that it cannot be lost. */
export function keptInSight(view: Viewport, sheet: SheetSize): Viewport {
  const [left, top, width, height] = extentOf(view, sheet);
  const least = IN_SIGHT_PX / view.zoom;
  const x = left + heldAxis(view.origin[0] - left, view.widthPx / view.zoom, width, least);
  const y = top + heldAxis(view.origin[1] - top, view.heightPx / view.zoom, height, least);
  return x === view.origin[0] && y === view.origin[1] ? view : { ...view, origin: sheetPx(x, y) };
}

function heldAxis(start: number, seen: number, whole: number, least: number): number {
  const part = Math.min(least, whole, seen);
  return Math.min(whole - part, Math.max(part - seen, start));
}

function heldZoom(zoom: number, smallest: number): number {
  return Math.min(MAX_ZOOM, Math.max(smallest, zoom));
}

/**
 * The view moved by less than a device pixel so that the picture begins on a whole one: the tiles lie on whole pixels,
 * and what is drawn and clicked must lie where they do.
 */
export function onWholePixels(view: Viewport, devicePixelRatio: number): Viewport {
  const scale = view.zoom * devicePixelRatio;
  const origin = sheetPx(
    Math.round(view.origin[0] * scale) / scale,
    Math.round(view.origin[1] * scale) / scale,
  );
  return { ...view, origin };
}
