import type { Rect, TakenSpace } from '#shared/compute/geometry/taken-space.ts';

/**
 * Something with words that has to stand apart from the others: its place and the size of its box in pixels or points of
 * what is drawn on, and the distances from its place to the middle of the box that may be tried, the best first.
 */
export type Placeable = {
  readonly id: string;
  readonly x: number;
  readonly y: number;
  readonly widthPx: number;
  readonly heightPx: number;
  readonly offsets: ReadonlyArray<readonly [number, number]>;
  /** Other places at which the box may stand with its middle, asked for one by one once none of the offsets is free. */
  readonly elsewhere?: () => Iterable<readonly [number, number]>;
  /** Where there is no room at all: true to leave it out, false to put it at its first offset all the same. */
  readonly mayGo?: boolean;
};

/** Where something went: its place, and from there to the middle of its box, in the same unit. */
export type Placed = {
  readonly at: readonly [number, number];
  readonly offset: readonly [number, number];
};

const GAP_PX = 1.5;

/** The space a thing of some size takes about a place. */
export function rectAbout(x: number, y: number, widthPx: number, heightPx: number): Rect {
  const half = widthPx / 2 + GAP_PX;
  const tall = heightPx / 2 + GAP_PX;
  return { left: x - half, right: x + half, top: y - tall, bottom: y + tall };
}

/**
 * Where each thing goes: the first of its places at which it covers nothing that is taken, which is then taken too
 * (`taken` grows); null for one that is left out for want of room. Things are placed from left to right, so that the same
 * things get the same places whatever order they were made in, and wherever the sheet is panned to.
 */
export function placeApart(things: readonly Placeable[], taken: TakenSpace): Map<string, Placed | null> {
  const chosen = new Map<string, Placed | null>();
  const ordered = [...things].sort((a, b) => a.x - b.x || a.y - b.y || (a.id < b.id ? -1 : 1));
  for (const thing of ordered) {
    const placed = placeFor(thing, taken);
    if (placed !== null) taken.add(boxOf(thing, placed));
    chosen.set(thing.id, placed);
  }
  return chosen;
}

function placeFor(thing: Placeable, taken: TakenSpace): Placed | null {
  const at = [thing.x, thing.y] as const;
  for (const offset of thing.offsets) {
    if (taken.isFree(boxOf(thing, { at, offset }))) return { at, offset };
  }
  for (const place of thing.elsewhere?.() ?? []) {
    const placed = { at: place, offset: [0, 0] } as const;
    if (taken.isFree(boxOf(thing, placed))) return placed;
  }
  const first = thing.offsets[0];
  return thing.mayGo === true || first === undefined ? null : { at, offset: first };
}

export function boxOf(thing: Pick<Placeable, 'widthPx' | 'heightPx'>, { at, offset }: Placed): Rect {
  return rectAbout(at[0] + offset[0], at[1] + offset[1], thing.widthPx, thing.heightPx);
}
