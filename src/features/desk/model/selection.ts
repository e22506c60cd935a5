import type { DocumentEntity, FlowNetDocument } from '#shared/contract/document.ts';
import { kindOnSheet } from './sheet-kinds.ts';

/**
 * What is chosen on the desk. `several`: two or more things, of one kind or of several; of every other kind there is
 * one. `vertex`: index of the chosen vertex of a single chosen line.
 */
export type Selection = {
  readonly kind: 'line' | 'readingPoint' | 'knownPoint' | 'soil' | 'profile' | 'several' | 'none';
  readonly ids: readonly string[];
  readonly vertex: number | null;
};

export const NO_SELECTION: Selection = { kind: 'none', ids: [], vertex: null };

export function selectOne(
  kind: Exclude<Selection['kind'], 'none' | 'several'>,
  id: string,
  vertex: number | null = null,
): Selection {
  return { kind, ids: [id], vertex };
}

/** Kinds of which several can be chosen at once: a known point belongs to all nets of its section, a soil to a region. */
const TOGETHER: readonly string[] = ['line', 'readingPoint', 'profile'] satisfies Selection['kind'][];

/** True for a thing of which several can be chosen at once. */
export function canBeTogether(value: DocumentEntity | undefined): boolean {
  return value !== undefined && TOGETHER.includes(value.kind);
}

/** All of the things given that can be chosen together and are in the document, each once. */
export function selectSeveral(ids: readonly string[], document: FlowNetDocument): Selection {
  const [first, ...more] = new Set(ids.filter((id) => canBeTogether(document.entities[id]?.value)));
  if (first === undefined) return NO_SELECTION;
  if (more.length > 0) return { kind: 'several', ids: [first, ...more], vertex: null };
  return { kind: document.entities[first]?.value.kind as Selection['kind'], ids: [first], vertex: null };
}

/** The selection without what the document no longer holds. */
export function prunedSelection(selection: Selection, document: FlowNetDocument): Selection {
  if (selection.kind === 'none') return selection;
  if (selection.kind === 'several' || selection.ids.length > 1) {
    const held = selectSeveral(selection.ids, document);
    const asBefore = held.kind === selection.kind && held.ids.length === selection.ids.length;
    return asBefore ? selection : held;
  }
  const ids = selection.ids.filter((id) => document.entities[id]?.value.kind === selection.kind);
  if (ids.length === 0) return NO_SELECTION;
  const vertex = prunedVertex(selection.vertex, ids, document);
  if (ids.length === selection.ids.length && vertex === selection.vertex) return selection;
  return { kind: selection.kind, ids, vertex };
}

function prunedVertex(
  vertex: number | null,
  ids: readonly string[],
  document: FlowNetDocument,
): number | null {
  const value = ids.length === 1 ? document.entities[ids[0]!]?.value : undefined;
  if (vertex === null || value?.kind !== 'line') return null;
  return vertex < value.points.length ? vertex : null;
}

/** The selection without things of some kinds, which are hidden or locked. */
export function withoutKinds(
  selection: Selection,
  kinds: readonly string[],
  document: FlowNetDocument,
): Selection {
  const ids = selection.ids.filter((id) => {
    const value = document.entities[id]?.value;
    return value !== undefined && !kinds.includes(kindOnSheet(value));
  });
  if (ids.length === selection.ids.length) return selection;
  return ids.length === 0
    ? NO_SELECTION
    : prunedSelection({ kind: selection.kind, ids, vertex: null }, document);
}
