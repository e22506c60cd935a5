import type { LineKind, SheetPoint } from '#shared/contract/document.ts';
import type { Selection } from './selection.ts';

/** What can be done with a chosen line: at once, or after a place on the sheet was asked for. */
export type LineOp = 'split' | 'join' | 'trim' | 'extend' | 'reverse' | 'smooth';

/** What the next click on the sheet answers. `chooseMore`: clicks add to what is chosen, as with Shift held. */
export type PendingEdit =
  | { readonly op: 'split' | 'join' | 'trim' | 'extend'; readonly lineId: string }
  | { readonly op: 'chooseMore' };

/** What keys, bars and forms ask of what is chosen; the tools carry it out. */
export type EditEvent =
  | { readonly type: 'lineOp'; readonly op: LineOp }
  | { readonly type: 'chooseAll' | 'chooseMore' | 'copy' | 'paste' | 'duplicate' | 'removeChosen' }
  /** Ends what is asked for, and a move by arrow keys. */
  | { readonly type: 'leaveEdit' | 'settle' }
  /** `by`: sheet pixels. `nudge` is shown at once and becomes a step when the key is let go. */
  | { readonly type: 'nudge'; readonly by: SheetPoint }
  | { readonly type: 'moveBy'; readonly by: SheetPoint; readonly asCopy: boolean }
  | { readonly type: 'changeKind'; readonly line: LineKind };

/** What is asked for, as far as it still makes sense with what is chosen. */
export function keptEdit(pending: PendingEdit | null, selection: Selection): PendingEdit | null {
  if (pending === null || pending.op === 'chooseMore') return pending;
  return selection.kind === 'line' && selection.ids[0] === pending.lineId ? pending : null;
}
