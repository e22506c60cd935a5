export type Rect = {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
};

/** Boxes already placed, found again by the squares of the plane they lie in. */
export type TakenSpace = {
  add(rect: Rect): void;
  isFree(rect: Rect): boolean;
};

/** About the size of a label, so that a box lies in a few squares and a square holds a few boxes. */
const SQUARE_PX = 64;
/** More squares than a sheet has across at any zoom, so that two places never have one number. */
const SQUARES_ACROSS = 1 << 20;

export function createTakenSpace(rects: readonly Rect[] = []): TakenSpace {
  const squares = new Map<number, Rect[]>();

  /** True when `test` holds for a square that a box lies in; the squares after the first are then passed over. */
  function someSquare(rect: Rect, test: (key: number) => boolean): boolean {
    const right = Math.floor(rect.right / SQUARE_PX);
    const bottom = Math.floor(rect.bottom / SQUARE_PX);
    for (let x = Math.floor(rect.left / SQUARE_PX); x <= right; x += 1) {
      for (let y = Math.floor(rect.top / SQUARE_PX); y <= bottom; y += 1) {
        if (test(x * SQUARES_ACROSS + y)) return true;
      }
    }
    return false;
  }

  const space: TakenSpace = {
    add(rect) {
      someSquare(rect, (key) => {
        const held = squares.get(key);
        if (held === undefined) squares.set(key, [rect]);
        else held.push(rect);
        return false;
      });
    },
    isFree: (rect) =>
      !someSquare(rect, (key) => squares.get(key)?.some((other) => overlap(rect, other)) ?? false),
  };
  for (const rect of rects) space.add(rect);
  return space;
}

/** True when two boxes have ground in common; a shared edge is none. */
export function overlap(a: Rect, b: Rect): boolean {
  return a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;
}
