/**
 * Branded coordinate frames, so that a number can say which frame it belongs to.
 *
 * - `ScreenPx`: pixels of the view on screen, origin at its top-left corner, y down.
 * - `SheetPx`: pixels of the sheet's base raster, origin at its top-left corner, y down, centres at + 0.5.
 * - `SectionPt`: offset and elevation in the section, in the document's length unit, elevation up.
 */
declare const screenBrand: unique symbol;
declare const sheetBrand: unique symbol;
declare const sectionBrand: unique symbol;

export type ScreenPx = readonly [x: number, y: number] & { readonly [screenBrand]: true };
export type SheetPx = readonly [x: number, y: number] & { readonly [sheetBrand]: true };
export type SectionPt = readonly [offset: number, elevation: number] & { readonly [sectionBrand]: true };

/** A place on screen, pixels of the view. */
export function screenPx(x: number, y: number): ScreenPx {
  return [x, y] as unknown as ScreenPx;
}

/** A place on the sheet, base-raster pixels. */
export function sheetPx(x: number, y: number): SheetPx {
  return [x, y] as unknown as SheetPx;
}

/** A place in the section: offset and elevation, document length unit. */
export function sectionPt(offset: number, elevation: number): SectionPt {
  return [offset, elevation] as unknown as SectionPt;
}
