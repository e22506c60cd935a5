import type { NetCell } from '#shared/compute/cells/cells.ts';

/** Items with the same key together, keys in the order in which they first occur. */
export function groupedBy<T>(items: readonly T[], keyOf: (item: T) => string): T[][] {
  const groups = new Map<string, T[]>();
  for (const item of items) {
    const key = keyOf(item);
    const group = groups.get(key);
    if (group) group.push(item);
    else groups.set(key, [item]);
  }
  return [...groups.values()];
}

/** The cells of each strip, that is between the same two head lines. */
export function cellsByStrip(cells: readonly NetCell[]): NetCell[][] {
  return groupedBy(cells, ({ before, after }) => `${before} ${after}`);
}
