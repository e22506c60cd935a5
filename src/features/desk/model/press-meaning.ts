import type { DeskState } from './desk-state.ts';

type InHand = Pick<DeskState, 'tool' | 'readOnly' | 'pendingEdit'>;

/** True while an edit waits for a line to be pointed at, so that what it would do can be seen before it is done. */
export function asksForLine({ pendingEdit }: InHand): boolean {
  return pendingEdit !== null && pendingEdit.op !== 'chooseMore';
}

/** True while a press answers with something on the sheet; a note may be written where nothing may be changed. */
export function pressSets(state: InHand): boolean {
  return state.tool === 'note' || (!state.readOnly && (state.tool !== 'select' || asksForLine(state)));
}
