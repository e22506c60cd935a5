import { useMemo } from 'react';
import { useStore } from 'zustand';
import { type PointerWords, deskViewText as text } from '#client/text/desk-view.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { readSetOut, type SetOut } from '#shared/compute/set-out.ts';
import { type FlowNetDocument, type SheetPoint, singleOf } from '#shared/contract/document.ts';
import type { DeskStore } from '../model/desk-state.ts';

/** A pixel of the scan coarser than this is not shown to hundredths. */
const COARSE_UNITS_PER_PX = 0.03;

/** Offset and elevation under the pointer; before the section is set out the pixel. Nothing while it is elsewhere. */
export function PointerReadout({ store }: { store: DeskStore }) {
  const document = useStore(store, (state) => state.document);
  const at = useStore(store, (state) => state.pointerAt);
  const setOut = useMemo(() => readSetOut(document), [document]);
  if (at === null) return null;
  const words = wordsAt(at, document, setOut);
  return (
    // Spoken at every movement of the pointer it would drown everything else.
    <output
      aria-live="off"
      className="pointer-events-none flex flex-wrap gap-x-4 rounded-sheet border border-rule bg-film px-2.5 py-1"
    >
      {words === null ? (
        <span>{text.pixels(at[0], at[1])}</span>
      ) : (
        <>
          <span className="whitespace-nowrap">{text.offset(words)}</span>
          <span className="whitespace-nowrap">{text.elevation(words)}</span>
        </>
      )}
    </output>
  );
}

/** Where a place of the sheet lies in the section; null before the section is set out. */
export function wordsAt(
  at: SheetPoint,
  document: FlowNetDocument,
  { map, reading }: SetOut,
): PointerWords | null {
  if (map === null) return null;
  const [offset, elevation] = map.toSection(sheetPx(...at));
  const upstream = singleOf(document, 'setOut')?.value.upstream ?? null;
  return {
    offset,
    elevation,
    side: sideOf(offset, upstream, reading.offsetsGrowLeft ?? false),
    decimals: map.unitsPerPx > COARSE_UNITS_PER_PX ? 1 : 2,
    unitSystem: document.unitSystem,
    datum: document.datum,
  };
}

/** On which side of offset 0 a place lies; null until it is said which side of the sheet is upstream. */
export function sideOf(
  offset: number,
  upstream: 'left' | 'right' | null,
  offsetsGrowLeft: boolean,
): 'upstream' | 'downstream' | null {
  if (upstream === null) return null;
  const liesLeft = offset > 0 === offsetsGrowLeft;
  return liesLeft === (upstream === 'left') ? 'upstream' : 'downstream';
}
