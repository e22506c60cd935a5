import { useStore } from 'zustand';
import { Button } from '#client/components/button.tsx';
import { lineText } from '#client/text/desk-forms.ts';
import { editingText } from '#client/text/editing-lines.ts';
import type { DocumentEntity, LineKind } from '#shared/contract/document.ts';
import type { DeskStore, HideableKind } from '../model/desk-state.ts';
import { isSheetKind, kindOnSheet } from '../model/sheet-kinds.ts';
import { Choice } from './form-fields.tsx';
import { FormPane } from './form-pane.tsx';
import { LineOperations } from './line-operations.tsx';
import { SeveralMove } from './several-move.tsx';

const text = editingText.form;

/** What can be done with several lines and points chosen at once. */
export function SeveralForm({
  store,
  disabled,
  onClose,
}: {
  store: DeskStore;
  disabled: boolean;
  onClose: () => void;
}) {
  const document = useStore(store, (state) => state.document);
  const ids = useStore(store, (state) => state.selection.ids);
  const values = ids.flatMap((id) => document.entities[id]?.value ?? []);
  return (
    <FormPane title={editingText.chosen(values)} onClose={onClose} keepsFocus>
      {disabled ? null : (
        <>
          {values.some((value) => value.kind === 'line') ? (
            <>
              <LineOperations store={store} ops={['join', 'reverse', 'smooth']} />
              <KindOfAll store={store} values={values} />
            </>
          ) : null}
          <SeveralMove store={store} />
          <div className="flex flex-wrap gap-2 border-t border-rule pt-3">
            <Button look="quiet" onClick={() => store.requestEdit({ type: 'duplicate' })}>
              {editingText.duplicate}
            </Button>
            <Button look="quiet" onClick={() => lockKinds(store, values)}>
              {editingText.lock}
            </Button>
            <Button look="wrong" onClick={() => store.requestEdit({ type: 'removeChosen' })}>
              {text.removeAll(values)}
            </Button>
          </div>
        </>
      )}
    </FormPane>
  );
}

/** The kind of the chosen lines, to be changed for all of them in one step. */
function KindOfAll({ store, values }: { store: DeskStore; values: readonly DocumentEntity[] }) {
  const kinds = new Set(values.flatMap((value) => (value.kind === 'line' ? [value.line] : [])));
  const [only] = kinds.size === 1 ? kinds : [];
  const names: Record<LineKind | '', string> =
    only === undefined
      ? { '': text.kindsDiffer, ...lineText.kinds }
      : ({ ...lineText.kinds } as Record<LineKind | '', string>);
  return (
    <Choice
      label={text.kind}
      value={only ?? ''}
      names={names}
      disabled={false}
      onCommit={(line) => line !== '' && store.requestEdit({ type: 'changeKind', line })}
    />
  );
}

/** What is locked can no longer be chosen, so that locking ends the choice as well. */
function lockKinds(store: DeskStore, values: readonly DocumentEntity[]): void {
  const kinds = values.map(kindOnSheet).filter((kind): kind is HideableKind => isSheetKind(kind));
  store.setLocked([...new Set([...store.getState().lockedKinds, ...kinds])]);
}
