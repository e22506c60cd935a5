import { useMemo } from 'react';
import { useStore } from 'zustand';
import { entityTableText } from '#client/text/entity-table.ts';
import { sheetAidsText as text } from '#client/text/tracing-aids.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { DeskStore, HideableKind } from '../model/desk-state.ts';
import { kindOnSheet, SHEET_KINDS } from '../model/sheet-kinds.ts';
import { AidHint, AidTitle } from './aid-words.tsx';

const FIGURE = 'py-0.5 text-right';

/** What is on the sheet by kind: how many there are, whether they are shown, and whether they are locked. */
export function LinesList({ store, noteCount }: { store: DeskStore; noteCount: number }) {
  const document = useStore(store, (state) => state.document);
  const hidden = useStore(store, (state) => state.hiddenKinds);
  const locked = useStore(store, (state) => state.lockedKinds);
  const readOnly = useStore(store, (state) => state.readOnly);
  const counts = useMemo(() => countsOf(document), [document]);
  const count = (kind: HideableKind) => (kind === 'note' ? noteCount : (counts.get(kind) ?? 0));
  const listed = SHEET_KINDS.filter(
    (kind) => count(kind) > 0 || hidden.includes(kind) || locked.includes(kind),
  );
  if (listed.length === 0) return <p className="m-0">{text.nothingYet}</p>;
  return (
    <>
      <AidTitle>{text.linesTitle}</AidTitle>
      <table className="w-full border-collapse">
        <thead>
          <tr className="border-b border-rule text-sm text-ink-2">
            <th className="py-0.5 text-left font-semibold">{text.kindHead}</th>
            <th className={`${FIGURE} font-semibold`}>{text.countHead}</th>
            <th className="px-2 py-0.5 font-semibold">{text.shownHead}</th>
            {readOnly ? null : <th className="py-0.5 font-semibold">{text.lockedHead}</th>}
          </tr>
        </thead>
        <tbody>
          {listed.map((kind) => (
            <tr key={kind} className="border-b border-rule-2">
              <th scope="row" className="py-0.5 text-left font-normal">
                {text.kinds[kind]}
              </th>
              <td className={FIGURE}>{count(kind)}</td>
              <Tick
                label={text.show(kind)}
                checked={!hidden.includes(kind)}
                onChange={(shown) => store.setHidden(listWith(hidden, kind, !shown))}
              />
              {readOnly ? null : (
                <Tick
                  label={text.lock(kind)}
                  // Notes are answered, not changed: there is nothing to lock.
                  checked={kind === 'note' ? null : locked.includes(kind)}
                  onChange={(lock) => store.setLocked(listWith(locked, kind, lock))}
                />
              )}
            </tr>
          ))}
        </tbody>
      </table>
      <div className="mt-1.5 flex gap-4">
        <TextButton label={text.showAll} idle={hidden.length === 0} onClick={() => store.setHidden([])} />
        {readOnly ? null : (
          <TextButton label={text.unlockAll} idle={locked.length === 0} onClick={() => store.setLocked([])} />
        )}
      </div>
      {readOnly ? null : <AidHint>{text.linesHint}</AidHint>}
      <button
        type="button"
        aria-haspopup="dialog"
        aria-keyshortcuts="Shift+H"
        className="touch mt-1.5 underline"
        onClick={() => store.emitIntent({ type: 'openTable' })}
      >
        {entityTableText.open}
      </button>
    </>
  );
}

type TickProps = { label: string; checked: boolean | null; onChange(checked: boolean): void };

function Tick({ label, checked, onChange }: TickProps) {
  return (
    <td className="p-0 text-center">
      {checked === null ? null : (
        <label className="touch inline-flex items-center justify-center px-2 py-0.5">
          <span className="sr-only">{label}</span>
          <input
            type="checkbox"
            className="accent-equipotential"
            checked={checked}
            onChange={(event) => onChange(event.target.checked)}
          />
        </label>
      )}
    </td>
  );
}

function TextButton({ label, idle, onClick }: { label: string; idle: boolean; onClick(): void }) {
  return (
    <button type="button" className="touch underline disabled:opacity-55" disabled={idle} onClick={onClick}>
      {label}
    </button>
  );
}

function countsOf(document: FlowNetDocument): ReadonlyMap<string, number> {
  const counts = new Map<string, number>();
  for (const { value } of Object.values(document.entities)) {
    const kind = kindOnSheet(value);
    counts.set(kind, (counts.get(kind) ?? 0) + 1);
  }
  return counts;
}

function listWith(kinds: readonly HideableKind[], kind: HideableKind, holds: boolean): HideableKind[] {
  const others = kinds.filter((each) => each !== kind);
  return holds ? [...others, kind] : others;
}
