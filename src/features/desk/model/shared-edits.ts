import type { PersonRef } from '#shared/contract/common.ts';
import type { DocumentEntity, FlowNetDocument, VersionedEntity } from '#shared/contract/document.ts';
import type { ChangesDto, OpOutcome } from '#shared/contract/nets.ts';
import { entityValue } from './document-ops.ts';
import { sameValue } from './same-value.ts';

/** An entity that someone else changed while a change of ours was on its way; both are kept until one is chosen. */
export type Conflict = {
  readonly entityId: string;
  /** Ours; null when we removed it. */
  readonly mine: DocumentEntity | null;
  /** The server's; null when it was removed there. */
  readonly theirs: DocumentEntity | null;
  /** Version the server holds. */
  readonly version: number;
  readonly changedBy: PersonRef | null;
};

type Incoming = ChangesDto['entities'][number];

/** The document together with what is known about the server's copy of it. */
export type SharedDocument = {
  readonly document: FlowNetDocument;
  /** Versions of removed entities, so that bringing one back is based on its tombstone. */
  readonly tombstones: Readonly<Record<string, number>>;
  /** For each entity with changes of ours the server has not answered yet: the number of the last such command. */
  readonly pending: Readonly<Record<string, number>>;
  /** Newer versions of pending entities, kept aside until the answer about ours is there. */
  readonly heldBack: Readonly<Record<string, Incoming>>;
  readonly conflicts: Readonly<Record<string, Conflict>>;
};

export function sharedDocumentOf(document: FlowNetDocument): SharedDocument {
  return { document, tombstones: {}, pending: {}, heldBack: {}, conflicts: {} };
}

/** Version of an entity that the server was last known to hold; 0 when it never held it. */
export function baseVersionOf(shared: SharedDocument, entityId: string): number {
  return shared.document.entities[entityId]?.version ?? shared.tombstones[entityId] ?? 0;
}

/** Takes changes from the server in; entities with changes of ours under way are kept aside, never overwritten. */
export function receiveChanges(
  shared: SharedDocument,
  changes: readonly Incoming[],
  ownClientId: string | null,
): SharedDocument {
  let next = shared;
  for (const change of changes) {
    if (change.version <= baseVersionOf(next, change.id)) continue;
    const conflict = next.conflicts[change.id];
    if (conflict !== undefined) next = withConflict(next, theirsFrom(conflict, change));
    else if (next.pending[change.id] === undefined)
      next = withServerValue(next, change.id, change.version, change.value);
    else if (ownClientId === null || change.clientId !== ownClientId) {
      next = { ...next, heldBack: { ...next.heldBack, [change.id]: change } };
    }
  }
  return next;
}

/** Takes the server's answer in to all commands up to number `through`. */
export function acknowledgeOutcomes(
  shared: SharedDocument,
  outcomes: readonly OpOutcome[],
  through: number,
): SharedDocument {
  let next = shared;
  for (const outcome of outcomes) {
    next = outcome.outcome === 'applied' ? applied(next, outcome, through) : refused(next, outcome);
  }
  return next;
}

function applied(shared: SharedDocument, outcome: OpOutcome, through: number): SharedDocument {
  const id = outcome.entityId;
  const known = withVersion(shared, id, outcome.version);
  if ((known.pending[id] ?? 0) > through) return known;
  const held = known.heldBack[id];
  const settled = { ...known, pending: without(known.pending, id), heldBack: without(known.heldBack, id) };
  if (held === undefined || held.version <= outcome.version) return settled;
  return withServerValue(settled, id, held.version, held.value);
}

function refused(shared: SharedDocument, outcome: OpOutcome): SharedDocument {
  const id = outcome.entityId;
  const mine = entityValue(shared.document, id);
  const theirs = outcome.current?.value ?? null;
  if (sameValue(mine, theirs)) {
    const settled = {
      ...shared,
      pending: without(shared.pending, id),
      heldBack: without(shared.heldBack, id),
    };
    return withVersion(settled, id, outcome.version);
  }
  const conflict: Conflict = {
    entityId: id,
    mine,
    theirs,
    version: outcome.version,
    changedBy: outcome.changedBy,
  };
  const held = shared.heldBack[id];
  const newest = held !== undefined && held.version > outcome.version ? theirsFrom(conflict, held) : conflict;
  return withConflict({ ...shared, heldBack: without(shared.heldBack, id) }, newest);
}

/** Gives way to the server's version of an entity in conflict. */
export function keepTheirs(shared: SharedDocument, entityId: string): SharedDocument {
  const conflict = shared.conflicts[entityId];
  if (conflict === undefined) return shared;
  const settled = {
    ...shared,
    conflicts: without(shared.conflicts, entityId),
    pending: without(shared.pending, entityId),
    heldBack: without(shared.heldBack, entityId),
  };
  return withServerValue(settled, entityId, conflict.version, conflict.theirs);
}

/** Bases our version of an entity in conflict on the server's newest, so that it can be sent on top of it. */
export function rebaseMine(shared: SharedDocument, entityId: string): SharedDocument {
  const conflict = shared.conflicts[entityId];
  if (conflict === undefined) return shared;
  const settled = { ...shared, conflicts: without(shared.conflicts, entityId) };
  return withVersion(settled, entityId, conflict.version);
}

/** Says on which version of the server's the document's present value of an entity stands. */
export function withVersion(shared: SharedDocument, entityId: string, version: number): SharedDocument {
  const held = shared.document.entities[entityId];
  if (held === undefined) return { ...shared, tombstones: { ...shared.tombstones, [entityId]: version } };
  if (held.version === version) return shared;
  return { ...shared, document: withEntity(shared.document, { ...held, version }) };
}

function withServerValue(
  shared: SharedDocument,
  entityId: string,
  version: number,
  value: DocumentEntity | null,
): SharedDocument {
  if (value === null) {
    const entities = without(shared.document.entities, entityId);
    const tombstones = { ...shared.tombstones, [entityId]: version };
    return { ...shared, document: { ...shared.document, entities }, tombstones };
  }
  const held = shared.document.entities[entityId];
  const kept = held !== undefined && sameValue(held.value, value) ? held.value : value;
  const document = withEntity(shared.document, { id: entityId, version, value: kept });
  return { ...shared, document, tombstones: without(shared.tombstones, entityId) };
}

function withEntity(document: FlowNetDocument, entity: VersionedEntity): FlowNetDocument {
  return { ...document, entities: { ...document.entities, [entity.id]: entity } };
}

function withConflict(shared: SharedDocument, conflict: Conflict): SharedDocument {
  return { ...shared, conflicts: { ...shared.conflicts, [conflict.entityId]: conflict } };
}

function theirsFrom(conflict: Conflict, change: Incoming): Conflict {
  if (change.version <= conflict.version) return conflict;
  return { ...conflict, theirs: change.value, version: change.version, changedBy: change.changedBy };
}

function without<T>(record: Readonly<Record<string, T>>, key: string): Record<string, T> {
  const { [key]: _left, ...rest } = record;
  return rest;
}
