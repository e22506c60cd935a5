import type { SparseRows } from '#shared/compute/solve/conjugate-gradient.ts';

/** Parts of this many unknowns or fewer are not parted further. */
const SMALLEST_PART = 40;

/**
 * An order of elimination that keeps the factor of a mesh's matrix sparse: the unknowns are parted at the median of
 * one coordinate, those on one side that touch the other come last, and each side is parted likewise. `x`, `y`: place
 * of each unknown, any unit. Of the two coordinates and two sides the one with the fewest in between is taken. Gives
 * the unknowns in order, length n. Source: George (1973), nested dissection, with cuts by coordinates.
 */
export function nestedDissection(
  a: Pick<SparseRows, 'n' | 'starts' | 'columns'>,
  x: Float64Array,
  y: Float64Array,
): Int32Array {
  const order = new Int32Array(a.n);
  const side = new Int8Array(a.n);
  let end = a.n;
  // The order is filled from its end: what parts two sides, then one side, then the other.
  const open: Int32Array[] = [Int32Array.from({ length: a.n }, (_, i) => i)];
  while (open.length > 0) {
    const part = open.pop()!;
    const cut = part.length > SMALLEST_PART ? thinnestCut(a, part, [x, y], side) : null;
    if (cut === null) {
      end -= part.length;
      order.set(part, end);
      continue;
    }
    end -= cut.between.length;
    order.set(cut.between, end);
    open.push(cut.first, cut.second);
  }
  return order;
}

type Cut = { readonly first: Int32Array; readonly second: Int32Array; readonly between: Int32Array };

/** Sides while a part is cut. */
const [NOWHERE, LOW, HIGH] = [0, 1, 2];

function thinnestCut(
  a: Pick<SparseRows, 'starts' | 'columns'>,
  part: Int32Array,
  coordinates: readonly Float64Array[],
  side: Int8Array,
): Cut | null {
  let best: Cut | null = null;
  for (const along of coordinates) {
    const sorted = part.slice().sort((i, j) => along[i]! - along[j]!);
    const half = sorted.length >> 1;
    sorted.forEach((i, place) => {
      side[i] = place < half ? LOW : HIGH;
    });
    for (const [own, other] of [
      [LOW, HIGH],
      [HIGH, LOW],
    ] as const) {
      const between = sorted.filter((i) => side[i] === own && touches(a, i, side, other));
      if (best !== null && between.length >= best.between.length) continue;
      const taken = new Set(between);
      best = {
        between,
        first: sorted.filter((i) => side[i] === own && !taken.has(i)),
        second: sorted.filter((i) => side[i] === other),
      };
    }
    for (const i of part) side[i] = NOWHERE;
  }
  return best !== null && best.between.length < part.length / 2 ? best : null;
}

function touches(
  { starts, columns }: Pick<SparseRows, 'starts' | 'columns'>,
  i: number,
  side: Int8Array,
  other: number,
): boolean {
  for (let k = starts[i]!; k < starts[i + 1]!; k += 1) if (side[columns[k]!] === other) return true;
  return false;
}
