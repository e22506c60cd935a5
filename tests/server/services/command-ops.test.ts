import { v7 as uuidv7 } from 'uuid';
import { describe, expect, it } from 'vitest';
import { faultsOf, type HeldEntity, judgeOps } from '#server/services/command-ops.ts';
import { type DocumentEntity, UNSAID } from '#shared/contract/document.ts';
import type { NetOp } from '#shared/contract/nets.ts';

const ME = uuidv7();
const OTHER = uuidv7();

const point = (name: string): DocumentEntity => ({
  kind: 'readingPoint',
  ...UNSAID.readingPoint,
  name,
  place: { on: 'sheet', at: [1, 2] },
  order: 1,
});
const knownPoint: DocumentEntity = {
  kind: 'knownPoint',
  name: 'K1',
  at: [0, 0],
  offset: null,
  elevation: null,
  use: 'fit',
};
const count: DocumentEntity = {
  kind: 'netCount',
  countedIn: null,
  drops: 10,
  channels: null,
  cellRatio: 1,
  tracingAccuracyPx: 1.5,
  knownPointAccuracyPx: 1,
};

function heldOf(...values: Array<{ value: DocumentEntity; version?: number; removed?: boolean }>) {
  const entities = values.map(
    ({ value, version = 1, removed = false }): HeldEntity => ({
      entityId: uuidv7(),
      kind: value.kind,
      version,
      value,
      removed,
      changedBy: OTHER,
    }),
  );
  return { ids: entities.map((each) => each.entityId), held: new Map(entities.map((e) => [e.entityId, e])) };
}
const put = (entityId: string, baseVersion: number, value: DocumentEntity): NetOp => ({
  op: 'put',
  entityId,
  baseVersion,
  value,
});
const remove = (entityId: string, baseVersion: number): NetOp => ({ op: 'remove', entityId, baseVersion });

describe('judging the ops of a batch', () => {
  it('takes a new entity as version 1', () => {
    const id = uuidv7();
    const { outcomes, changed } = judgeOps([put(id, 0, point('P1'))], new Map(), ME);
    expect(outcomes).toMatchObject([{ entityId: id, outcome: 'applied', version: 1 }]);
    expect(changed).toMatchObject([{ entityId: id, version: 1, changedBy: ME, removed: false }]);
  });

  it('takes several changes of one entity in a row and writes the last one', () => {
    const id = uuidv7();
    const ops = [put(id, 0, point('a')), put(id, 1, point('b')), put(id, 2, point('c'))];
    const { outcomes, changed } = judgeOps(ops, new Map(), ME);
    expect(outcomes.map((each) => each.version)).toEqual([1, 2, 3]);
    expect(changed).toMatchObject([{ version: 3, value: { name: 'c' } }]);
  });

  it('reports a change on an older version with the entity held and who changed it, and takes the rest', () => {
    const { ids, held } = heldOf({ value: point('theirs'), version: 4 });
    const fresh = uuidv7();
    const ops = [put(ids[0]!, 3, point('mine')), put(fresh, 0, point('new'))];
    const { outcomes, changed } = judgeOps(ops, held, ME);
    expect(outcomes[0]).toMatchObject({
      outcome: 'conflict',
      version: 4,
      current: { version: 4, value: { name: 'theirs' } },
      changedBy: OTHER,
    });
    expect(outcomes[1]).toMatchObject({ outcome: 'applied', version: 1 });
    expect(changed.map((each) => each.entityId)).toEqual([fresh]);
  });

  it('reports a stale change of a removed entity as a conflict and not as a return', () => {
    const { ids, held } = heldOf({ value: point('gone'), version: 2, removed: true });
    const { outcomes, changed } = judgeOps([put(ids[0]!, 1, point('mine'))], held, ME);
    expect(outcomes).toMatchObject([{ outcome: 'conflict', version: 2, current: null, changedBy: OTHER }]);
    expect(changed).toEqual([]);
  });

  it("brings a removed entity back on the tombstone's version", () => {
    const { ids, held } = heldOf({ value: point('gone'), version: 2, removed: true });
    const { outcomes, changed } = judgeOps([put(ids[0]!, 2, point('back'))], held, ME);
    expect(outcomes).toMatchObject([{ outcome: 'applied', version: 3 }]);
    expect(changed).toMatchObject([{ removed: false, value: { name: 'back' } }]);
  });

  it('removes once: a second removal of the same version changes nothing', () => {
    const { ids, held } = heldOf({ value: point('gone'), version: 2, removed: true });
    const { outcomes, changed } = judgeOps([remove(ids[0]!, 2)], held, ME);
    expect(outcomes).toMatchObject([{ outcome: 'applied', version: 2 }]);
    expect(changed).toEqual([]);
  });

  it('reports the removal of something never held as a conflict with version 0', () => {
    const { outcomes } = judgeOps([remove(uuidv7(), 1)], new Map(), ME);
    expect(outcomes).toMatchObject([{ outcome: 'conflict', version: 0, current: null, changedBy: null }]);
  });
});

describe('faults of a batch', () => {
  it('are none for changes, additions and removals of lines and points', () => {
    const { ids, held } = heldOf({ value: point('P1') }, { value: count });
    const ops = [put(uuidv7(), 0, knownPoint), put(ids[1]!, 1, count), remove(ids[0]!, 1)];
    expect(faultsOf(ops, held)).toEqual([]);
  });

  it('name an entity that would become another kind, within one batch too', () => {
    const { ids, held } = heldOf({ value: point('P1') });
    expect(faultsOf([put(ids[0]!, 1, knownPoint)], held)).toMatchObject([{ path: 'ops.0' }]);
    const id = uuidv7();
    expect(faultsOf([put(id, 0, point('P1')), put(id, 1, knownPoint)], held)).toMatchObject([
      { path: 'ops.1' },
    ]);
  });

  it('name a second entity of a single kind and the removal of the only one', () => {
    const { ids, held } = heldOf({ value: count });
    expect(faultsOf([put(uuidv7(), 0, count), remove(ids[0]!, 1)], held)).toMatchObject([
      { path: 'ops.0', message: expect.stringMatching(/exactly one netCount/) },
      { path: 'ops.1', message: expect.stringMatching(/always has one netCount/) },
    ]);
  });
});
