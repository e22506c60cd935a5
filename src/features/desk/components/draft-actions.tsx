import { useStore } from 'zustand';
import { buttonClass } from '#client/components/button.tsx';
import { deskViewText as text } from '#client/text/desk-view.ts';
import type { DeskStore } from '../model/desk-state.ts';

type DraftActionsProps = { store: DeskStore; onAction(action: 'finish' | 'takeBack' | 'cancel'): void };

/** What Enter, Backspace and Escape do, for fingers: shown on touch screens while a line is being drawn. */
export function DraftActions({ store, onAction }: DraftActionsProps) {
  const drawing = useStore(store, (state) => state.draft !== null);
  if (!drawing) return null;
  return (
    <fieldset data-over-sheet className="m-0 hidden gap-2 border-0 p-0 pointer-coarse:flex">
      <legend className="sr-only">{text.lineActions}</legend>
      <button type="button" className={buttonClass('plain')} onClick={() => onAction('finish')}>
        {text.finishLine}
      </button>
      <button type="button" className={buttonClass('quiet')} onClick={() => onAction('takeBack')}>
        {text.takeBackPoint}
      </button>
      <button type="button" className={buttonClass('quiet')} onClick={() => onAction('cancel')}>
        {text.cancelLine}
      </button>
    </fieldset>
  );
}
