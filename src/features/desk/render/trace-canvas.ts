import { StaticCanvas } from 'fabric';
import type { Viewport } from '../model/viewport.ts';
import { createFabricScenes } from './fabric-sink.ts';
import type { SceneItem } from './scene.ts';

/** Drawn beyond the view's edges, so that a pan moves what is drawn and draws again only now and then. */
const MARGIN_PX = 192;
/** A pan slower than this in one step says nothing about where it is going. */
const HEADING_FROM_PX = 1;

export type TraceCanvas = {
  /** True when the view can be shown by moving what is drawn; otherwise it has to be drawn again. */
  show(view: Viewport): boolean;
  showBase(items: readonly SceneItem[]): void;
  showOverlay(items: readonly SceneItem[]): void;
  draw(): void;
  destroy(): void;
};

type Drawn = { readonly view: Viewport; readonly aheadX: number; readonly aheadY: number };

/**
 * Fabric's canvas over the tiles. With software rendering drawing and handing over a canvas takes the main thread
 * several milliseconds, so a pan only moves it, and when it must be drawn again the margin lies in the direction of
 * the pan.
 */
export function createTraceCanvas(host: HTMLElement): TraceCanvas {
  const element = host.ownerDocument.createElement('canvas');
  element.setAttribute('aria-hidden', 'true');
  Object.assign(element.style, { position: 'absolute', left: '0', top: '0', willChange: 'transform' });
  element.style.pointerEvents = 'none';
  host.append(element);
  const fabric = new StaticCanvas(element, { renderOnAddRemove: false, enableRetinaScaling: true });
  const scenes = createFabricScenes(fabric);
  let view: Viewport | null = null;
  let drawn: Drawn | null = null;
  let heading: readonly [number, number] = [0, 0];

  /** Where what is drawn lies now, from the view's corner. */
  function shift(from: Drawn, now: Viewport): readonly [number, number] {
    return [
      (from.view.origin[0] - now.origin[0]) * now.zoom - MARGIN_PX - from.aheadX,
      (from.view.origin[1] - now.origin[1]) * now.zoom - MARGIN_PX - from.aheadY,
    ];
  }

  function covers(from: Drawn, now: Viewport): boolean {
    const { zoom, widthPx, heightPx } = from.view;
    if (zoom !== now.zoom || widthPx !== now.widthPx || heightPx !== now.heightPx) return false;
    return shift(from, now).every((edge) => edge <= 0 && edge >= -2 * MARGIN_PX);
  }

  function moveTo([x, y]: readonly [number, number]): void {
    element.style.transform = `translate(${x}px, ${y}px)`;
  }

  return {
    show(next) {
      heading = view === null || view.zoom !== next.zoom ? [0, 0] : panOf(view, next);
      view = next;
      if (drawn === null || !covers(drawn, next)) return false;
      moveTo(shift(drawn, next));
      return true;
    },
    showBase: scenes.showBase,
    showOverlay: scenes.showOverlay,
    draw() {
      if (view === null) return;
      const width = view.widthPx + 2 * MARGIN_PX;
      const height = view.heightPx + 2 * MARGIN_PX;
      if (fabric.width !== width || fabric.height !== height) fabric.setDimensions({ width, height });
      drawn = { view, aheadX: ahead(heading[0]), aheadY: ahead(heading[1]) };
      heading = [0, 0];
      const { zoom, origin } = view;
      const x = -origin[0] * zoom + MARGIN_PX + drawn.aheadX;
      const y = -origin[1] * zoom + MARGIN_PX + drawn.aheadY;
      fabric.setViewportTransform([zoom, 0, 0, zoom, x, y]);
      fabric.renderAll();
      moveTo(shift(drawn, view));
    },
    destroy() {
      void fabric.dispose().then(() => element.remove());
    },
  };
}

/** How far the sheet has moved on screen from one view to the next. */
function panOf(from: Viewport, to: Viewport): readonly [number, number] {
  return [(from.origin[0] - to.origin[0]) * to.zoom, (from.origin[1] - to.origin[1]) * to.zoom];
}

function ahead(panned: number): number {
  return Math.abs(panned) < HEADING_FROM_PX ? 0 : Math.sign(panned) * MARGIN_PX;
}
