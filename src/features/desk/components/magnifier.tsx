import { useEffect, useRef } from 'react';
import { useStore } from 'zustand';
import { deskViewText as text } from '#client/text/desk-view.ts';
import { placingText } from '#client/text/set-out.ts';
import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import type { DeskStore } from '../model/desk-state.ts';
import type { FollowedPlace } from '../model/followed-place.ts';
import type { SheetRaster } from '../model/sheet-raster.ts';
import { centredOn, type Viewport } from '../model/viewport.ts';
import { keepMagnified } from '../render/keep-magnified.ts';
import type { SheetRenderer } from '../render/sheet-renderer.ts';
import { finePlaceOf } from '../tools/fine-place.ts';
import { useFinePlacing } from './use-fine-placing.ts';

export const MAGNIFIER_SIDE_PX = 168;
const ZOOM = 8;

/** The raster about a place as it is shown, never as a section through a map of its own. */
function viewAround({ fromBase }: SheetRaster, at: SheetPx): Viewport {
  const size = { widthPx: MAGNIFIER_SIDE_PX, heightPx: MAGNIFIER_SIDE_PX };
  const seen = fromBase && { seenAs: fromBase };
  return centredOn({ zoom: ZOOM, origin: sheetPx(0, 0), ...size, ...seen }, at);
}

type MagnifierProps = {
  store: DeskStore;
  renderer: SheetRenderer;
  /** Where the pointer is placing something just now. */
  followed: FollowedPlace;
};

/**
 * The sheet at eight times its size: around the pointer while it places something, else around the chosen point or
 * vertex, which can then be placed to a tenth of a pixel by dragging in here or by arrow keys.
 */
export function Magnifier({ store, renderer, followed }: MagnifierProps) {
  const document = useStore(store, (state) => state.document);
  const selection = useStore(store, (state) => state.selection);
  const readOnly = useStore(store, (state) => state.readOnly);
  const follows = useStore(followed, ({ at }) => at !== null);
  const canvas = useRef<HTMLCanvasElement>(null);
  const chosen = readOnly ? null : (finePlaceOf(document, selection)?.at ?? null);
  const placing = useFinePlacing(store, chosen, (at) => viewAround(renderer.raster, at));
  const held = placing.centre;
  const isShown = held !== null || follows || chosen !== null;

  useEffect(() => {
    const element = canvas.current;
    if (element === null || !isShown) return;
    // Painted apart from React: a render of its own for each movement of the pointer takes longer than the painting.
    const magnified = keepMagnified({
      canvas: element,
      renderer,
      store,
      centre: () => held ?? followed.getState().at ?? chosen,
      viewAround: (at) => viewAround(renderer.raster, at),
      words: (at) => placingText.place(at[0], at[1]),
    });
    const endFollowing = followed.subscribe(magnified.moved);
    return () => {
      endFollowing();
      magnified.end();
    };
  }, [isShown, held, chosen, followed, renderer, store]);

  if (!isShown) return null;
  const canPlace = chosen !== null;
  return (
    <fieldset
      data-over-sheet
      aria-label={text.magnifier}
      title={canPlace ? text.magnifier : undefined}
      tabIndex={canPlace ? 0 : -1}
      className="relative m-0 min-w-0 touch-none border border-ink bg-film p-0"
      style={{
        width: MAGNIFIER_SIDE_PX,
        height: MAGNIFIER_SIDE_PX,
        cursor: canPlace ? 'crosshair' : undefined,
      }}
      {...placing.handlers}
    >
      <canvas ref={canvas} data-place className="block h-full w-full text-xs" />
      <span className="pointer-events-none absolute bottom-0.5 left-1 bg-film px-1 text-xs text-ink-2">
        {text.magnified}
      </span>
    </fieldset>
  );
}
