import { describe, expect, it } from 'vitest';
import type { DeskCommand } from '#client/features/desk/model/desk-state.ts';
import {
  answered,
  emptyQueue,
  enqueue,
  type SaveQueue,
  setAside,
  settled,
  takeFirst,
} from '#client/features/desk/saving/save-queue.ts';
import type { DocumentEntity } from '#shared/contract/document.ts';
import { MAX_OPS_PER_BATCH } from '#shared/contract/limits.ts';
import type { OpOutcome } from '#shared/contract/nets.ts';
import { LINE_A, LINE_B, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const CLIENT = '00000000-0000-7000-8000-0000000000c1';
const okafor = { id: '00000000-0000-7000-8000-0000000000ff', name: 'Remi Okafor' };
const lineTo = (x: number) =>
  tracedLine([
    [0, 0],
    [x, x],
  ]);

let counted = 0;
function put(
  entityId: string,
  value: DocumentEntity,
  baseVersion: number,
  label = 'moved a vertex',
): DeskCommand {
  counted += 1;
  return { number: counted, label, ops: [{ op: 'put', entityId, value, baseVersion }] };
}
function remove(entityId: string, baseVersion: number): DeskCommand {
  counted += 1;
  return { number: counted, label: 'removed a line', ops: [{ op: 'remove', entityId, baseVersion }] };
}
const applied = (entityId: string, version: number): OpOutcome => ({
  entityId,
  outcome: 'applied',
  version,
  current: null,
  changedBy: null,
});
function conflicting(entityId: string, version: number, value: DocumentEntity | null): OpOutcome {
  const current = value ? { id: entityId, version, value } : null;
  return { entityId, outcome: 'conflict', version, current, changedBy: okafor };
}
const queued = (...commands: DeskCommand[]): SaveQueue => commands.reduce(enqueue, emptyQueue(CLIENT));
const sent = (queue: SaveQueue): SaveQueue => takeFirst(queue)?.queue ?? queue;

describe('a queue of changes', () => {
  it('has nothing to send while it is empty', () => {
    expect(takeFirst(emptyQueue(CLIENT))).toBeNull();
  });

  it('keeps only the newest place of a vertex that is being dragged', () => {
    const queue = queued(put(LINE_A, lineTo(1), 3), put(LINE_A, lineTo(2), 3), put(LINE_A, lineTo(3), 3));
    expect(queue.batches).toHaveLength(1);
    expect(queue.batches[0]?.ops).toEqual([
      { op: 'put', entityId: LINE_A, baseVersion: 3, value: lineTo(3) },
    ]);
  });

  it('keeps different acts apart, in the order they were done', () => {
    const queue = queued(put(LINE_A, lineTo(1), 3), put(LINE_A, lineTo(2), 3, 'named a line'));
    expect(queue.batches.map((batch) => [batch.seq, batch.label])).toEqual([
      [1, 'moved a vertex'],
      [2, 'named a line'],
    ]);
  });

  it('never changes a batch that was tried, since its answer may have been lost', () => {
    const tried = sent(queued(put(LINE_A, lineTo(1), 3)));
    const queue = enqueue(tried, put(LINE_A, lineTo(2), 3));
    expect(queue.batches.map((batch) => batch.ops[0])).toEqual([
      { op: 'put', entityId: LINE_A, baseVersion: 3, value: lineTo(1) },
      { op: 'put', entityId: LINE_A, baseVersion: 3, value: lineTo(2) },
    ]);
  });

  it('bases what is still queued on the version the answer gave', () => {
    const tried = sent(queued(put(LINE_A, lineTo(1), 0)));
    const more = [put(LINE_A, lineTo(2), 0), remove(LINE_A, 0)].reduce(enqueue, tried);
    const queue = answered(more, 1, { changeNumber: 9, outcomes: [applied(LINE_A, 1)] });
    expect(queue.batches.flatMap((batch) => batch.ops.map((op) => op.baseVersion))).toEqual([1, 1]);
  });

  it('takes an answer it has had already without harm', () => {
    const queue = queued(put(LINE_A, lineTo(1), 3));
    expect(answered(queue, 99, { changeNumber: 9, outcomes: [applied(LINE_A, 4)] })).toBe(queue);
  });

  it('does not remove from the server what never reached it', () => {
    expect(queued(remove(LINE_A, 0)).batches).toEqual([]);
  });

  it('parts a command that is longer than one batch may be', () => {
    const ops = Array.from({ length: MAX_OPS_PER_BATCH + 1 }, (_, i) => ({
      op: 'put' as const,
      entityId: `00000000-0000-7000-8000-${String(i).padStart(12, '0')}`,
      baseVersion: 0,
      value: lineTo(i),
    }));
    const queue = queued({ number: 1, label: 'copied lines', ops });
    expect(queue.batches.map((batch) => batch.ops.length)).toEqual([MAX_OPS_PER_BATCH, 1]);
  });
});

describe('a conflict', () => {
  it('keeps both versions and stops sending the one in question', () => {
    const tried = sent(queued(put(LINE_A, lineTo(1), 3)));
    const more = [put(LINE_A, lineTo(2), 3), put(LINE_B, lineTo(5), 1)].reduce(enqueue, tried);
    const queue = answered(more, 1, { changeNumber: 9, outcomes: [conflicting(LINE_A, 4, lineTo(7))] });
    expect(queue.conflicts).toMatchObject([
      { entityId: LINE_A, mine: lineTo(2), theirs: { value: lineTo(7) }, theirVersion: 4, changedBy: okafor },
    ]);
    expect(queue.batches.flatMap((batch) => batch.ops.map((op) => op.entityId))).toEqual([LINE_B]);
  });

  it('is none when both did the same', () => {
    const tried = sent(queued(put(LINE_A, lineTo(1), 3)));
    const outcomes = [conflicting(LINE_A, 4, lineTo(1))];
    expect(answered(tried, 1, { changeNumber: 9, outcomes }).conflicts).toEqual([]);
  });

  it('ends when it is settled', () => {
    const tried = sent(queued(remove(LINE_A, 3)));
    const queue = answered(tried, 1, { changeNumber: 9, outcomes: [conflicting(LINE_A, 4, lineTo(7))] });
    expect(queue.conflicts[0]?.mine).toBeNull();
    expect(settled(queue, LINE_A).conflicts).toEqual([]);
  });
});

describe('a batch the server will never take', () => {
  it('is set aside with the reason, and the work behind it goes on', () => {
    const tried = sent(queued(put(LINE_A, lineTo(1), 0)));
    const more = [remove(LINE_A, 0), put(LINE_B, lineTo(5), 1)].reduce(enqueue, tried);
    const queue = setAside(more, { reason: 'The line has too many points.', requestId: 'r-1' });
    expect(queue.refused).toMatchObject([
      { label: 'moved a vertex', reason: 'The line has too many points.', requestId: 'r-1' },
    ]);
    expect(queue.batches.flatMap((batch) => batch.ops.map((op) => op.entityId))).toEqual([LINE_B]);
  });
});
