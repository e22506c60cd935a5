import type { SheetPx } from '#shared/compute/frames.ts';
import type { SheetPoint } from '#shared/contract/document.ts';

/**
 * To what a place near existing lines snaps, the first before the others: an end of a line; where two lines cross; where
 * the segment drawn meets a line at a right angle; one of the places a line was clicked through, which a line drawn
 * freehand has everywhere; anywhere along a boundary or another line; straight on beyond the end of a line.
 */
export const SNAP_KINDS = [
  'end',
  'crossing',
  'rightAngle',
  'vertex',
  'boundary',
  'line',
  'extension',
] as const;
export type SnapKind = (typeof SNAP_KINDS)[number];

/** What a place near existing lines snaps to. */
export type Snap = {
  readonly kind: SnapKind;
  readonly at: SheetPx;
  readonly lineId: string;
  /** For `extension`: the end that is drawn on from. */
  readonly from: SheetPx | null;
};

/** What the tool in hand shows under the pointer before anything is pressed. */
export type ToolOverlay = {
  /** From the end of the line under way to where its next point would go. */
  readonly rubber: readonly [SheetPx, SheetPx] | null;
  /** How the line would run there where it does not run straight, and what is being drawn freehand. */
  readonly path?: readonly SheetPoint[] | null;
  readonly snap: Snap | null;
  /** The crossing of two drawn lines to which a known point goes. */
  readonly drawnCrossing?: SheetPx | null;
  /** Near which a crossing of drawn lines is to be looked for. */
  readonly seeksCrossing?: SheetPx | null;
  /** True where places should be set finer than the view shows. */
  readonly magnify: boolean;
  /** What an edit asked for would do, and the rectangle drawn about what is to be chosen. */
  readonly sketches?: readonly Sketch[];
};

/** `gained`: comes to a line; `lost`: goes; `frame`: outlines what is chosen; `place`: a single place. */
export type Sketch = {
  readonly kind: 'gained' | 'lost' | 'frame' | 'place';
  readonly points: readonly SheetPoint[];
};

export const NO_OVERLAY: ToolOverlay = { rubber: null, snap: null, magnify: false };
