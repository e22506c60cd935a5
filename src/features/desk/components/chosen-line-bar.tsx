import { useStore } from 'zustand';
import { lineText } from '#client/text/desk-forms.ts';
import type { DeskStore } from '../model/desk-state.ts';

/** On a narrow screen: which line is chosen, and the way to its properties, which do not fit beside the sheet. */
export function ChosenLineBar({ store, onOpen }: { store: DeskStore; onOpen: (lineId: string) => void }) {
  const lineId = useStore(store, ({ selection }) =>
    selection.kind === 'line' ? selection.ids[0] : undefined,
  );
  const line = useStore(store, ({ document }) => (lineId ? document.entities[lineId]?.value : undefined));
  if (!lineId || line?.kind !== 'line') return null;
  return (
    <p className="m-0 flex items-center gap-3 border-b border-rule bg-film px-3 py-1">
      <span className="min-w-0 break-words">
        {lineText.kinds[line.line]} {line.name}
      </span>
      <button type="button" className="touch ml-auto underline" onClick={() => onOpen(lineId)}>
        {lineText.properties}
      </button>
    </p>
  );
}
