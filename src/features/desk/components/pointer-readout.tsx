import { useEffect, useRef } from 'react';
import { type PointerWords, deskViewText as text } from '#client/text/desk-view.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { readSetOut, type SetOut } from '#shared/compute/set-out.ts';
import { type FlowNetDocument, type SheetPoint, singleOf } from '#shared/contract/document.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { onceAFrame } from '../render/once-a-frame.ts';
import { wordCanvas } from '../render/word-canvas.ts';
import { blockHeightPx, fontOf, type WordsLook } from '../render/words-block.ts';

/** A pixel of the scan coarser than this is not shown to hundredths. */
const COARSE_UNITS_PER_PX = 0.03;

const MOST_ROWS = 2;

/** Offset and elevation under the pointer; before the section is set out the pixel. Nothing while it is elsewhere. */
export function PointerReadout({ store }: { store: DeskStore }) {
  const room = useRef<HTMLDivElement>(null);
  const output = useRef<HTMLOutputElement>(null);
  const canvas = useRef<HTMLCanvasElement>(null);
  useEffect(() => {
    if (room.current === null || output.current === null || canvas.current === null) return;
    return keepWritten(store, { room: room.current, output: output.current, canvas: canvas.current });
  }, [store]);
  return (
    // Its room is kept while it is not there, so that the buttons stay where they are.
    <div
      ref={room}
      className="pointer-events-none! order-last min-w-32 flex-1 basis-full contain-layout contain-size @2xl:order-none @2xl:basis-0"
    >
      {/* Spoken at every movement of the pointer it would drown everything else. */}
      <output ref={output} hidden aria-live="off" className="block">
        <canvas ref={canvas} className="block" />
      </output>
    </div>
  );
}

type Written = {
  readonly room: HTMLElement;
  readonly output: HTMLElement;
  readonly canvas: HTMLCanvasElement;
};

/** Keeps the place of the pointer written in a canvas until it is ended. */
function keepWritten(store: DeskStore, { room, output, canvas }: Written): () => void {
  const words = wordCanvas(canvas);
  const dress = () => {
    const look = lookIn(room);
    words.dress(look, room.clientWidth, blockHeightPx(MOST_ROWS, look));
  };
  const frame = onceAFrame(() => {
    const { pointerAt, document } = store.getState();
    // Whoever has made letters larger meanwhile finds them so.
    if (output.hidden && pointerAt !== null) dress();
    output.hidden = pointerAt === null;
    if (pointerAt !== null) words.show(placeRows(pointerAt, document));
  }, 'told');
  const sizes = new ResizeObserver(dress);
  sizes.observe(room);
  const endStore = store.subscribe(({ pointerAt, document }, before) => {
    if (pointerAt !== before.pointerAt || document !== before.document) frame.due();
  });
  frame.due();
  return () => {
    sizes.disconnect();
    endStore();
    frame.end();
  };
}

function lookIn(room: HTMLElement): WordsLook {
  const { font, sizePx } = fontOf(room);
  const linePx = Math.round(1.5 * sizePx);
  return { font, linePx, paddingPx: [10, 5], groundAlpha: 1, edged: true, gap: '\u2003' };
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
