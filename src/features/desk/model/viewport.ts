import { type ScreenPx, type SheetPx, screenPx, sheetPx } from '#shared/compute/frames.ts';

/** The window through which the sheet is seen. Screen pixels are CSS pixels; the sheet is never turned. */
export type Viewport = {
  /** Screen pixels per sheet pixel. */
  readonly zoom: number;
  /** Place on the sheet seen at the view's top-left corner. */
  readonly origin: SheetPx;
  readonly widthPx: number;
  readonly heightPx: number;
};

export type SheetSize = { readonly widthPx: number; readonly heightPx: number };
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
  return screenPx((at[0] - view.origin[0]) * view.zoom, (at[1] - view.origin[1]) * view.zoom);
}

export function toSheet(view: Viewport, at: ScreenPx): SheetPx {
  return sheetPx(at[0] / view.zoom + view.origin[0], at[1] / view.zoom + view.origin[1]);
}

/** The part of the sheet's plane that is seen, `[left, top, width, height]`. */
export function seenFrame(view: Viewport): SheetFrame {
  return [view.origin[0], view.origin[1], view.widthPx / view.zoom, view.heightPx / view.zoom];
}

/** A view in which a frame of the sheet is seen whole and centred. */
export function fitFrame(view: Viewport, frame: SheetFrame): Viewport {
  const [left, top, width, height] = frame;
  const margin = Math.min(FIT_MARGIN_PX, view.widthPx / 10, view.heightPx / 10);
  const zoom = heldZoom(
    Math.min((view.widthPx - 2 * margin) / width, (view.heightPx - 2 * margin) / height),
    0,
  );
  return centredOn({ ...view, zoom }, sheetPx(left + width / 2, top + height / 2));
}

export function fitSheet(view: Viewport, sheet: SheetSize): Viewport {
  return fitFrame(view, [0, 0, sheet.widthPx, sheet.heightPx]);
}

/** The view moved so that a place of the sheet is seen in its middle. */
export function centredOn(view: Viewport, at: SheetPx): Viewport {
  const origin = sheetPx(at[0] - view.widthPx / 2 / view.zoom, at[1] - view.heightPx / 2 / view.zoom);
  return { ...view, origin };
}

/** Zoomed by a factor about a place on screen, under which the sheet stays where it is. */
export function zoomAbout(view: Viewport, at: ScreenPx, factor: number, sheet: SheetSize): Viewport {
  const smallest = fitSheet(view, sheet).zoom * SMALLEST_OF_FIT;
  const zoom = heldZoom(view.zoom * factor, smallest);
  const under = toSheet(view, at);
  const origin = sheetPx(under[0] - at[0] / zoom, under[1] - at[1] / zoom);
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
  const x = heldAxis(view.origin[0], view.widthPx / view.zoom, sheet.widthPx, IN_SIGHT_PX / view.zoom);
  const y = heldAxis(view.origin[1], view.heightPx / view.zoom, sheet.heightPx, IN_SIGHT_PX / view.zoom);
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
 * The view moved by less than a device pixel so that the sheet begins on a whole one: the tiles lie on whole pixels,
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
