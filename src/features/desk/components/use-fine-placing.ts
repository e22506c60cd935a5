import { type KeyboardEvent, type PointerEvent, useState } from 'react';
import { type SheetPx, screenPx, sheetPx } from '#shared/compute/frames.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { steppedOnScreen, toSheet, type Viewport } from '../model/viewport.ts';
import { finelyPlaced } from '../tools/fine-place.ts';

const STEPS: Readonly<Record<string, readonly [number, number]>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, -1],
  ArrowDown: [0, 1],
};
const FINE_STEP_PX = 0.1;

/** What is held in the magnified view: the view stays where it was pressed while the thing moves in it. */
type Held = { readonly centre: SheetPx; readonly pressed: SheetPx };

/**
 * Places the chosen point or vertex, which stands at `from`, by dragging in a magnified view or by arrow keys. Gives
 * the centre the view keeps while something is held in it, and the handlers of the view's element.
 */
export function useFinePlacing(
  store: DeskStore,
  from: SheetPx | null,
  viewAround: (at: SheetPx) => Viewport,
) {
  const [held, setHeld] = useState<Held | null>(null);

  function placeTo(at: SheetPx, ended: boolean): void {
    const { document, selection } = store.getState();
    const placed = finelyPlaced(document, selection, at);
    if (placed === null) return;
    store.setPreview(ended ? {} : { [placed.op.entityId]: placed.op.value });
    if (ended) store.run(placed.label, [placed.op]);
  }

  function placeUnder(event: PointerEvent<HTMLElement>, centre: SheetPx): SheetPx {
    const box = event.currentTarget.getBoundingClientRect();
    return toSheet(viewAround(centre), screenPx(event.clientX - box.left, event.clientY - box.top));
  }

  function drag(event: PointerEvent<HTMLElement>, ended: boolean): void {
    if (held === null) return;
    const now = placeUnder(event, held.centre);
    const [dx, dy] = [now[0] - held.pressed[0], now[1] - held.pressed[1]];
    placeTo(sheetPx(held.centre[0] + dx, held.centre[1] + dy), ended);
  }

  return {
    centre: held?.centre ?? null,
    handlers: {
      onPointerDown(event: PointerEvent<HTMLElement>) {
        if (from === null) return;
        event.currentTarget.setPointerCapture(event.pointerId);
        setHeld({ centre: from, pressed: placeUnder(event, from) });
      },
      onPointerMove: (event: PointerEvent<HTMLElement>) => drag(event, false),
      onPointerUp(event: PointerEvent<HTMLElement>) {
        drag(event, true);
        setHeld(null);
      },
      onPointerCancel() {
        store.setPreview({});
        setHeld(null);
      },
      onKeyDown(event: KeyboardEvent) {
        const direction = STEPS[event.key];
        if (direction === undefined || from === null) return;
        event.preventDefault();
        event.stopPropagation();
        const by = event.shiftKey ? 1 : FINE_STEP_PX;
        placeTo(steppedOnScreen(viewAround(from), from, direction[0] * by, direction[1] * by), true);
      },
    },
  };
}
