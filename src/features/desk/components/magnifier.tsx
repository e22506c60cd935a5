import { type KeyboardEvent, type PointerEvent, useEffect, useRef, useState } from 'react';
import { useStore } from 'zustand';
import { deskViewText as text } from '#client/text/desk-view.ts';
import { type SheetPx, screenPx, sheetPx } from '#shared/compute/frames.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { centredOn, toSheet, type Viewport } from '../model/viewport.ts';
import { paintMagnified } from '../render/magnified.ts';
import type { SheetRenderer } from '../render/sheet-renderer.ts';
import { finelyPlaced, finePlaceOf } from '../tools/fine-place.ts';

const SIDE_PX = 168;
const ZOOM = 8;
const STEPS: Readonly<Record<string, readonly [number, number]>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, -1],
  ArrowDown: [0, 1],
};
const FINE_STEP_PX = 0.1;

function viewAround(at: SheetPx): Viewport {
  return centredOn({ zoom: ZOOM, origin: sheetPx(0, 0), widthPx: SIDE_PX, heightPx: SIDE_PX }, at);
}

type Held = { readonly centre: SheetPx; readonly pressed: SheetPx; readonly from: SheetPx };

type MagnifierProps = {
  store: DeskStore;
  renderer: SheetRenderer;
  /** Where the pointer is placing something just now; null when it is not. */
  follow: SheetPx | null;
};

/**
 * The sheet at eight times its size: around the pointer while it places something, else around the chosen point or
 * vertex, which can then be placed to a tenth of a pixel by dragging in here or by arrow keys.
 */
export function Magnifier({ store, renderer, follow }: MagnifierProps) {
  const document = useStore(store, (state) => state.document);
  const preview = useStore(store, (state) => state.preview);
  const selection = useStore(store, (state) => state.selection);
  const readOnly = useStore(store, (state) => state.readOnly);
  const canvas = useRef<HTMLCanvasElement>(null);
  const [held, setHeld] = useState<Held | null>(null);
  const chosen = readOnly ? null : finePlaceOf(document, selection);
  const centre = held?.centre ?? follow ?? chosen?.at ?? null;

  useEffect(() => {
    const element = canvas.current;
    if (element === null || centre === null) return;
    const view = viewAround(centre);
    const paint = () => paintMagnified(element, renderer, view, { document, preview });
    const extra = renderer.addView('magnifier', paint);
    extra.want(view);
    paint();
    return extra.end;
  }, [centre, document, preview, renderer]);

  if (centre === null) return null;

  function placeTo(at: SheetPx, ended: boolean): void {
    const placed = finelyPlaced(document, selection, at);
    if (placed === null) return;
    store.setPreview(ended ? {} : { [placed.op.entityId]: placed.op.value });
    if (ended) store.run(placed.label, [placed.op]);
  }

  function placeUnder(event: PointerEvent<HTMLElement>): SheetPx {
    const box = event.currentTarget.getBoundingClientRect();
    return toSheet(viewAround(centre!), screenPx(event.clientX - box.left, event.clientY - box.top));
  }

  function dragged(event: PointerEvent<HTMLElement>): SheetPx | null {
    if (held === null) return null;
    const now = placeUnder(event);
    return sheetPx(held.from[0] + now[0] - held.pressed[0], held.from[1] + now[1] - held.pressed[1]);
  }

  function press(event: PointerEvent<HTMLElement>): void {
    if (chosen === null) return;
    event.currentTarget.setPointerCapture(event.pointerId);
    setHeld({ centre: chosen.at, pressed: placeUnder(event), from: chosen.at });
  }

  function move(event: PointerEvent<HTMLElement>): void {
    const at = dragged(event);
    if (at !== null) placeTo(at, false);
  }

  function release(event: PointerEvent<HTMLElement>): void {
    const at = dragged(event);
    setHeld(null);
    if (at !== null) placeTo(at, true);
  }

  function step(event: KeyboardEvent): void {
    const direction = STEPS[event.key];
    if (direction === undefined || chosen === null) return;
    event.preventDefault();
    event.stopPropagation();
    const by = event.shiftKey ? 1 : FINE_STEP_PX;
    placeTo(sheetPx(chosen.at[0] + direction[0] * by, chosen.at[1] + direction[1] * by), true);
  }

  return (
    <fieldset
      data-over-sheet
      aria-label={text.magnifier}
      title={chosen === null ? undefined : text.magnifier}
      tabIndex={chosen === null ? -1 : 0}
      className="relative m-0 min-w-0 touch-none border border-ink bg-film p-0"
      style={{ width: SIDE_PX, height: SIDE_PX, cursor: chosen === null ? undefined : 'crosshair' }}
      onPointerDown={press}
      onPointerMove={move}
      onPointerUp={release}
      onPointerCancel={() => setHeld(null)}
      onKeyDown={step}
    >
      <canvas ref={canvas} className="block h-full w-full" />
      <span className="pointer-events-none absolute bottom-0.5 left-1 bg-film px-1 text-xs text-ink-2">
        {text.magnified}
      </span>
    </fieldset>
  );
}
