import type { DeskCommand } from '#client/features/desk/model/desk-state.ts';
import { sameValue } from '#client/features/desk/model/same-value.ts';
import type { PersonRef } from '#shared/contract/common.ts';
import type { DocumentEntity, VersionedEntity } from '#shared/contract/document.ts';
import { MAX_OPS_PER_BATCH } from '#shared/contract/limits.ts';
import type { CommandBatch, CommandResult, NetOp, OpOutcome } from '#shared/contract/nets.ts';
import type { Refusal } from './save-state.ts';

/**
 * What is not yet on the server, as pure state. Batches leave in order and one at a time, so that the base version
 * of everything still queued can be carried forward from each answer. A batch that was tried once is frozen: its
 * answer may be lost while the server has applied it, and a repeat under the same number must be the same batch.
 */
export interface QueuedBatch {
  seq: number;
  label: string;
  ops: NetOp[];
  tried: boolean;
  /** Number of the desk's last command in it, for the store to know what an answer covers. */
  through: number;
}

/** A change of this person that meets a newer version of somebody else. */
export interface SaveConflict {
  entityId: string;
  label: string;
  /** Null when this person removed it. */
  mine: DocumentEntity | null;
  /** Null when it was removed meanwhile. */
  theirs: VersionedEntity | null;
  theirVersion: number;
  changedBy: PersonRef | null;
}

/** A batch the server will never take, set aside so that the work behind it goes on. */
export interface RefusedBatch extends Refusal {
  seq: number;
  label: string;
  ops: NetOp[];
}

export interface SaveQueue {
  clientId: string;
  nextSeq: number;
  batches: QueuedBatch[];
  conflicts: SaveConflict[];
  refused: RefusedBatch[];
}

export function emptyQueue(clientId: string): SaveQueue {
  return { clientId, nextSeq: 1, batches: [], conflicts: [], refused: [] };
}

/** Adds a command. What follows on the untried last batch by the same act (a vertex being dragged) replaces it. */
export function enqueue(queue: SaveQueue, command: DeskCommand): SaveQueue {
  const ops = command.ops.flatMap((op) => sendable({ ...op, baseVersion: baseFor(queue, op) }, queue));
  if (ops.length === 0) return queue;
  const last = queue.batches.at(-1);
  if (last && isContinuation(last, command.label, ops)) {
    return { ...queue, batches: [...queue.batches.slice(0, -1), continued(last, ops, command.number)] };
  }
  return appended(queue, command.label, ops, command.number);
}

const baseFor = (queue: SaveQueue, op: NetOp) => queuedBase(queue, op.entityId) ?? op.baseVersion;

/** A thing that never reached the server, and is not on its way there, need not be removed from it. */
function sendable(op: NetOp, queue: SaveQueue): NetOp[] {
  const unknown = op.op === 'remove' && op.baseVersion === 0 && queuedBase(queue, op.entityId) === null;
  return unknown ? [] : [op];
}

function queuedBase(queue: SaveQueue, entityId: string): number | null {
  for (const batch of queue.batches) {
    const op = batch.ops.find((each) => each.entityId === entityId);
    if (op) return op.baseVersion;
  }
  return null;
}

function isContinuation(last: QueuedBatch, label: string, ops: NetOp[]): boolean {
  const ids = new Set(last.ops.map((op) => op.entityId));
  return (
    !last.tried &&
    last.label === label &&
    last.ops.every((op) => op.op === 'put') &&
    ops.every((op) => op.op === 'put' && ids.has(op.entityId))
  );
}

function continued(last: QueuedBatch, ops: NetOp[], through: number): QueuedBatch {
  const newer = new Map(ops.map((op) => [op.entityId, op]));
  return { ...last, through, ops: last.ops.map((op) => newer.get(op.entityId) ?? op) };
}

function appended(queue: SaveQueue, label: string, ops: NetOp[], through: number): SaveQueue {
  const batches = [...queue.batches];
  let { nextSeq } = queue;
  for (let start = 0; start < ops.length; start += MAX_OPS_PER_BATCH) {
    const part = ops.slice(start, start + MAX_OPS_PER_BATCH);
    batches.push({ seq: nextSeq, label, ops: part, tried: false, through });
    nextSeq += 1;
  }
  return { ...queue, nextSeq, batches };
}

/** The batch to send now, frozen from here on; null when nothing waits. */
export function takeFirst(queue: SaveQueue): { queue: SaveQueue; batch: CommandBatch } | null {
  const [first, ...rest] = queue.batches;
  if (!first) return null;
  const { seq, label, ops } = first;
  return {
    queue: { ...queue, batches: [{ ...first, tried: true }, ...rest] },
    batch: { clientId: queue.clientId, seq, label, ops },
  };
}

/** Takes in the server's answer to batch `seq`. An answer to a batch no longer queued changes nothing. */
export function answered(queue: SaveQueue, seq: number, result: CommandResult): SaveQueue {
  const batch = queue.batches.find((each) => each.seq === seq);
  if (!batch) return queue;
  const without = { ...queue, batches: queue.batches.filter((each) => each.seq !== seq) };
  return result.outcomes.reduce((state, outcome) => takeOutcome(state, batch, outcome), without);
}

function takeOutcome(queue: SaveQueue, batch: QueuedBatch, outcome: OpOutcome): SaveQueue {
  return outcome.outcome === 'applied'
    ? { ...queue, batches: rebased(queue.batches, outcome.entityId, outcome.version) }
    : withConflict(queue, batch, outcome);
}

function rebased(batches: QueuedBatch[], entityId: string, version: number): QueuedBatch[] {
  return batches.map((batch) => ({
    ...batch,
    ops: batch.ops.map((op) => (op.entityId === entityId ? { ...op, baseVersion: version } : op)),
  }));
}

function withConflict(queue: SaveQueue, batch: QueuedBatch, outcome: OpOutcome): SaveQueue {
  const { entityId } = outcome;
  const own = [batch, ...queue.batches].flatMap((each) => each.ops.filter((op) => op.entityId === entityId));
  const newest = own.at(-1);
  const mine = newest?.op === 'put' ? newest.value : null;
  const batches = queue.batches
    .map((each) => ({ ...each, ops: each.ops.filter((op) => op.entityId !== entityId) }))
    .filter((each) => each.ops.length > 0);
  // Two people who did the same thing have nothing to settle.
  if (sameValue(mine, outcome.current?.value ?? null)) return { ...queue, batches };
  const conflict: SaveConflict = {
    entityId,
    label: batch.label,
    mine,
    theirs: outcome.current,
    theirVersion: outcome.version,
    changedBy: outcome.changedBy,
  };
  return { ...queue, batches, conflicts: [...settled(queue, entityId).conflicts, conflict] };
}

/** Ends a conflict. When this person's version is to stand, the desk gives a new command on top of the other one. */
export function settled(queue: SaveQueue, entityId: string): SaveQueue {
  return { ...queue, conflicts: queue.conflicts.filter((each) => each.entityId !== entityId) };
}

/** Sets the first batch aside because the server will never take it, and what only made sense after it. */
export function setAside(queue: SaveQueue, { reason, requestId }: Refusal): SaveQueue {
  const [first, ...rest] = queue.batches;
  if (!first) return queue;
  const { seq, label, ops } = first;
  const batches = rest
    .map((batch) => ({
      ...batch,
      // A thing the server never had cannot be removed from it.
      ops: batch.ops.filter((op) => op.op === 'put' || op.baseVersion > 0),
    }))
    .filter((batch) => batch.ops.length > 0);
  return { ...queue, batches, refused: [...queue.refused, { seq, label, ops, reason, requestId }] };
}

/** Forgets what was refused, once the person has read why. */
export function forgetRefused(queue: SaveQueue): SaveQueue {
  return { ...queue, refused: [] };
}
