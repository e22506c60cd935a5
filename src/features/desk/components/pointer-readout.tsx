import { useEffect, useRef } from 'react';
import { type PointerWords, deskViewText as text } from '#client/text/desk-view.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { readSetOut, type SetOut } from '#shared/compute/set-out.ts';
import { type FlowNetDocument, type SheetPoint, singleOf } from '#shared/contract/document.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { onceAFrame } from '../render/once-a-frame.ts';
import { type RowOf, writeRows } from './written-rows.ts';

/** A pixel of the scan coarser than this is not shown to hundredths. */
const COARSE_UNITS_PER_PX = 0.03;

const ROW: RowOf = { tag: 'span', className: 'whitespace-nowrap' };

/** Offset and elevation under the pointer; before the section is set out the pixel. Nothing while it is elsewhere. */
export function PointerReadout({ store }: { store: DeskStore }) {
  const output = useRef<HTMLOutputElement>(null);
  useEffect(() => (output.current === null ? undefined : keepWritten(store, output.current)), [store]);
  return (
    // Spoken at every movement of the pointer it would drown everything else.
    <output
      ref={output}
      hidden
      aria-live="off"
      className="pointer-events-none flex flex-wrap gap-x-4 rounded-sheet border border-rule bg-film px-2.5 py-1"
    />
  );
}

/** Keeps the place of the pointer written in an element until it is ended. */
function keepWritten(store: DeskStore, element: HTMLElement): () => void {
  const frame = onceAFrame(() => {
    const { pointerAt, document } = store.getState();
    element.hidden = pointerAt === null;
    if (pointerAt !== null) writeRows(element, ROW, placeRows(pointerAt, document));
  });
  const endStore = store.subscribe(({ pointerAt, document }, before) => {
    if (pointerAt !== before.pointerAt || document !== before.document) frame.due();
  });
  frame.due();
  return () => {
    endStore();
    frame.end();
  };
}

function placeRows(at: SheetPoint, document: FlowNetDocument): string[] {
  const words = wordsAt(at, document, setOutOf(document));
  return words === null ? [text.pixels(at[0], at[1])] : [text.offset(words), text.elevation(words)];
}

const setOuts = new WeakMap<FlowNetDocument, SetOut>();

/** How a document's section is set out, worked out once for each document. */
export function setOutOf(document: FlowNetDocument): SetOut {
  const known = setOuts.get(document) ?? readSetOut(document);
  setOuts.set(document, known);
  return known;
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
