import type { SectionDto, SheetDto } from '#shared/contract/drawings.ts';

/** `[left, top, width, height]` in base-raster pixels of the sheet. */
export type Frame = NonNullable<SectionDto['frame']>;
type Corner = readonly [number, number];
type SheetSize = Pick<SheetDto, 'widthPx' | 'heightPx'>;

/** Smaller than this share of the sheet's width it was a click and not a frame. */
const SMALLEST_SHARE = 0.01;

const within = (value: number, limit: number) => Math.min(Math.max(value, 0), limit);

/** The frame between two corners in whole pixels, cut at the sheet's edges; null when it is too small to be meant. */
export function frameBetween(a: Corner, b: Corner, sheet: SheetSize): Frame | null {
  const xs = [a[0], b[0]].map((x) => within(x, sheet.widthPx));
  const ys = [a[1], b[1]].map((y) => within(y, sheet.heightPx));
  const left = Math.floor(Math.min(...xs));
  const top = Math.floor(Math.min(...ys));
  const width = Math.ceil(Math.max(...xs)) - left;
  const height = Math.ceil(Math.max(...ys)) - top;
  const smallest = SMALLEST_SHARE * sheet.widthPx;
  return width < smallest || height < smallest ? null : [left, top, width, height];
}

/** A typed frame, moved and cut so that it lies on the sheet. */
export function frameOnSheet([left, top, width, height]: Frame, sheet: SheetSize): Frame | null {
  return frameBetween([left, top], [left + width, top + height], sheet);
}

/** Where a pointer is on the sheet, in its pixels. */
export function sheetPointAt(
  pointer: { clientX: number; clientY: number },
  box: Pick<DOMRect, 'left' | 'top' | 'width' | 'height'>,
  sheet: SheetSize,
): Corner {
  return [
    ((pointer.clientX - box.left) / box.width) * sheet.widthPx,
    ((pointer.clientY - box.top) / box.height) * sheet.heightPx,
  ];
}
