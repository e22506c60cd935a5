import { useStore } from 'zustand';
import { buttonClass } from '#client/components/button.tsx';
import { deskPaletteText } from '#client/text/desk-palette.ts';
import { deskViewText as text } from '#client/text/desk-view.ts';
import type { DeskStore } from '../model/desk-state.ts';

type DraftActionsProps = { store: DeskStore; onAction(action: 'finish' | 'takeBack' | 'cancel'): void };

/**
 * What Enter, Backspace, Escape and Ctrl+Z do, for fingers: on touch screens, within reach of the thumb. While a line
 * is being drawn its own steps stand there, else the last step of all.
 */
export function DraftActions({ store, onAction }: DraftActionsProps) {
  const drawing = useStore(store, (state) => state.draft !== null);
  const undoLabel = useStore(store, (state) => (state.readOnly ? null : state.history.undoLabel));
  if (!drawing && undoLabel === null) return null;
  return (
    <fieldset data-over-sheet className="m-0 hidden min-w-0 flex-wrap gap-2 border-0 p-0 pointer-coarse:flex">
      <legend className="sr-only">{drawing ? text.lineActions : text.lastStep}</legend>
      {drawing ? (
        <>
          <button type="button" className={buttonClass('plain')} onClick={() => onAction('finish')}>
            {text.finishLine}
          </button>
          <button type="button" className={buttonClass('plain')} onClick={() => onAction('takeBack')}>
            {text.takeBackPoint}
          </button>
          <button type="button" className={buttonClass('plain')} onClick={() => onAction('cancel')}>
            {text.cancelLine}
          </button>
        </>
      ) : (
        <button
          type="button"
          className={buttonClass('plain')}
          title={deskPaletteText.undoTitle(undoLabel)}
          onClick={() => store.undo()}
        >
          {deskPaletteText.undo}
        </button>
      )}
    </fieldset>
  );
}
