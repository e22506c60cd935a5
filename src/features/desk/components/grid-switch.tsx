import { useMemo } from 'react';
import { useStore } from 'zustand';
import { classNames } from '#client/components/class-names.ts';
import { gridText as text } from '#client/text/set-out.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { settingOutAids, toggleGrid } from '../model/setting-out-aids.ts';

/** Shows lines of equal offset and elevation over the sheet, to check the set-out by eye. */
export function GridSwitch({ store }: { store: DeskStore }) {
  const document = useStore(store, (state) => state.document);
  const shown = useStore(settingOutAids, (state) => state.showsGrid);
  const isSetOut = useMemo(() => readSetOut(document).map !== null, [document]);
  return (
    <button
      type="button"
      data-over-sheet
      aria-pressed={shown && isSetOut}
      aria-keyshortcuts="G"
      disabled={!isSetOut}
      title={isSetOut ? text.title : text.waiting}
      className={classNames(
        // Over the sheet, so that its ground stays when it cannot be pressed.
        'touch rounded-sheet border border-rule px-2.5 py-1 leading-[1.4] hover:bg-hover disabled:bg-film disabled:text-ink-2',
        shown && isSetOut ? 'bg-chosen font-semibold' : 'bg-film',
      )}
      onClick={toggleGrid}
    >
      {text.name}
    </button>
  );
}
