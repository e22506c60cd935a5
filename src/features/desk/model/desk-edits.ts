import { deskCanvasText as text } from '#client/text/desk-canvas.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { ChangesDto, OpOutcome } from '#shared/contract/nets.ts';
import type { CommandOp, DeskCommand, RunResult } from './desk-state.ts';
import { applyOps, type LocalOp } from './document-ops.ts';
import { EMPTY_HISTORY, type History, type HistoryStep, isUntouched, stepOf, withStep } from './history.ts';
import {
  acknowledgeOutcomes,
  baseVersionOf,
  keepTheirs,
  rebaseMine,
  receiveChanges,
  type SharedDocument,
  sharedDocumentOf,
  withVersion,
} from './shared-edits.ts';

export type DeskEdits = {
  shared(): SharedDocument;
  history(): History;
  run(label: string, ops: readonly LocalOp[]): RunResult;
  /** Takes the newest `count` steps done back, or does as many taken back again; the reasons for those that cannot be. */
  takeSteps(from: 'done' | 'undone', count: number): string[];
  receive(changes: ChangesDto, ownClientId: string | null): void;
  acknowledge(outcomes: readonly OpOutcome[], through: number): void;
  /** Puts changes back without telling of them; gives the command's number. */
  replay(ops: readonly CommandOp[]): number;
  resolve(entityId: string, keep: 'mine' | 'theirs'): void;
  /** Version of an entity that the server was last known to hold; 0 when it never held it. */
  baseVersionOf(entityId: string): number;
};

const ACCEPTED: RunResult = { ok: true };

/**
 * Changes of one document: what was done and can be taken back, and how it stands to the server's copy. `tell` gets
 * each command of ours that the server has to be sent.
 */
export function createDeskEdits(
  document: FlowNetDocument,
  tell: (command: DeskCommand) => void,
  earlier: History = EMPTY_HISTORY,
): DeskEdits {
  let shared: SharedDocument = sharedDocumentOf(document);
  let history = earlier;
  let lastNumber = 0;

  function refusal(ops: readonly LocalOp[]): RunResult | null {
    const held = ops.some((op) => shared.conflicts[op.entityId] !== undefined);
    return held ? { ok: false, reason: text.inConflict } : null;
  }

  /** Applies ops as one command of ours; null when they change nothing. */
  function apply(label: string, ops: readonly LocalOp[]): { step: HistoryStep; command: DeskCommand } | null {
    const applied = applyOps(shared.document, ops, (id) => baseVersionOf(shared, id));
    if (applied.ops.length === 0) return null;
    lastNumber += 1;
    const pending = { ...shared.pending };
    const tombstones = { ...shared.tombstones };
    for (const { op, entityId } of applied.ops) {
      pending[entityId] = lastNumber;
      if (op === 'remove') tombstones[entityId] = baseVersionOf(shared, entityId);
    }
    shared = { ...shared, document: applied.document, pending, tombstones };
    const sent = applied.ops.map((op) => ({ ...op, baseVersion: baseVersionOf(shared, op.entityId) }));
    return { step: stepOf(label, applied), command: { number: lastNumber, label, ops: sent } };
  }

  /** Sends our version of an entity again, now on top of the server's newest. */
  function putMineOnTop(entityId: string): void {
    const mine = shared.conflicts[entityId]?.mine ?? null;
    shared = rebaseMine(shared, entityId);
    lastNumber += 1;
    shared = { ...shared, pending: { ...shared.pending, [entityId]: lastNumber } };
    const baseVersion = baseVersionOf(shared, entityId);
    const op: CommandOp =
      mine === null
        ? { op: 'remove', entityId, baseVersion }
        : { op: 'put', entityId, value: mine, baseVersion };
    tell({ number: lastNumber, label: text.keptMine, ops: [op] });
  }

  function takeStep(from: 'done' | 'undone'): RunResult {
    const step = history[from].at(-1);
    if (step === undefined) {
      return { ok: false, reason: from === 'done' ? text.nothingToUndo : text.nothingToRedo };
    }
    const refused = refusal(step.inverse);
    if (refused !== null) return refused;
    history = { ...history, [from]: history[from].slice(0, -1) };
    // A step that someone else has built on is passed over, so that the ones before it can still be taken back.
    if (!isUntouched(step, shared.document)) return { ok: false, reason: text.changedSince(step.label) };
    const label = from === 'done' ? text.undone(step.label) : text.redone(step.label);
    const applied = apply(label, step.inverse);
    if (applied === null) return ACCEPTED;
    const other = from === 'done' ? 'undone' : 'done';
    history = { ...history, [other]: [...history[other], { ...applied.step, label: step.label }] };
    tell(applied.command);
    return ACCEPTED;
  }

  return {
    shared: () => shared,
    history: () => history,
    run(label, ops) {
      const refused = refusal(ops);
      if (refused !== null) return refused;
      const applied = apply(label, ops);
      if (applied === null) return ACCEPTED;
      history = withStep(history, applied.step);
      tell(applied.command);
      return ACCEPTED;
    },
    takeSteps(from, count) {
      const refused: string[] = [];
      for (let i = 0; i < count; i += 1) {
        const left = history[from].length;
        const result = takeStep(from);
        if (result.ok) continue;
        refused.push(result.reason);
        // A step that is not passed over stands before all others.
        if (history[from].length === left) break;
      }
      return refused;
    },
    receive(changes, ownClientId) {
      shared = receiveChanges(shared, changes.entities, ownClientId);
    },
    acknowledge(outcomes, through) {
      shared = acknowledgeOutcomes(shared, outcomes, through);
    },
    replay(ops) {
      const before = shared;
      apply('', ops);
      // What was kept stands on the version it was made on: a newer one at the server must come back as a conflict.
      for (const op of ops) {
        if (before.pending[op.entityId] !== undefined) continue;
        shared = withVersion(shared, op.entityId, op.baseVersion);
      }
      return lastNumber;
    },
    resolve(entityId, keep) {
      if (shared.conflicts[entityId] === undefined) return;
      if (keep === 'theirs') shared = keepTheirs(shared, entityId);
      else putMineOnTop(entityId);
    },
    baseVersionOf: (entityId) => baseVersionOf(shared, entityId),
  };
}
