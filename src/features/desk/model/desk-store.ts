import { v7 as newUuid } from 'uuid';
import { createStore } from 'zustand/vanilla';
import { deskCanvasText as text } from '#client/text/desk-canvas.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import type {
  CommandOp,
  DeskActions,
  DeskCommand,
  DeskState,
  DeskStore,
  DeskStoreOptions,
  Draft,
  RunResult,
} from './desk-state.ts';
import { applyOps, type LocalOp } from './document-ops.ts';
import {
  EMPTY_HISTORY,
  type History,
  type HistoryStep,
  historyLabels,
  isUntouched,
  stepOf,
  withStep,
} from './history.ts';
import type { DeskIntent } from './intents.ts';
import { reopenedLine } from './reopened-line.ts';
import { NO_SELECTION, prunedSelection } from './selection.ts';
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

const ACCEPTED: RunResult = { ok: true };

/** The state of one open net: its document with local changes, what is chosen, and what the server knows. */
export function createDeskStore(
  detail: { document: FlowNetDocument; changeNumber?: number },
  options: DeskStoreOptions = {},
): DeskStore {
  const makeId = options.newId ?? newUuid;
  const commandListeners = new Set<(command: DeskCommand) => void>();
  const intentListeners = new Set<(intent: DeskIntent) => void>();
  const lookListeners = new Set<(at: SheetPoint) => void>();
  let shared: SharedDocument = sharedDocumentOf(detail.document);
  let history: History = EMPTY_HISTORY;
  let commandNumber = 0;

  const store = createStore<DeskState>(() => ({
    document: detail.document,
    documentRevision: 0,
    changeNumber: detail.changeNumber ?? 0,
    reading: options.reading ?? null,
    readingOf: options.reading === undefined ? -1 : 0,
    readingFailed: false,
    tool: 'select',
    boundaryKind: 'headwaterFace',
    selection: NO_SELECTION,
    pointerAt: null,
    hiddenKinds: [],
    history: historyLabels(EMPTY_HISTORY),
    draft: null,
    preview: {},
    conflicts: {},
    pending: {},
    notice: null,
    readOnly: options.readOnly ?? false,
  }));

  const endAnswers = options.reader?.onAnswer((revision, reading) => {
    if (reading === null) store.setState({ readingFailed: true });
    else store.setState({ reading, readingOf: revision, readingFailed: false });
  });
  options.reader?.ask(detail.document, 0);

  /** Publishes `shared` and asks for a reading when the values, not only versions, have changed. */
  function publish(next: SharedDocument, extra: Partial<DeskState> = {}): void {
    shared = next;
    const before = store.getState();
    const { document } = next;
    const changed = valuesDiffer(document, before.document);
    const documentRevision = changed ? before.documentRevision + 1 : before.documentRevision;
    store.setState({
      document,
      documentRevision,
      pending: next.pending,
      conflicts: next.conflicts,
      history: historyLabels(history),
      selection: prunedSelection(extra.selection ?? before.selection, document),
      draft: keptDraft(extra.draft === undefined ? before.draft : extra.draft, document),
      changeNumber: extra.changeNumber ?? before.changeNumber,
      notice: extra.notice === undefined ? before.notice : extra.notice,
    });
    if (changed) options.reader?.ask(document, documentRevision);
  }

  function refuse(reason: string): RunResult {
    store.setState({ notice: reason });
    return { ok: false, reason };
  }

  function reasonAgainst(ops: readonly LocalOp[]): string | null {
    if (store.getState().readOnly) return text.readOnly;
    return ops.some((op) => shared.conflicts[op.entityId] !== undefined) ? text.inConflict : null;
  }

  /** Applies ops as one command of ours and tells the saving part; gives null when they change nothing. */
  function applyAsCommand(label: string, ops: readonly LocalOp[], tell: boolean): HistoryStep | null {
    const bases = ops.map((op) => baseVersionOf(shared, op.entityId));
    const applied = applyOps(shared.document, ops, (id) => baseVersionOf(shared, id));
    if (applied.ops.length === 0) return null;
    commandNumber += 1;
    const pending = { ...shared.pending };
    const tombstones = { ...shared.tombstones };
    ops.forEach((op, i) => {
      if (op.op === 'remove') tombstones[op.entityId] = bases[i]!;
    });
    for (const op of applied.ops) pending[op.entityId] = commandNumber;
    shared = { ...shared, document: applied.document, pending, tombstones };
    if (tell) {
      const sent = applied.ops.map((op) => ({ ...op, baseVersion: baseVersionOf(shared, op.entityId) }));
      const command: DeskCommand = { number: commandNumber, label, ops: sent };
      for (const listener of commandListeners) listener(command);
    }
    return stepOf(label, applied);
  }

  /** Takes the newest step of one list back and puts what restores it on the other. */
  function takeStep(from: 'done' | 'undone'): RunResult {
    const step = history[from].at(-1);
    if (step === undefined) return refuse(from === 'done' ? text.nothingToUndo : text.nothingToRedo);
    const against = reasonAgainst(step.inverse);
    if (against !== null) return refuse(against);
    const remaining = history[from].slice(0, -1);
    if (!isUntouched(step, shared.document)) {
      history = { ...history, [from]: remaining };
      publish(shared);
      return refuse(text.changedSince(step.label));
    }
    const before = shared.document;
    const label = from === 'done' ? text.undone(step.label) : text.redone(step.label);
    const back = applyAsCommand(label, step.inverse, true);
    const other = from === 'done' ? 'undone' : 'done';
    const moved = back === null ? history[other] : [...history[other], { ...back, label: step.label }];
    history = { ...history, [from]: remaining, [other]: moved };
    const { draft, tool } = store.getState();
    const reopened = draft === null ? reopenedLine(before, shared.document, tool) : null;
    publish(shared, {
      notice: null,
      draft: reopened === null ? draft : { lineId: reopened, atStart: false },
    });
    return ACCEPTED;
  }

  const actions: DeskActions = {
    run(label, ops) {
      const against = reasonAgainst(ops);
      if (against !== null) return refuse(against);
      const step = applyAsCommand(label, ops, true);
      if (step === null) return ACCEPTED;
      history = withStep(history, step);
      publish(shared, { notice: null });
      return ACCEPTED;
    },
    undo: () => takeStep('done'),
    redo: () => takeStep('undone'),
    setTool(tool, boundary) {
      const { boundaryKind, readOnly } = store.getState();
      if (readOnly && tool !== 'select' && tool !== 'note') return;
      store.setState({ tool, boundaryKind: boundary ?? boundaryKind, draft: null, preview: {} });
    },
    select: (selection) =>
      store.setState({ selection: prunedSelection({ vertex: null, ...selection }, shared.document) }),
    setPointer: (pointerAt) => store.setState({ pointerAt }),
    setDraft: (draft) => store.setState({ draft: keptDraft(draft, shared.document) }),
    setPreview: (preview) => store.setState({ preview }),
    setHidden: (hiddenKinds) => store.setState({ hiddenKinds }),
    setReadOnly: (readOnly) => store.setState({ readOnly, draft: null, preview: {}, tool: 'select' }),
    setNotice: (notice) => store.setState({ notice }),
    receive(changes) {
      const next = receiveChanges(shared, changes.entities, options.clientId ?? null);
      publish(next, { changeNumber: Math.max(store.getState().changeNumber, changes.changeNumber) });
    },
    acknowledge: (outcomes, through) => publish(acknowledgeOutcomes(shared, outcomes, through)),
    replay(ops) {
      const before = shared;
      applyAsCommand('', ops, false);
      // What was kept stands on the version it was made on: a newer one at the server must come back as a conflict.
      for (const op of ops) {
        if (before.pending[op.entityId] === undefined)
          shared = withVersion(shared, op.entityId, op.baseVersion);
      }
      publish(shared);
      return commandNumber;
    },
    resolveConflict(entityId, keep) {
      const conflict = shared.conflicts[entityId];
      if (conflict === undefined) return;
      if (keep === 'theirs') return publish(keepTheirs(shared, entityId));
      shared = rebaseMine(shared, entityId);
      commandNumber += 1;
      shared = { ...shared, pending: { ...shared.pending, [entityId]: commandNumber } };
      const baseVersion = baseVersionOf(shared, entityId);
      const op: CommandOp =
        conflict.mine === null
          ? { op: 'remove', entityId, baseVersion }
          : { op: 'put', entityId, value: conflict.mine, baseVersion };
      const command = { number: commandNumber, label: text.keptMine, ops: [op] };
      for (const listener of commandListeners) listener(command);
      publish(shared);
    },
    baseVersionOf: (entityId) => baseVersionOf(shared, entityId),
    onCommand: (listener) => subscribeTo(commandListeners, listener),
    emitIntent(intent) {
      for (const listener of intentListeners) listener(intent);
    },
    onIntent: (listener) => subscribeTo(intentListeners, listener),
    lookAt(at) {
      for (const listener of lookListeners) listener(at);
    },
    onLookAt: (listener) => subscribeTo(lookListeners, listener),
    newId: makeId,
    close() {
      endAnswers?.();
      options.reader?.close();
      commandListeners.clear();
      intentListeners.clear();
      lookListeners.clear();
    },
  };
  return { ...store, ...actions };
}

function keptDraft(draft: Draft | null, document: FlowNetDocument): Draft | null {
  if (draft === null) return null;
  const value = document.entities[draft.lineId]?.value;
  return value?.kind === 'line' && !value.finished ? draft : null;
}

/** True when the values of two documents differ, not only the versions beside them. */
function valuesDiffer(a: FlowNetDocument, b: FlowNetDocument): boolean {
  if (a.entities === b.entities) return false;
  const ids = Object.keys(a.entities);
  if (ids.length !== Object.keys(b.entities).length) return true;
  return ids.some((id) => a.entities[id]?.value !== b.entities[id]?.value);
}

function subscribeTo<T>(listeners: Set<(value: T) => void>, listener: (value: T) => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}
