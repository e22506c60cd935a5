import { describe, expect, it } from 'vitest';
import { readNet } from '#shared/compute/read-net.ts';
import { similarityBackward } from '#shared/compute/similarity.ts';
import {
  type DocumentEntity,
  type FlowNetDocument,
  type SheetPoint,
  UNSAID,
} from '#shared/contract/document.ts';
import { entityIdOf, exactNetDocument, sheetMapOf } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const { net, pxPerUnit } = EXACT_NETS[1]!;
const map = sheetMapOf(net, { pxPerUnit });
const onSheet = (offset: number, elevation: number): SheetPoint => similarityBackward(map, offset, elevation);

function withEntities(document: FlowNetDocument, values: DocumentEntity[]): FlowNetDocument {
  const added = values.map((value, i) => [
    entityIdOf(0x900 + i),
    { id: entityIdOf(0x900 + i), version: 1, value },
  ]);
  return { ...document, entities: { ...document.entities, ...Object.fromEntries(added) } };
}

const outline = (points: SheetPoint[]): DocumentEntity => ({
  kind: 'line',
  origin: 'traced',
  line: 'impervious',
  name: '',
  points,
  finished: true,
  water: null,
  head: null,
  drops: null,
});

const point = (name: string, offset: number, elevation: number): DocumentEntity => ({
  kind: 'readingPoint',
  ...UNSAID.readingPoint,
  name,
  place: { on: 'section', offset, elevation },
  order: 1,
});

/** A gallery of 0.6 m by 0.6 m, clear of the equipotentials, in the sand under the floor (its middle is at 0, 98). */
const gallery = [
  onSheet(0.3, 94.2),
  onSheet(0.9, 94.2),
  onSheet(0.9, 94.8),
  onSheet(0.3, 94.8),
  onSheet(0.3, 94.2),
];

describe('a closed impervious outline', () => {
  it('has no pressure inside, and points beside it are read', () => {
    const document = withEntities(exactNetDocument(net, { pxPerUnit }), [
      outline(gallery),
      point('in', 0.6, 94.5),
      point('beside', 0.6, 93.8),
    ]);
    const { state, points } = readNet(document);
    expect(state).toBe('read');
    const [inside, beside] = ['in', 'beside'].map((name) => points.find((each) => each.name === name)!);
    expect(inside).toMatchObject({ status: 'withheld', reason: { code: 'acrossWall' }, porePressure: null });
    expect(beside!.status).toBe('read');
  });

  it('that holds the whole net is the border of the flow, and the net is read inside it', () => {
    const border = [onSheet(-40, 98), onSheet(-40, 60), onSheet(40, 60), onSheet(40, 98), onSheet(-40, 98)];
    const reading = readNet(
      withEntities(exactNetDocument(net, { pxPerUnit }), [outline(border), point('in', 0.6, 94.5)]),
    );
    const inside = reading.points.find((each) => each.name === 'in')!;
    expect(inside.reason?.text ?? '').not.toContain('inside an impervious body');
  });
});
