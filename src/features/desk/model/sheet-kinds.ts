import type { DocumentEntity, LineKind } from '#shared/contract/document.ts';
import type { HideableKind } from './desk-state.ts';

/** Kinds of lines in the order in which they are listed: the net before the boundaries. */
export const LINE_KINDS: readonly LineKind[] = [
  'equipotential',
  'flowLine',
  'phreaticLine',
  'submergedFace',
  'outflowFace',
  'drain',
  'impervious',
  'ground',
  'soilBoundary',
];

/** All kinds that can be hidden on the sheet, in the order in which they are listed. */
export const SHEET_KINDS: readonly HideableKind[] = [
  ...LINE_KINDS,
  'readingPoint',
  'profile',
  'knownPoint',
  'note',
];

/** The kind by which a thing is hidden or locked; the kind of a line is that of what it stands for. */
export function kindOnSheet(value: DocumentEntity): string {
  return value.kind === 'line' ? value.line : value.kind;
}

export function isSheetKind(kind: string): kind is HideableKind {
  return (SHEET_KINDS as readonly string[]).includes(kind);
}

/** True for what water meets at the edge of the ground, or soil at another soil: what is drawn as a boundary. */
export function isBoundaryKind(kind: LineKind): boolean {
  return kind !== 'equipotential' && kind !== 'flowLine' && kind !== 'phreaticLine';
}
