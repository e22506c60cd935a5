import 'fake-indexeddb/auto';
import { describe, expect, it } from 'vitest';
import { openQueueStorage, queueOwner } from '#client/features/desk/saving/queue-storage.ts';
import { emptyQueue, enqueue, takeFirst } from '#client/features/desk/saving/save-queue.ts';
import { LINE_A, tracedLine } from '#tests/support/desk/desk-fixture.ts';

const line = tracedLine([
  [0, 0],
  [5, 5],
]);
const command = (number: number) => ({
  number,
  label: `act ${number}`,
  ops: [{ op: 'put' as const, entityId: LINE_A, baseVersion: 0, value: line }],
});

describe('the queue kept in the browser', () => {
  it('is nothing before the first change', async () => {
    const storage = await openQueueStorage();
    expect(await storage.load(queueOwner('nobody', 'no net'))).toBeNull();
  });

  it('comes back as it was left, in order', async () => {
    const storage = await openQueueStorage();
    const owner = queueOwner('iris', 'net one');
    const queue = Array.from({ length: 12 }, (_, i) => command(i + 1)).reduce(enqueue, emptyQueue('c1'));
    await storage.save(owner, null, queue);
    expect(await storage.load(owner)).toEqual(queue);
  });

  it('loses what was answered and keeps that a batch was tried', async () => {
    const storage = await openQueueStorage();
    const owner = queueOwner('iris', 'net two');
    const queue = [command(1), command(2)].reduce(enqueue, emptyQueue('c1'));
    await storage.save(owner, null, queue);
    const left = { ...queue, batches: queue.batches.slice(1) };
    const tried = takeFirst(left)?.queue ?? left;
    await storage.save(owner, queue, tried);
    const kept = await storage.load(owner);
    expect(kept?.batches.map((batch) => [batch.seq, batch.tried])).toEqual([[2, true]]);
  });

  it('keeps the work of each person and net apart', async () => {
    const storage = await openQueueStorage();
    const queue = enqueue(emptyQueue('c2'), command(1));
    await storage.save(queueOwner('tove', 'net one'), null, queue);
    expect((await storage.load(queueOwner('tove', 'net one')))?.clientId).toBe('c2');
    expect((await storage.load(queueOwner('iris', 'net one')))?.clientId).toBe('c1');
  });

  it('of an earlier version comes back with the fields that lines have today', async () => {
    const storage = await openQueueStorage();
    const owner = queueOwner('iris', 'net three');
    const { origin: _added, ...older } = line;
    const op = { op: 'put' as const, entityId: LINE_A, baseVersion: 0, value: older as typeof line };
    await storage.save(owner, null, enqueue(emptyQueue('c3'), { ...command(1), ops: [op] }));
    const kept = await storage.load(owner);
    expect(kept?.batches[0]?.ops).toEqual([{ ...op, value: { ...older, origin: 'traced' } }]);
  });
});
