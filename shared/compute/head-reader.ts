/** A place in base-raster pixels of the sheet: x to the right, y down. */
export type SheetPx = readonly [x: number, y: number];

/**
 * What is known of the head at a place. `totalHead` is in the document's length unit above its datum, `dropsLost` counts
 * from the headwater and is NaN where drops have no count (unequal intervals keep a head of their own). `gradient` is
 * (∂h/∂x, ∂h/∂z) in the natural section, x along the offsets, z upwards; the hydraulic gradient is its negative.
 */
export type HeadAt =
  | {
      readonly status: 'read';
      readonly totalHead: number;
      readonly dropsLost: number;
      readonly gradient: readonly [dhdx: number, dhdz: number];
    }
  | { readonly status: 'abovePhreatic' }
  | { readonly status: 'withheld'; readonly code: string; readonly text: string };

/** Reads the head of one net at any place of its sheet. Total: it answers every place and never throws. */
export type HeadReader = { at(place: SheetPx): HeadAt };
