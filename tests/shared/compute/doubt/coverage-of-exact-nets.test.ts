import { expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import { changed } from '#tests/support/exact-nets/edit-net.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';
import { randomReadings } from '#tests/support/exact-nets/random-readings.ts';

const TREMOR_PX = 1.5;

// Exact nets (Kozeny 1931; Pavlovsky 1922 and Harr 1962) traced by a hand that trembles by 1.5 px: the closed form is
// the true head, and the ± must hold it in 95 of 100 cases without being too wide to be of use.
it.each(EXACT_NETS)('the ± holds the true head of the $name', ({ net, pxPerUnit }) => {
  const readings = randomReadings(net, 60, 101, 0.1).map((reading) => ({ ...reading, clicked: false }));
  const traced = exactNetDocument(net, { pxPerUnit, jitterPx: TREMOR_PX, seed: 1, readings });
  const document = changed(traced, 'netCount', (count) => ({
    ...count,
    tracingAccuracyPx: 1.96 * TREMOR_PX,
    knownPointAccuracyPx: 0.1,
  }));
  const read = readNet(document).points.filter(({ status }) => status === 'read');
  expect(read.length).toBeGreaterThan(50);
  const held = read.filter(
    ({ totalHead, totalHeadPlusMinus, offset, elevation }) =>
      Math.abs(totalHead! - net.headAt(offset!, elevation!)) <= totalHeadPlusMinus!,
  );
  expect(held.length / read.length).toBeGreaterThanOrEqual(0.95);
  const halves = read.map(({ totalHeadPlusMinus }) => totalHeadPlusMinus!).sort((a, b) => a - b);
  const drop = (net.headwater - net.outHead) / net.drops;
  expect(halves[halves.length >> 1]!).toBeLessThan(0.03 * drop);
});
