import { useStore } from 'zustand';
import { classNames } from '#client/components/class-names.ts';
import { editingText as text } from '#client/text/editing-lines.ts';
import type { DeskStore } from '../model/desk-state.ts';
import type { LineOp } from '../model/pending-edit.ts';

const OPS = Object.keys(text.ops) as LineOp[];

/** What can be done with the chosen line or lines, with the keys that do it; one that asks for a place stays pressed. */
export function LineOperations({ store, ops = OPS }: { store: DeskStore; ops?: readonly LineOp[] }) {
  const asked = useStore(store, (state) => state.pendingEdit?.op ?? null);
  return (
    <fieldset className="m-0 flex min-w-0 flex-wrap gap-1.5 border-0 p-0">
      <legend className="sr-only">{text.operations}</legend>
      {ops.map((op) => (
        <button
          key={op}
          type="button"
          title={text.opHints[op]}
          aria-pressed={asked === op}
          aria-keyshortcuts={text.keys[op]}
          onClick={() => store.requestEdit(asked === op ? { type: 'leaveEdit' } : { type: 'lineOp', op })}
          className={classNames(
            'touch flex items-center gap-1.5 rounded-sheet border px-2 py-[3px] text-sm hover:bg-hover',
            asked === op ? 'border-ink bg-chosen font-semibold' : 'border-edge bg-film',
          )}
        >
          {text.ops[op]}
          <span aria-hidden="true" className="text-xs font-normal text-ink-2 pointer-coarse:hidden">
            {text.keys[op]}
          </span>
        </button>
      ))}
    </fieldset>
  );
}
