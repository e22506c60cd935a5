/** A label at a line's end, in screen pixels of the whole sheet at the present zoom. */
export type LabelPlace = {
  readonly id: string;
  readonly x: number;
  readonly y: number;
  readonly text: string;
};

export const LABEL_HEIGHT_PX = 17;
const CHARACTER_PX = 6.7;
const PADDING_PX = 10;
const GAP_PX = 3;
/** Distances from the line's end that are tried in turn: just below, then in rows below, then above. */
const ROWS_PX = [16, 36, 56, 76, -16, -36, 96, 116];
/** Steps to the side that are tried in each row. */
const SHIFTS_PX = [0, 24, -24];

type Rect = { left: number; top: number; right: number; bottom: number };

/** Width of a label's box. Figures are tabular, so the count of characters tells it. */
export function labelWidthPx(text: string): number {
  return Math.max(24, text.length * CHARACTER_PX + PADDING_PX);
}

/**
 * Where each label goes, as a distance from its line's end: the nearest place at which it covers no other label.
 * Labels are placed from left to right, so that the same lines get the same places whatever order they were drawn in.
 */
export function placeLabels(labels: readonly LabelPlace[]): Map<string, readonly [number, number]> {
  const placed: Rect[] = [];
  const offsets = new Map<string, readonly [number, number]>();
  const ordered = [...labels].sort((a, b) => a.x - b.x || a.y - b.y || (a.id < b.id ? -1 : 1));
  for (const label of ordered) {
    const offset = freeOffset(label, placed);
    placed.push(rectOf(label, offset));
    offsets.set(label.id, offset);
  }
  return offsets;
}

function freeOffset(label: LabelPlace, placed: readonly Rect[]): readonly [number, number] {
  for (const row of ROWS_PX) {
    for (const shift of SHIFTS_PX) {
      const offset = [shift, row] as const;
      const rect = rectOf(label, offset);
      if (!placed.some((other) => overlap(rect, other))) return offset;
    }
  }
  return [0, ROWS_PX[0]!];
}

function rectOf(label: LabelPlace, [dx, dy]: readonly [number, number]): Rect {
  const half = labelWidthPx(label.text) / 2 + GAP_PX / 2;
  const tall = LABEL_HEIGHT_PX / 2 + GAP_PX / 2;
  return {
    left: label.x + dx - half,
    right: label.x + dx + half,
    top: label.y + dy - tall,
    bottom: label.y + dy + tall,
  };
}

function overlap(a: Rect, b: Rect): boolean {
  return a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;
}
