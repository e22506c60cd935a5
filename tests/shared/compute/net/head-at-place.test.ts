import { describe, expect, it } from 'vitest';
import { createNetReader } from '#shared/compute/net-reader.ts';
import { readNet } from '#shared/compute/read-net.ts';
import { similarityBackward } from '#shared/compute/similarity.ts';
import { entitiesOf, type FlowNetDocument } from '#shared/contract/document.ts';
import { exactNetDocument, sheetMapOf } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const { net, pxPerUnit } = EXACT_NETS[0]!;
const tracing = { pxPerUnit };
const onSheet = (at: readonly [number, number]) => similarityBackward(sheetMapOf(net, tracing), ...at);

describe('the head at a place', () => {
  it('is not given before anything is read, nor while the net withholds its figures', () => {
    const reader = createNetReader();
    const place = onSheet(net.placeAt(4.5, 1.5));
    expect(reader.headAt(place)).toBeNull();
    const document = exactNetDocument(net, tracing);
    const levels = entitiesOf(document, 'waterLevels')[0]!;
    const without: FlowNetDocument = {
      ...document,
      entities: {
        ...document.entities,
        [levels.id]: { id: levels.id, version: 2, value: { ...levels.value, headwater: null } },
      },
    };
    reader.read(without);
    expect(reader.headAt(place)).toBeNull();
  });

  it('is not given outside of the net, where it would be extrapolated', () => {
    const reader = createNetReader();
    reader.read(exactNetDocument(net, tracing));
    expect(reader.headAt([10, 10])).toBeNull();
  });

  it('is that of a reading point at the place, and that of the closed form', () => {
    const at = net.placeAt(4.5, 1.5);
    const document = exactNetDocument(net, { ...tracing, readings: [{ at, clicked: true }] });
    const reader = createNetReader();
    reader.read(document);
    const found = reader.headAt(onSheet(at));
    const [point] = readNet(document).points;
    expect(found?.totalHead).toBe(point?.totalHead);
    expect(found?.between).toMatchObject({ before: point?.between?.before, after: point?.between?.after });
    const drop = (net.headwater - net.outHead) / net.drops;
    expect(Math.abs((found?.totalHead ?? 0) - net.headAt(...at))).toBeLessThan(0.02 * drop);
  });
});
