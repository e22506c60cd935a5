import { useStore } from 'zustand';
import { editingText as text } from '#client/text/editing-lines.ts';
import type { DeskStore } from '../model/desk-state.ts';

/** Over the sheet: what the next click answers, and the way out of it. */
export function EditPrompt({ store }: { store: DeskStore }) {
  const asked = useStore(store, (state) => state.pendingEdit?.op ?? null);
  if (asked === null) return null;
  return (
    <p className="m-0 flex max-w-full items-baseline gap-3 rounded-sheet border border-ink bg-film px-3 py-1.5">
      <span>
        {text.asks[asked]}
        {asked === 'chooseMore' ? null : (
          <span className="hidden pointer-coarse:inline"> {text.restToSee}</span>
        )}
      </span>
      <button
        type="button"
        data-over-sheet
        aria-keyshortcuts="Escape"
        className="touch shrink-0 border-0 bg-transparent underline"
        onClick={() => store.requestEdit({ type: 'leaveEdit' })}
      >
        {text.leave}
      </button>
    </p>
  );
}
