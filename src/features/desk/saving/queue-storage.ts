import { type DBSchema, type IDBPDatabase, openDB } from 'idb';
import { completeEntity } from '#shared/contract/document-versions.ts';
import type { NetOp } from '#shared/contract/nets.ts';
import type { QueuedBatch, SaveQueue } from './save-queue.ts';

/** Keeps the queues of this browser, one for each person and net, across reloads and closed tabs. */
export interface QueueStorage {
  load(owner: string): Promise<SaveQueue | null>;
  /** Writes what differs between two states of a queue, all of it or nothing. */
  save(owner: string, before: SaveQueue | null, after: SaveQueue): Promise<void>;
}

type Header = Omit<SaveQueue, 'batches'>;
type StoredBatch = QueuedBatch & { owner: string };

interface DeskSchema extends DBSchema {
  queues: { key: string; value: Header };
  batches: { key: [string, number]; value: StoredBatch };
}

const DATABASE = 'tracehead-desk';

/** Name under which the unsent work of one person on one net is kept. */
export function queueOwner(personId: string, netId: string): string {
  return `${personId}/${netId}`;
}

export async function openQueueStorage(): Promise<QueueStorage> {
  const db = await openDB<DeskSchema>(DATABASE, 1, {
    upgrade(fresh) {
      fresh.createObjectStore('queues');
      fresh.createObjectStore('batches', { keyPath: ['owner', 'seq'] });
    },
  });
  return {
    load: (owner) => load(db, owner),
    save: (owner, before, after) => save(db, owner, before, after),
  };
}

async function load(db: IDBPDatabase<DeskSchema>, owner: string): Promise<SaveQueue | null> {
  const transaction = db.transaction(['queues', 'batches']);
  const header = await transaction.objectStore('queues').get(owner);
  // Keys are ordered by owner, then by number, so a queue comes out in the order it was made.
  const range = IDBKeyRange.bound([owner, 0], [owner, Number.MAX_SAFE_INTEGER]);
  const stored = await transaction.objectStore('batches').getAll(range);
  await transaction.done;
  if (!header) return null;
  return completeQueue({ ...header, batches: stored.map(({ owner: _owner, ...batch }) => batch) });
}

/** Work that an earlier version of the page left behind gets the fields that entities have today. */
function completeQueue(kept: SaveQueue): SaveQueue {
  const complete = (op: NetOp): NetOp => (op.op === 'put' ? { ...op, value: completeEntity(op.value) } : op);
  return {
    ...kept,
    batches: kept.batches.map((batch) => ({ ...batch, ops: batch.ops.map(complete) })),
    conflicts: kept.conflicts.map((conflict) => ({
      ...conflict,
      mine: conflict.mine && completeEntity(conflict.mine),
      theirs: conflict.theirs && { ...conflict.theirs, value: completeEntity(conflict.theirs.value) },
    })),
    refused: kept.refused.map((batch) => ({ ...batch, ops: batch.ops.map(complete) })),
  };
}

async function save(
  db: IDBPDatabase<DeskSchema>,
  owner: string,
  before: SaveQueue | null,
  after: SaveQueue,
): Promise<void> {
  // Strict: the answer comes only when the bytes are on the disk, so "kept in this browser" is true when shown.
  const transaction = db.transaction(['queues', 'batches'], 'readwrite', { durability: 'strict' });
  const { batches, ...header } = after;
  const writes: Promise<unknown>[] = [transaction.objectStore('queues').put(header, owner)];
  const store = transaction.objectStore('batches');
  const known = new Set(before?.batches);
  const left = new Set(batches.map((batch) => batch.seq));
  for (const batch of batches) if (!known.has(batch)) writes.push(store.put({ ...batch, owner }));
  for (const { seq } of before?.batches ?? []) if (!left.has(seq)) writes.push(store.delete([owner, seq]));
  await Promise.all([...writes, transaction.done]);
}
