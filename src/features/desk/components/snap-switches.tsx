import { useStore } from 'zustand';
import { sheetAidsText as text } from '#client/text/tracing-aids.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { SNAP_KINDS, type SnapKind } from '../model/tool-overlay.ts';
import { AidHint, AidTitle } from './aid-words.tsx';

/** What the pointer snaps to while lines are drawn and dragged. */
export function SnapSwitches({ store }: { store: DeskStore }) {
  const on = useStore(store, (state) => state.aids.snapKinds);
  const change = (kind: SnapKind, wanted: boolean) =>
    store.setAids({ snapKinds: SNAP_KINDS.filter((each) => (each === kind ? wanted : on.includes(each))) });
  return (
    <>
      <AidTitle>{text.snapTitle}</AidTitle>
      {SNAP_KINDS.map((kind) => (
        <label key={kind} className="touch flex pointer-fine:min-h-6 items-center gap-2.5 py-0.5">
          <input
            type="checkbox"
            className="accent-equipotential"
            checked={on.includes(kind)}
            onChange={(event) => change(kind, event.target.checked)}
          />
          {text.snapKinds[kind]}
        </label>
      ))}
      <AidHint>{text.snapHint}</AidHint>
    </>
  );
}
