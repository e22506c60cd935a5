import { type DBSchema, type IDBPDatabase, openDB } from 'idb';
import { completeEntity } from '#shared/contract/document-versions.ts';
import type { LocalOp } from '../model/document-ops.ts';
import type { HistoryStep } from '../model/history.ts';
import type { KeptHistory, KeptStep } from './kept-history.ts';

/** Keeps the steps that can be taken back, for each person and net of this browser. */
export interface HistoryStorage {
  load(owner: string): Promise<KeptHistory | null>;
  /** Writes what differs between two states of a history, all of it or nothing. */
  save(owner: string, before: KeptHistory, after: KeptHistory, now: number): Promise<void>;
}

interface Header {
  nextId: number;
  dropped: number;
  done: number[];
  undone: number[];
  usedAt: number;
}
type StoredStep = Pick<HistoryStep, 'label' | 'inverse' | 'after'> & { owner: string; id: number };

interface HistorySchema extends DBSchema {
  histories: { key: string; value: Header };
  steps: { key: [string, number]; value: StoredStep };
}

/** A database beside that of the unsent work: a tab of an earlier version that has that one open holds nothing up. */
const DATABASE = 'tracehead-history';

/** Histories of so many nets are kept in one browser; those not used for longest go first. */
const MOST_HISTORIES = 20;

export async function openHistoryStorage(): Promise<HistoryStorage> {
  const db = await openDB<HistorySchema>(DATABASE, 1, {
    upgrade(fresh) {
      fresh.createObjectStore('histories');
      fresh.createObjectStore('steps', { keyPath: ['owner', 'id'] });
    },
  });
  await sweep(db);
  return {
    load: (owner) => load(db, owner),
    save: (owner, before, after, now) => save(db, owner, before, after, now),
  };
}

const rangeOf = (owner: string) => IDBKeyRange.bound([owner, 0], [owner, Number.MAX_SAFE_INTEGER]);

async function load(db: IDBPDatabase<HistorySchema>, owner: string): Promise<KeptHistory | null> {
  const transaction = db.transaction(['histories', 'steps']);
  const header = await transaction.objectStore('histories').get(owner);
  const stored = await transaction.objectStore('steps').getAll(rangeOf(owner));
  await transaction.done;
  if (!header) return null;
  const byId = new Map(stored.map((step) => [step.id, keptStep(step)]));
  const inOrder = (ids: number[]) => ids.flatMap((id) => byId.get(id) ?? []);
  return {
    nextId: header.nextId,
    dropped: header.dropped,
    done: inOrder(header.done),
    undone: inOrder(header.undone),
  };
}

/** A step that an earlier version of the page left behind gets the fields that entities have today. */
function keptStep({ id, label, inverse, after }: StoredStep): KeptStep {
  const complete = (op: LocalOp): LocalOp =>
    op.op === 'put' ? { ...op, value: completeEntity(op.value) } : op;
  const values = [...after].map(([entityId, value]) => [entityId, value && completeEntity(value)] as const);
  return { id, step: { label, inverse: inverse.map(complete), after: new Map(values) } };
}

async function save(
  db: IDBPDatabase<HistorySchema>,
  owner: string,
  before: KeptHistory,
  after: KeptHistory,
  usedAt: number,
): Promise<void> {
  const transaction = db.transaction(['histories', 'steps'], 'readwrite');
  const store = transaction.objectStore('steps');
  const had = new Set([...before.done, ...before.undone].map(({ id }) => id));
  const kept = [...after.done, ...after.undone];
  const has = new Set(kept.map(({ id }) => id));
  const writes: Promise<unknown>[] = [
    transaction.objectStore('histories').put(headerOf(after, usedAt), owner),
    ...kept.filter(({ id }) => !had.has(id)).map(({ id, step }) => store.put({ ...step, owner, id })),
    ...[...had].filter((id) => !has.has(id)).map((id) => store.delete([owner, id])),
  ];
  await Promise.all([...writes, transaction.done]);
}

function headerOf({ nextId, dropped, done, undone }: KeptHistory, usedAt: number): Header {
  return { nextId, dropped, done: done.map(({ id }) => id), undone: undone.map(({ id }) => id), usedAt };
}

async function sweep(db: IDBPDatabase<HistorySchema>): Promise<void> {
  const transaction = db.transaction(['histories', 'steps'], 'readwrite');
  const histories = transaction.objectStore('histories');
  const owners = await histories.getAllKeys();
  const headers = await histories.getAll();
  const oldestFirst = owners
    .map((owner, i) => ({ owner, usedAt: headers[i]?.usedAt ?? 0 }))
    .sort((a, b) => a.usedAt - b.usedAt);
  for (const { owner } of oldestFirst.slice(0, Math.max(0, owners.length - MOST_HISTORIES))) {
    await histories.delete(owner);
    await transaction.objectStore('steps').delete(rangeOf(owner));
  }
  await transaction.done;
}
