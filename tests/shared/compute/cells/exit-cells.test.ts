import { describe, expect, it } from 'vitest';
import { exitCellsOf } from '#shared/compute/cells/exit-cells.ts';
import { changed } from '#tests/support/exact-nets/edit-net.ts';
import { cellsOfDocument } from '#tests/support/exact-nets/exact-cells.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const apron = EXACT_NETS[1]!;
const pile = EXACT_NETS[2]!;

describe.each([apron, pile])('exit cells of $name', ({ net, pxPerUnit }) => {
  const { net: cells, heads } = cellsOfDocument(exactNetDocument(net, { pxPerUnit }));
  const exits = exitCellsOf(cells.cells, heads);

  it('are one for each channel, their flow upwards, the more so the farther they lie from an edge', () => {
    expect(exits).toHaveLength(net.channels);
    for (const exit of exits) expect(exit.upward).toBeGreaterThan(exit.atSingularEdge ? 0.6 : 0.8);
  });

  it('have the length of the last cell along the flow and its average gradient (closed form)', () => {
    const lost = (net.headwater - net.outHead) / net.drops;
    const lengths = Array.from({ length: net.channels }, (_, j) => {
      const places = Array.from({ length: 51 }, (_, i) => net.placeAt(net.drops - 1 + i / 50, j + 0.5));
      return places
        .slice(1)
        .reduce((sum, [x, z], i) => sum + Math.hypot(x - places[i]![0], z - places[i]![1]), 0);
    });
    const sorted = [...exits].sort((a, b) => a.length - b.length);
    lengths
      .sort((a, b) => a - b)
      .forEach((length, i) => {
        if (sorted[i]!.atSingularEdge) return;
        expect(Math.abs(sorted[i]!.length / length - 1)).toBeLessThan(0.04);
        expect(sorted[i]!.headLost).toBeCloseTo(lost, 9);
        expect(Math.abs((sorted[i]!.gradient! * length) / lost - 1)).toBeLessThan(0.04);
      });
  });
});

it('are marked at the edge of a floor, where the exit gradient has no bound, and not beside a pile', () => {
  const edges = (entry: typeof apron) => {
    const { net, heads } = cellsOfDocument(exactNetDocument(entry.net, { pxPerUnit: entry.pxPerUnit }));
    return exitCellsOf(net.cells, heads).filter((exit) => exit.atSingularEdge);
  };
  expect(edges(apron)).toHaveLength(1);
  expect(edges(pile)).toHaveLength(0);
});

it('have no gradient while the count does not stand, and a length all the same', () => {
  const document = changed(
    exactNetDocument(pile.net, { pxPerUnit: pile.pxPerUnit }),
    'netCount',
    (count) => ({
      ...count,
      drops: null,
    }),
  );
  const { net, heads } = cellsOfDocument(document);
  for (const exit of exitCellsOf(net.cells, heads)) {
    expect(exit.gradient).toBeNull();
    expect(exit.headLost).toBeNull();
    expect(exit.length).toBeGreaterThan(0);
  }
});
