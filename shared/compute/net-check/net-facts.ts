import type { NetCell } from '#shared/compute/cells/cells.ts';
import { type CellFacts, PLAIN_FACTS } from '#shared/compute/cells/common-ratio.ts';
import { partsOfLast } from '#shared/compute/cells/last-part.ts';
import type { NetHeads } from '#shared/compute/net/net-heads.ts';

/**
 * What the cells of a net are compared by: the drops between two head lines as counted or typed; while the count does
 * not stand one drop, and to an outlet the part that the last cells' own shape says. `relativeK` as in `CellFacts`.
 */
export function factsOf(
  cells: readonly NetCell[],
  heads: NetHeads,
  enteredRatio: number,
  accuracyPx: number,
  relativeK: CellFacts['relativeK'],
): CellFacts {
  const plain: CellFacts = { ...PLAIN_FACTS, relativeK };
  const last = new Map(
    partsOfLast(cells, enteredRatio, plain, accuracyPx).drops.map(
      ({ before, outlet, part }) => [`${before} ${outlet}`, Math.min(1, part)] as const,
    ),
  );
  return {
    relativeK,
    dropsBetween: (before, after) => {
      const from = heads.byId.get(before);
      const to = heads.byId.get(after);
      if (from === undefined || to === undefined) return last.get(`${before} ${after}`) ?? 1;
      const drops = to.drops - from.drops;
      return drops > 0 ? drops : 1;
    },
  };
}

/** Head lost over each whole drop between two head lines, length unit; null while they have no heads. */
export function headPerDropBetween(cell: NetCell, heads: NetHeads, facts: CellFacts): number | null {
  const from = heads.byId.get(cell.before)?.head ?? null;
  const to = heads.byId.get(cell.after)?.head ?? null;
  if (from === null || to === null) return heads.count?.headPerDrop ?? null;
  return Math.abs(from - to) / facts.dropsBetween(cell.before, cell.after);
}
