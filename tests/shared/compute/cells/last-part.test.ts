import { describe, expect, it } from 'vitest';
import { PLAIN_FACTS } from '#shared/compute/cells/common-ratio.ts';
import { partsOfLast } from '#shared/compute/cells/last-part.ts';
import type { ExactNet } from '#shared/compute/exact/exact-net.ts';
import { cellsOfDocument } from '#tests/support/exact-nets/exact-cells.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

/** The net with squares `size` times as large as its own, so that a part of a drop is left at the outlet. */
function withPartDrop(net: ExactNet, size: number): ExactNet {
  const drops = Math.ceil(net.drops / size) - 1;
  const channels = Math.floor(net.channels / size);
  return {
    ...net,
    lines: [
      ...net.lines.filter(({ line }) => line !== 'equipotential' && line !== 'flowLine'),
      ...Array.from({ length: drops }, (_, i) => ({
        line: 'equipotential' as const,
        water: null,
        at: (part: number) =>
          net.placeAt((i + 1) * size, part * (net.bounded ? net.channels : channels * size)),
      })),
      ...Array.from({ length: channels }, (_, i) => ({
        line: 'flowLine' as const,
        water: null,
        at: (part: number) => net.placeAt(part * net.drops, (i + 1) * size),
      })),
    ],
  };
}

const partsIn = (net: ExactNet, pxPerUnit: number, seed = 1) => {
  const { cells } = cellsOfDocument(exactNetDocument(net, { pxPerUnit, jitterPx: 1.5, seed })).net;
  return partsOfLast(cells, 1, PLAIN_FACTS, 1.5);
};

describe.each(EXACT_NETS)(
  'part drops and channels by the shape of the squares: $name',
  ({ net, pxPerUnit }) => {
    it('are whole where they are whole', () => {
      const { drops, channels } = partsIn(net, pxPerUnit);
      expect(drops).toHaveLength(1);
      expect(Math.abs(drops[0]!.part - 1)).toBeLessThan(0.05);
      expect(channels).toHaveLength(2);
      for (const channel of channels) expect(Math.abs(channel.part - 1)).toBeLessThan(0.05);
    });

    it('tell the part of a drop that is left to the outlet, within its ± and a twentieth', () => {
      for (const size of [1.1, 1.07, 0.94]) {
        const wanted = net.drops / size - (Math.ceil(net.drops / size) - 1);
        const [last] = partsIn(withPartDrop(net, size), pxPerUnit).drops;
        expect(Math.abs(last!.part - wanted)).toBeLessThan(0.05 + last!.plusMinus);
        expect(last!.plusMinus).toBeLessThan(0.1);
      }
    });
  },
);

it('tell the part of a channel that is left at the edge', () => {
  const { net, pxPerUnit } = EXACT_NETS[0]!;
  const size = 1.25;
  // Three channels make 2.4 of a quarter more: two whole ones and 0.4 along the base.
  const { channels } = partsIn(withPartDrop(net, size), pxPerUnit);
  expect(channels).toHaveLength(2);
  expect(channels.map(({ part }) => part).sort((a, b) => a - b)[0]).toBeCloseTo(0.4, 1);
});

it('say nothing of a net without cells', () => {
  expect(partsOfLast([], 1, PLAIN_FACTS, 1.5)).toEqual({ drops: [], channels: [] });
});
