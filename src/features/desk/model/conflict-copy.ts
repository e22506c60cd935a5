import { savingText as text } from '#client/text/saving.ts';
import { type DocumentEntity, SINGLE_KINDS } from '#shared/contract/document.ts';
import type { DeskStore } from './desk-state.ts';
import type { Conflict } from './shared-edits.ts';

/** True when both versions can stand beside one another: of water levels and the like a net has one set only. */
export function canKeepBoth({ mine, theirs }: Conflict): boolean {
  if (mine === null || theirs === null) return false;
  return !SINGLE_KINDS.includes(mine.kind);
}

/** Puts a version that gave way into the document as a thing of its own, named as a copy where it has a name. */
export function keepAsCopy(desk: DeskStore, mine: DocumentEntity): void {
  const named = 'name' in mine && mine.name !== '';
  const value: DocumentEntity = named ? { ...mine, name: text.copyOf(mine.name) } : mine;
  desk.run(text.keptAsCopy, [{ op: 'put', entityId: desk.newId(), value }]);
}
