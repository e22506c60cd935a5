/**
 * Something with words that has to stand apart from the others: its place and the size of its box in screen pixels of
 * the whole sheet at the present zoom, and the distances from its place to the middle of the box that may be tried,
 * the best first.
 */
export type Placeable = {
  readonly id: string;
  readonly x: number;
  readonly y: number;
  readonly widthPx: number;
  readonly heightPx: number;
  readonly offsets: ReadonlyArray<readonly [number, number]>;
};

export type Rect = {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
};

export const LABEL_HEIGHT_PX = 17;
const CHARACTER_PX = 6.7;
const PADDING_PX = 10;
const GAP_PX = 1.5;
/** Distances from a line's end that are tried in turn: just below, then in rows below, then above. */
const ROWS_PX = [16, 36, 56, 76, 96, -16, -36, 116];
/** Steps to the side that are tried in each row. */
const SHIFTS_PX = [0, 24, -24];

/** Offsets of a head's label from the end of its line. */
export const LABEL_OFFSETS = ROWS_PX.flatMap((row) => SHIFTS_PX.map((shift) => [shift, row] as const));

/** Width of a label's box. Figures are tabular, so the count of characters tells it. */
export function labelWidthPx(text: string): number {
  return Math.max(24, text.length * CHARACTER_PX + PADDING_PX);
}

/** The space a thing of some size takes about a place. */
export function rectAbout(x: number, y: number, widthPx: number, heightPx: number): Rect {
  const half = widthPx / 2 + GAP_PX;
  const tall = heightPx / 2 + GAP_PX;
  return { left: x - half, right: x + half, top: y - tall, bottom: y + tall };
}

/**
 * Where each thing goes, as one of its offsets: the first at which it covers nothing that is taken, which is then
 * taken too (`taken` grows). Where none is free it goes to its first. Things are placed from left to right, so that
 * the same things get the same places whatever order they were made in.
 */
export function placeApart(
  things: readonly Placeable[],
  taken: Rect[],
): Map<string, readonly [number, number]> {
  const chosen = new Map<string, readonly [number, number]>();
  const ordered = [...things].sort((a, b) => a.x - b.x || a.y - b.y || (a.id < b.id ? -1 : 1));
  for (const thing of ordered) {
    const offset =
      thing.offsets.find((candidate) => isFree(boxOf(thing, candidate), taken)) ?? thing.offsets[0];
    if (offset === undefined) continue;
    taken.push(boxOf(thing, offset));
    chosen.set(thing.id, offset);
  }
  return chosen;
}

function boxOf(thing: Placeable, [dx, dy]: readonly [number, number]): Rect {
  return rectAbout(thing.x + dx, thing.y + dy, thing.widthPx, thing.heightPx);
}

function isFree(rect: Rect, taken: readonly Rect[]): boolean {
  return !taken.some(
    (other) =>
      rect.left < other.right &&
      other.left < rect.right &&
      rect.top < other.bottom &&
      other.top < rect.bottom,
  );
}
