import type { FlowNetDocument } from '#shared/contract/document.ts';
import { kindOnSheet } from './sheet-kinds.ts';

/** What is chosen on the desk. `vertex`: index of the chosen vertex of a single chosen line. */
export type Selection = {
  readonly kind: 'line' | 'readingPoint' | 'knownPoint' | 'soil' | 'profile' | 'none';
  readonly ids: readonly string[];
  readonly vertex: number | null;
};

export const NO_SELECTION: Selection = { kind: 'none', ids: [], vertex: null };

export function selectOne(
  kind: Exclude<Selection['kind'], 'none'>,
  id: string,
  vertex: number | null = null,
): Selection {
  return { kind, ids: [id], vertex };
}

/** The selection without what the document no longer holds. */
export function prunedSelection(selection: Selection, document: FlowNetDocument): Selection {
  if (selection.kind === 'none') return selection;
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
  return ids.length === 0 ? NO_SELECTION : { kind: selection.kind, ids, vertex: null };
}
