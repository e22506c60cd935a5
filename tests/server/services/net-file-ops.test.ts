import { expect, it } from 'vitest';
import { opsOfFile } from '#server/services/net-file-ops.ts';
import { type DocumentEntity, type FlowNetDocument, singleOf, UNSAID } from '#shared/contract/document.ts';
import { exactNetDocument } from '#tests/support/exact-nets/exact-net-document.ts';
import { EXACT_NETS } from '#tests/support/exact-nets/exact-nets.ts';

const { net, pxPerUnit } = EXACT_NETS[0]!;
const SOIL = '01930000-0000-7000-8000-00000000abcd';

/** A net in whose soil the channels are counted. */
function layered(): FlowNetDocument {
  const document = exactNetDocument(net, { pxPerUnit, spacingPx: 300 });
  const soil: DocumentEntity = {
    kind: 'soil',
    name: 'Core',
    places: [[10, 10]],
    ...UNSAID.soil,
    k: 1e-8,
    unit: 'm/s',
    factor: null,
    source: '',
  };
  const count = singleOf(document, 'netCount')!;
  return {
    ...document,
    entities: {
      ...document.entities,
      [SOIL.toUpperCase()]: { id: SOIL.toUpperCase(), version: 7, value: soil },
      [count.id]: { ...count, value: { ...count.value, countedIn: SOIL.toUpperCase() } },
    },
  };
}

const file = layered();
const held: FlowNetDocument = {
  ...file,
  entities: Object.fromEntries(
    (['setOut', 'waterLevels', 'permeability', 'netCount'] as const).map((kind, i) => {
      const id = `01930000-0000-7000-9000-00000000000${i}`;
      return [id, { id, version: i + 1, value: singleOf(file, kind)!.value }];
    }),
  ),
};
const puts = (taken: string[], withSetOut: boolean) =>
  opsOfFile(file, held, { taken: new Set(taken), withSetOut }).flatMap((op) => (op.op === 'put' ? [op] : []));
const countedIn = (ops: ReturnType<typeof puts>) =>
  ops.flatMap(({ value }) => (value.kind === 'netCount' ? [value.countedIn] : []));

it('leaves the set-out out when the section keeps its own', () => {
  const kinds = new Set(puts([], false).map(({ value }) => value.kind));
  expect(kinds.has('knownPoint') || kinds.has('setOut')).toBe(false);
  expect(kinds.has('line')).toBe(true);
});

it('changes what a net has one of, on the version it has, and adds the rest', () => {
  for (const { value, entityId, baseVersion } of puts([], true)) {
    const single = singleOf(held, value.kind);
    expect([baseVersion, single?.id ?? entityId], value.kind).toEqual([single?.version ?? 0, entityId]);
  }
});

it('keeps ids that are free, in small letters, and with them what refers to them', () => {
  const ops = puts([], true);
  expect(ops.some(({ entityId }) => entityId === SOIL)).toBe(true);
  expect(countedIn(ops)).toEqual([SOIL]);
});

it('makes all ids anew where one is taken, in the order of the old, and what refers to them follows', () => {
  const taken = Object.keys(file.entities)[3]!;
  const ops = puts([taken], true).filter(({ baseVersion }) => baseVersion === 0);
  const ids = ops.map(({ entityId }) => entityId);
  expect(ids.some((id) => id in file.entities || id === SOIL)).toBe(false);
  expect(ids).toEqual([...ids].sort());
  const kept = puts([], true).filter(({ baseVersion }) => baseVersion === 0);
  expect(ops.map(({ value }) => value)).toEqual(kept.map(({ value }) => value));
  const soil = ops.find(({ value }) => value.kind === 'soil')!;
  expect(countedIn(puts([taken], true))[0]).not.toBe(SOIL);
  expect(soil.entityId).not.toBe(SOIL);
});
