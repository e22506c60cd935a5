import { describe, expect, it } from 'vitest';
import { openPoints } from '#server/services/open-points.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const [, apron] = EXACT_NETS as [(typeof EXACT_NETS)[number], (typeof EXACT_NETS)[number]];
const read = (...places: Array<[number, number]>) =>
  readNet(
    exactNetDocument(apron.net, {
      pxPerUnit: apron.pxPerUnit,
      readings: places.map((at) => ({ at, clicked: true })),
    }),
  );

describe('what is open at the points before a net is sent', () => {
  it('is nothing when all have figures without a question', () => {
    expect(openPoints(read([0, 95], [9, 97.5]))).toEqual([]);
  });

  it('is each point without a figure, by its name', () => {
    const open = openPoints(read([0, 95], [0, 101]));
    expect(open).toHaveLength(1);
    expect(open[0]).toMatchObject({ weight: 'question', text: expect.stringMatching(/^P2: .*outside/) });
  });

  it('is that there is no point at all', () => {
    expect(openPoints(read()).map((found) => found.code)).toEqual(['noReadingPoints']);
  });
});
