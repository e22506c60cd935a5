import { v7 as newUuid } from 'uuid';
import { createStore } from 'zustand/vanilla';
import { deskCanvasText as text } from '#client/text/desk-canvas.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import { createDeskEdits } from './desk-edits.ts';
import type {
  DeskActions,
  DeskCommand,
  DeskState,
  DeskStore,
  DeskStoreOptions,
  Draft,
  HideableKind,
  RunResult,
} from './desk-state.ts';
import { withGuides } from './guides.ts';
import { EMPTY_HISTORY, historyLabels } from './history.ts';
import type { DeskIntent } from './intents.ts';
import { createListeners } from './listeners.ts';
import { type EditEvent, keptEdit } from './pending-edit.ts';
import { reopenedLine } from './reopened-line.ts';
import { NO_SELECTION, prunedSelection, withoutKinds } from './selection.ts';
import { FIRST_AIDS } from './view-aids.ts';

type Opened = { document: FlowNetDocument; changeNumber?: number };

function firstState(opened: Opened, options: DeskStoreOptions): DeskState {
  return {
    document: opened.document,
    documentRevision: 0,
    changeNumber: opened.changeNumber ?? 0,
    reading: options.reading ?? null,
    readingOf: options.reading === undefined ? -1 : 0,
    pointsOf: options.reading === undefined ? -1 : 0,
    readingFailed: false,
    tool: 'select',
    boundaryKind: 'headwaterFace',
    selection: NO_SELECTION,
    pointerAt: null,
    hiddenKinds: [],
    lockedKinds: [],
    aids: FIRST_AIDS,
    guides: {},
    history: historyLabels(options.history ?? EMPTY_HISTORY),
    steps: options.history ?? EMPTY_HISTORY,
    draft: null,
    pendingEdit: null,
    preview: {},
    conflicts: {},
    pending: {},
    notice: null,
    readOnly: options.readOnly ?? false,
  };
}

/** The state of one open net: its document with local changes, what is chosen, and what the server knows. */
export function createDeskStore(opened: Opened, options: DeskStoreOptions = {}): DeskStore {
  const commands = createListeners<DeskCommand>();
  const intents = createListeners<DeskIntent>();
  const looks = createListeners<SheetPoint>();
  const editRequests = createListeners<EditEvent>();
  const edits = createDeskEdits(opened.document, commands.tell, options.history);
  const store = createStore<DeskState>(() => firstState(opened, options));

  const endAnswers = options.reader?.onAnswer((revision, reading) => {
    if (reading === null) store.setState({ readingFailed: true });
    else store.setState({ reading, readingOf: revision, pointsOf: revision, readingFailed: false });
  });
  const endPoints = options.reader?.onPoints((revision, ahead) => {
    const { reading, documentRevision } = store.getState();
    // Points of a document that has changed again are not shown over those of another.
    if (reading !== null && revision === documentRevision) {
      store.setState({ reading: { ...reading, ...ahead }, pointsOf: revision });
    }
  });
  options.reader?.ask(opened.document, 0);

  /** Publishes the edits and asks for a reading when values, not only versions, have changed. */
  function publish(extra: Partial<DeskState> = {}): void {
    const { document, pending, conflicts } = edits.shared();
    const before = store.getState();
    const changed = valuesDiffer(document, before.document);
    const documentRevision = before.documentRevision + (changed ? 1 : 0);
    const selection = prunedSelection(before.selection, document);
    store.setState({
      ...extra,
      document,
      documentRevision,
      pending,
      conflicts,
      history: historyLabels(edits.history()),
      steps: edits.history(),
      selection,
      pendingEdit: keptEdit(before.pendingEdit, selection),
      draft: keptDraft(before.draft, document),
    });
    if (changed) options.reader?.ask(document, documentRevision);
  }

  /** Carries an edit out and publishes it; a refusal is shown. */
  function edit(action: () => RunResult): RunResult {
    const result: RunResult = store.getState().readOnly ? { ok: false, reason: text.readOnly } : action();
    publish({ notice: result.ok ? null : result.reason });
    return result;
  }

  function takeSteps(from: 'done' | 'undone', count: number): RunResult {
    const { document, draft, tool } = store.getState();
    const result = edit(() => {
      const [refused, ...more] = edits.takeSteps(from, count);
      if (refused === undefined) return { ok: true };
      return { ok: false, reason: more.length === 0 ? refused : text.severalRefused(more.length, refused) };
    });
    const lineId = draft === null ? reopenedLine(document, edits.shared().document, tool) : null;
    if (lineId !== null) actions.setDraft({ lineId, atStart: false });
    return result;
  }

  /** The selection without things of kinds that can no longer be picked. */
  function selectionOutside(kinds: readonly HideableKind[]): Pick<DeskState, 'selection' | 'pendingEdit'> {
    const { selection, document, pendingEdit } = store.getState();
    const left = withoutKinds(selection, kinds, document);
    return { selection: left, pendingEdit: keptEdit(pendingEdit, left) };
  }

  const actions: DeskActions = {
    run: (label, ops) => edit(() => edits.run(label, ops)),
    undo: (count = 1) => takeSteps('done', count),
    redo: (count = 1) => takeSteps('undone', count),
    setTool(tool, boundary) {
      const { boundaryKind, readOnly } = store.getState();
      if (readOnly && tool !== 'select' && tool !== 'note' && tool !== 'ruler') return;
      store.setState({
        tool,
        boundaryKind: boundary ?? boundaryKind,
        draft: null,
        pendingEdit: null,
        preview: {},
      });
    },
    select(input) {
      const { document, pendingEdit } = store.getState();
      const selection = prunedSelection({ vertex: null, ...input }, document);
      store.setState({ selection, pendingEdit: keptEdit(pendingEdit, selection) });
    },
    setPointer: (pointerAt) => store.setState({ pointerAt }),
    setDraft: (draft) => store.setState({ draft: keptDraft(draft, store.getState().document) }),
    setPendingEdit: (pendingEdit) =>
      store.setState({ pendingEdit: keptEdit(pendingEdit, store.getState().selection) }),
    setPreview: (preview) => store.setState({ preview }),
    setGuides: (owner, guides) =>
      store.setState({ guides: withGuides(store.getState().guides, owner, guides) }),
    setHidden: (hiddenKinds) => store.setState({ hiddenKinds, ...selectionOutside(hiddenKinds) }),
    setLocked: (lockedKinds) => store.setState({ lockedKinds, ...selectionOutside(lockedKinds) }),
    setAids: (aids) => store.setState({ aids: { ...store.getState().aids, ...aids } }),
    setReadOnly: (readOnly) =>
      store.setState({ readOnly, draft: null, pendingEdit: null, preview: {}, tool: 'select' }),
    setNotice: (notice) => store.setState({ notice }),
    receive(changes) {
      edits.receive(changes, options.clientId ?? null);
      publish({ changeNumber: Math.max(store.getState().changeNumber, changes.changeNumber) });
    },
    acknowledge(outcomes, through) {
      edits.acknowledge(outcomes, through);
      publish();
    },
    replay(ops) {
      const number = edits.replay(ops);
      publish();
      return number;
    },
    resolveConflict(entityId, keep) {
      edits.resolve(entityId, keep);
      publish();
    },
    baseVersionOf: edits.baseVersionOf,
    headAt: async (place) => options.reader?.headAt(place) ?? null,
    onCommand: commands.add,
    emitIntent: intents.tell,
    onIntent: intents.add,
    lookAt: looks.tell,
    onLookAt: looks.add,
    requestEdit: editRequests.tell,
    onEditRequest: editRequests.add,
    newId: options.newId ?? newUuid,
    close() {
      endAnswers?.();
      endPoints?.();
      options.reader?.close();
      commands.clear();
      intents.clear();
      looks.clear();
      editRequests.clear();
    },
  };
  return { ...store, ...actions };
}

function keptDraft(draft: Draft | null, document: FlowNetDocument): Draft | null {
  if (draft === null) return null;
  const value = document.entities[draft.lineId]?.value;
  return (value?.kind === 'line' || value?.kind === 'profile') && !value.finished ? draft : null;
}

/** True when the values of two documents differ, not only the versions beside them. */
function valuesDiffer(a: FlowNetDocument, b: FlowNetDocument): boolean {
  if (a.entities === b.entities) return false;
  const ids = Object.keys(a.entities);
  if (ids.length !== Object.keys(b.entities).length) return true;
  return ids.some((id) => a.entities[id]?.value !== b.entities[id]?.value);
}
