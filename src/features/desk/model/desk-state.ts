import type { StoreApi } from 'zustand/vanilla';
import type { DocumentEntity, FlowNetDocument, LineKind, SheetPoint } from '#shared/contract/document.ts';
import type { ChangesDto, OpOutcome } from '#shared/contract/nets.ts';
import type { NetReading } from '#shared/contract/reading.ts';
import type { LocalOp } from './document-ops.ts';
import type { GuideOwner, Guides, GuidesByOwner } from './guides.ts';
import type { History } from './history.ts';
import type { DeskIntent } from './intents.ts';
import type { EditEvent, PendingEdit } from './pending-edit.ts';
import type { HeadRead, ReadingPort } from './reading-port.ts';
import type { Selection } from './selection.ts';
import type { Conflict } from './shared-edits.ts';
import type { BoundaryKind, ToolId } from './tool-choice.ts';
import type { ViewAids } from './view-aids.ts';

/** Kinds that can be hidden on the sheet. */
export type HideableKind = LineKind | 'readingPoint' | 'knownPoint' | 'profile' | 'note';

/** The line under way: it is in the document already, unfinished. `atStart`: it grows at its first point. */
export type Draft = { readonly lineId: string; readonly atStart: boolean };

/**
 * A change as it goes to the saving part. `baseVersion` is the version the server was last known to hold when the
 * change was made (0 = never); the queue asks `baseVersionOf` again when it forms a batch, because its own earlier
 * batches raise it. A `remove` on version 0 concerns an entity that never reached the server.
 */
export type CommandOp = LocalOp & { baseVersion: number };
export type DeskCommand = {
  readonly number: number;
  readonly label: string;
  readonly ops: readonly CommandOp[];
};

/** A selection; without `vertex` no vertex is chosen. */
export type SelectionInput = Omit<Selection, 'vertex'> & { readonly vertex?: number | null };

export type RunResult = { ok: true } | { ok: false; reason: string };

export type DeskState = {
  readonly document: FlowNetDocument;
  /** Counts every change of `document`, whoever made it. */
  readonly documentRevision: number;
  /** Number of the newest change of the server's contained in `document`. */
  readonly changeNumber: number;
  /** Reading of the document of revision `readingOf`; null until the first is worked out. */
  readonly reading: NetReading | null;
  readonly readingOf: number;
  /** Revision of which the reading points are: they may be read ahead of the rest. */
  readonly pointsOf: number;
  /** True when the last attempt to read failed; the reading shown is then older than the document. */
  readonly readingFailed: boolean;
  readonly tool: ToolId;
  readonly boundaryKind: BoundaryKind;
  readonly selection: Selection;
  readonly pointerAt: SheetPoint | null;
  readonly hiddenKinds: readonly HideableKind[];
  /** Kinds that are shown and snapped to, but neither picked nor changed. */
  readonly lockedKinds: readonly HideableKind[];
  /** What helps in tracing and how the sheet looks: a person's own choice, no part of the net. */
  readonly aids: ViewAids;
  /** What is shown over the sheet besides the net. */
  readonly guides: GuidesByOwner;
  readonly history: { readonly undoLabel: string | null; readonly redoLabel: string | null };
  /** All steps that can be taken back or done again. */
  readonly steps: History;
  readonly draft: Draft | null;
  /** What the next click on the sheet answers; null while nothing is asked for. */
  readonly pendingEdit: PendingEdit | null;
  /** Entities as they look while something is being dragged and is not let go yet. */
  readonly preview: Readonly<Record<string, DocumentEntity>>;
  readonly conflicts: Readonly<Record<string, Conflict>>;
  /** Entities with changes the server has not answered yet, each with its last command's number. */
  readonly pending: Readonly<Record<string, number>>;
  /** A refusal to be shown; null when there is none. */
  readonly notice: string | null;
  readonly readOnly: boolean;
};

export type DeskActions = {
  run(label: string, ops: readonly LocalOp[]): RunResult;
  /** Takes the newest step back, or the newest `count` of them; those that cannot be are passed over. */
  undo(count?: number): RunResult;
  redo(count?: number): RunResult;
  setTool(tool: ToolId, boundary?: BoundaryKind): void;
  select(selection: SelectionInput): void;
  setPointer(at: SheetPoint | null): void;
  setDraft(draft: Draft | null): void;
  setPendingEdit(edit: PendingEdit | null): void;
  setPreview(preview: Readonly<Record<string, DocumentEntity>>): void;
  setHidden(kinds: readonly HideableKind[]): void;
  setLocked(kinds: readonly HideableKind[]): void;
  setAids(aids: Partial<ViewAids>): void;
  /** Shows guides over the sheet, or takes an owner's away with null. */
  setGuides(owner: GuideOwner, guides: Guides | null): void;
  setReadOnly(readOnly: boolean): void;
  setNotice(notice: string | null): void;
  /** Takes the server's changes in; never over changes of ours that are under way. */
  receive(changes: ChangesDto): void;
  /** Takes the server's answers in to all commands up to number `through`. */
  acknowledge(outcomes: readonly OpOutcome[], through: number): void;
  /** Puts back changes kept from an earlier visit, without telling the saving part; gives the command's number. */
  replay(ops: readonly CommandOp[]): number;
  resolveConflict(entityId: string, keep: 'mine' | 'theirs'): void;
  baseVersionOf(entityId: string): number;
  /** The head at a place by the net read last; null where it gives none, or the question was overtaken. */
  headAt(place: SheetPoint): Promise<HeadRead | null>;
  onCommand(listener: (command: DeskCommand) => void): () => void;
  emitIntent(intent: DeskIntent): void;
  onIntent(listener: (intent: DeskIntent) => void): () => void;
  /** Asks the canvas to bring a place of the sheet into view. */
  lookAt(at: SheetPoint): void;
  onLookAt(listener: (at: SheetPoint) => void): () => void;
  /** Asks the tools on the sheet to do something with what is chosen. */
  requestEdit(event: EditEvent): void;
  onEditRequest(listener: (event: EditEvent) => void): () => void;
  newId(): string;
  close(): void;
};

export type DeskStore = StoreApi<DeskState> & DeskActions;

export type DeskStoreOptions = {
  /** Works readings out; left out where a frozen reading is shown. */
  reader?: ReadingPort;
  /** A frozen reading, shown as it is. */
  reading?: NetReading;
  readOnly?: boolean;
  /** The saving part's client id, to know our own changes when they come back. */
  clientId?: string;
  newId?: () => string;
  /** Steps of earlier visits that can still be taken back. */
  history?: History;
};
