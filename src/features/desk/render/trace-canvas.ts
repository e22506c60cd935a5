import { StaticCanvas } from 'fabric';
import type { Viewport } from '../model/viewport.ts';
import { createFabricScene } from './fabric-sink.ts';
import type { SceneItem } from './scene.ts';

/** A pan slower than this in one step says nothing about where it is going. */
const HEADING_FROM_PX = 1;

export type TraceCanvas = {
  /** Takes a view on; true when it has to be drawn for it and not only moved. `zooming`: it is only scaled. */
  show(view: Viewport, zooming?: boolean): boolean;
  /** Takes a scene on; true when it differs from the one before. */
  showItems(items: readonly SceneItem[]): boolean;
  draw(): void;
  /** True when it is scaled, or a further pan would soon have to draw: to be drawn again once the view rests. */
  isOffCentre(): boolean;
  destroy(): void;
};

type Drawn = { readonly view: Viewport; readonly aheadX: number; readonly aheadY: number };

/**
 * A canvas of fabric's over the tiles. With software rendering drawing a canvas and handing it over takes the main
 * thread several milliseconds, so it is drawn `marginPx` beyond the view's edges, a pan only moves it, and when it
 * must be drawn again the margin lies in the direction of the pan.
 */
export function createTraceCanvas(host: HTMLElement, marginPx: number): TraceCanvas {
  const element = host.ownerDocument.createElement('canvas');
  element.setAttribute('aria-hidden', 'true');
  Object.assign(element.style, { position: 'absolute', left: '0', top: '0', willChange: 'transform' });
  element.style.transformOrigin = '0 0';
  element.style.pointerEvents = 'none';
  host.append(element);
  const fabric = new StaticCanvas(element, { renderOnAddRemove: false, enableRetinaScaling: true });
  const showItems = createFabricScene(fabric);
  let view: Viewport | null = null;
  let drawn: Drawn | null = null;
  let heading: readonly [number, number] = [0, 0];

  /** Where what is drawn lies now, from the view's corner. */
  function shift(from: Drawn, now: Viewport): readonly [number, number] {
    const scale = now.zoom / from.view.zoom;
    return [
      (from.view.origin[0] - now.origin[0]) * now.zoom - (marginPx + from.aheadX) * scale,
      (from.view.origin[1] - now.origin[1]) * now.zoom - (marginPx + from.aheadY) * scale,
    ];
  }

  function covers(from: Drawn, now: Viewport): boolean {
    const { zoom, widthPx, heightPx } = from.view;
    if (zoom !== now.zoom || widthPx !== now.widthPx || heightPx !== now.heightPx) return false;
    return shift(from, now).every((edge) => edge <= 0 && edge >= -2 * marginPx);
  }

  function move(from: Drawn, now: Viewport): void {
    const [x, y] = shift(from, now);
    const scale = now.zoom / from.view.zoom;
    element.style.transform = `translate(${x}px, ${y}px)${scale === 1 ? '' : ` scale(${scale})`}`;
  }

  function ahead(panned: number): number {
    return Math.abs(panned) < HEADING_FROM_PX ? 0 : Math.sign(panned) * marginPx;
  }

  return {
    show(next, zooming = false) {
      heading = view === null || view.zoom !== next.zoom ? [0, 0] : panOf(view, next);
      view = next;
      if (fabric.isEmpty()) return drawn !== null;
      if (drawn === null || !(zooming || covers(drawn, next))) return true;
      move(drawn, next);
      return false;
    },
    showItems,
    draw() {
      if (view === null) return;
      element.style.display = fabric.isEmpty() ? 'none' : '';
      if (fabric.isEmpty()) {
        drawn = null;
        return;
      }
      const width = view.widthPx + 2 * marginPx;
      const height = view.heightPx + 2 * marginPx;
      if (fabric.width !== width || fabric.height !== height) fabric.setDimensions({ width, height });
      drawn = { view, aheadX: ahead(heading[0]), aheadY: ahead(heading[1]) };
      heading = [0, 0];
      const { zoom, origin } = view;
      const x = -origin[0] * zoom + marginPx + drawn.aheadX;
      const y = -origin[1] * zoom + marginPx + drawn.aheadY;
      fabric.setViewportTransform([zoom, 0, 0, zoom, x, y]);
      fabric.renderAll();
      move(drawn, view);
    },
    isOffCentre() {
      if (drawn === null || view === null) return false;
      if (drawn.view.zoom !== view.zoom) return true;
      return shift(drawn, view).some((edge) => Math.abs(edge + marginPx) > marginPx / 2);
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
