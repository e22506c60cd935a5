export const LABEL_HEIGHT_PX = 17;
const CHARACTER_PX = 6.7;
const PADDING_PX = 10;
/** Offsets of a head's label from the end of its line: just below, in a second row, and only then far to a side. */
export const LABEL_OFFSETS: ReadonlyArray<readonly [number, number]> = [
  ...besides([0, 24, -24], [16, 36]),
  ...besides([48, -48], [16, 36]),
];

function besides(shifts: readonly number[], rows: readonly number[]): Array<readonly [number, number]> {
  return rows.flatMap((row) => shifts.map((shift) => [shift, row] as const));
}

/** Width of a label's box. Figures are tabular, so the count of characters tells it. */
export function labelWidthPx(text: string): number {
  return Math.max(24, text.length * CHARACTER_PX + PADDING_PX);
}
