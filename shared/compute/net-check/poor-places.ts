import type { NetCheckReading, NetFault } from '#shared/contract/reading-net-check.ts';

/**
 * A check without the cells and crossings that nobody has to look at: a net of ten thousand cells is then some hundred
 * places, which a page takes over without being held up. Kept are the poor cells and crossings, and all cells of a
 * channel that is poor; the channels, the faults (whose indices are those of the shorter lists) and the counts of the
 * summary stay those of the whole net. Of what is kept nothing changes, so that it can be shown as the whole check is.
 */
export function poorPlacesOf(check: NetCheckReading): NetCheckReading {
  const cells = numbersOf(
    check.cells,
    ({ judgement, channel }) => judgement === 'poor' || check.channels[channel]?.judgement === 'poor',
  );
  const meetings = numbersOf(check.meetings, ({ judgement }) => judgement === 'poor');
  const places = { cells, meetings };
  return {
    ...check,
    cells: check.cells.filter((_, number) => cells.has(number)),
    meetings: check.meetings.filter((_, number) => meetings.has(number)),
    faults: check.faults.map((fault): NetFault => ({ ...fault, index: places[fault.of].get(fault.index)! })),
  };
}

/** Of the items that are kept, the number in the list of all to that in the list of the kept. */
function numbersOf<T>(items: readonly T[], isKept: (item: T) => boolean): Map<number, number> {
  const numbers = new Map<number, number>();
  items.forEach((item, number) => {
    if (isKept(item)) numbers.set(number, numbers.size);
  });
  return numbers;
}
