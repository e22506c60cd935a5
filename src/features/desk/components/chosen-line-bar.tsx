import { useStore } from 'zustand';
import { classNames } from '#client/components/class-names.ts';
import { lineText } from '#client/text/desk-forms.ts';
import { editingText as text } from '#client/text/editing-lines.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { LineOperations } from './line-operations.tsx';
import type { MarginForm } from './margin-form.tsx';

/**
 * On a narrow screen: what is chosen and what can be done with it, and the way to its form, which does not fit beside
 * the sheet.
 */
export function ChosenLineBar({ store, onOpen }: { store: DeskStore; onOpen: (form: MarginForm) => void }) {
  const selection = useStore(store, (state) => state.selection);
  const document = useStore(store, (state) => state.document);
  const readOnly = useStore(store, (state) => state.readOnly);
  const several = selection.kind === 'several';
  const [lineId] = selection.ids;
  const values = selection.ids.flatMap((id) => document.entities[id]?.value ?? []);
  const [line] = values;
  if (lineId === undefined || line === undefined) return null;
  if (!several && line.kind !== 'line') return null;
  return (
    <div className="border-b border-rule bg-film px-3 py-1">
      <p className="m-0 flex items-center gap-3">
        <span className="min-w-0 break-words">
          {several || line.kind !== 'line'
            ? text.chosen(values)
            : `${lineText.kinds[line.line]} ${line.name}`}
        </span>
        <span className="ml-auto" />
        {readOnly ? null : <ChooseMore store={store} />}
        <button
          type="button"
          className="touch underline"
          onClick={() => onOpen(several ? { form: 'several' } : { form: 'line', lineId })}
        >
          {lineText.properties}
        </button>
      </p>
      {readOnly ? null : (
        <div className="pb-1">
          <LineOperations
            store={store}
            {...(several ? { ops: ['join', 'reverse', 'smooth'] as const } : {})}
          />
        </div>
      )}
    </div>
  );
}

/** Lets clicks add to what is chosen, for those who have no Shift key at hand. */
function ChooseMore({ store }: { store: DeskStore }) {
  const on = useStore(store, (state) => state.pendingEdit?.op === 'chooseMore');
  return (
    <button
      type="button"
      aria-pressed={on}
      className={classNames(
        'touch shrink-0 rounded-sheet border px-2 py-[3px] text-sm hover:bg-hover',
        on ? 'border-ink bg-chosen font-semibold' : 'border-edge bg-film',
      )}
      onClick={() => store.requestEdit({ type: 'chooseMore' })}
    >
      {text.chooseMore}
    </button>
  );
}
