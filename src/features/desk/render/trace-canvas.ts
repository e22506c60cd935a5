import type { Viewport } from '../model/viewport.ts';
import { drawAnew } from './drawing-surface.ts';
import { createFabricScene } from './fabric-scene.ts';
import { movedLayer } from './moved-layer.ts';
import type { SceneItem } from './scene.ts';
import { commonPart, holdsPart, partOfItems, type ScreenPart } from './screen-part.ts';

/** A pan slower than this in one step says nothing about where it is going. */
const HEADING_FROM_PX = 1;

/** A close canvas is at most so many times as large as it has to be. */
const MOST_SPARE = 2;

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

/**
 * How much of the screen a canvas covers. `ahead`: so many pixels beyond the view's edges, so that a pan only moves it
 * until what lies there is used up. `close`: no more than what is drawn needs.
 */
export type Cover = { readonly kind: 'ahead'; readonly marginPx: number } | { readonly kind: 'close' };

/** Of the margin what is filled when the zoom has changed: of a net seen as a whole all of it is more than one short task. */
const FILLED_ON_ZOOM = 0.6;

/** `part`: what the canvas takes; `filled`: the part of it in which everything is drawn. */
type Drawn = { readonly view: Viewport; readonly part: ScreenPart; readonly filled: ScreenPart };

/**
 * A canvas of traces over the tiles. With software rendering drawing a canvas and handing it over takes the main
 * thread several milliseconds, more the larger it is. So one that is drawn seldom is drawn ahead, with the margin in
 * the direction of the pan, and one that is drawn in every frame of a drag is no larger than what is in it.
 */
export function createTraceCanvas(host: HTMLElement, cover: Cover): TraceCanvas {
  const element = host.ownerDocument.createElement('canvas');
  element.setAttribute('aria-hidden', 'true');
  Object.assign(element.style, { position: 'absolute', left: '0', top: '0', willChange: 'transform' });
  element.style.transformOrigin = '0 0';
  element.style.pointerEvents = 'none';
  host.append(element);
  const moveTo = movedLayer(element);
  const scene = createFabricScene();
  const marginPx = cover.kind === 'ahead' ? cover.marginPx : 0;
  let items: readonly SceneItem[] = [];
  let view: Viewport | null = null;
  let drawn: Drawn | null = null;
  let heading: readonly [number, number] = [0, 0];

  /** Where a part of the screen as it was drawn lies now. */
  function placeOf(part: ScreenPart, from: Viewport, now: Viewport): ScreenPart {
    const scale = now.zoom / from.zoom;
    return {
      x: (from.origin[0] - now.origin[0]) * now.zoom + part.x * scale,
      y: (from.origin[1] - now.origin[1]) * now.zoom + part.y * scale,
      width: part.width * scale,
      height: part.height * scale,
    };
  }

  /** What has to be drawn at least for a view; null when nothing of the items is in it. */
  function neededFor(now: Viewport): ScreenPart | null {
    const whole = { x: 0, y: 0, width: now.widthPx, height: now.heightPx };
    return cover.kind === 'close' ? commonPart(partOfItems(items, now), whole) : whole;
  }

  function isCovered(from: Drawn, now: Viewport): boolean {
    const { zoom, widthPx, heightPx } = from.view;
    if (zoom !== now.zoom || widthPx !== now.widthPx || heightPx !== now.heightPx) return false;
    const needed = neededFor(now);
    return needed === null || holdsPart(placeOf(from.filled, from.view, now), needed);
  }

  function move(from: Drawn, now: Viewport): void {
    const { x, y } = placeOf(from.part, from.view, now);
    const scale = now.zoom / from.view.zoom;
    moveTo(`translate(${x}px, ${y}px) scale(${scale})`);
  }

  function partToDraw(now: Viewport): ScreenPart | null {
    if (cover.kind === 'close') return closePart(now);
    const [x, y] = heading.map((panned) => -marginPx - ahead(panned)) as [number, number];
    heading = [0, 0];
    return { x, y, width: now.widthPx + 2 * marginPx, height: now.heightPx + 2 * marginPx };
  }

  function partToFill(part: ScreenPart, now: Viewport): ScreenPart {
    if (cover.kind === 'close' || drawn === null || drawn.view.zoom === now.zoom) return part;
    const spare = marginPx * (1 - FILLED_ON_ZOOM);
    return {
      x: part.x + spare,
      y: part.y + spare,
      width: part.width - 2 * spare,
      height: part.height - 2 * spare,
    };
  }

  /** The part as it was while it suffices: one of another size makes the browser lay all its layers out anew. */
  function closePart(now: Viewport): ScreenPart | null {
    const needed = neededFor(now);
    if (needed === null || drawn === null) return needed;
    return holdsPart(drawn.part, needed) && areaOf(drawn.part) <= MOST_SPARE * areaOf(needed)
      ? drawn.part
      : needed;
  }

  function ahead(panned: number): number {
    return Math.abs(panned) < HEADING_FROM_PX ? 0 : Math.sign(panned) * marginPx;
  }

  return {
    show(next, zooming = false) {
      heading = view === null || view.zoom !== next.zoom ? [0, 0] : panOf(view, next);
      view = next;
      if (scene.isEmpty()) return drawn !== null;
      if (drawn === null || !(zooming || isCovered(drawn, next))) return true;
      move(drawn, next);
      return false;
    },
    showItems(next) {
      items = next;
      return scene.show(next);
    },
    draw() {
      if (view === null) return;
      const part = scene.isEmpty() ? null : partToDraw(view);
      element.style.display = part === null ? 'none' : '';
      if (part === null) {
        drawn = null;
        return;
      }
      const now = { view, part, filled: partToFill(part, view) };
      drawAnew(element, part, (context) => {
        context.translate(now.filled.x - part.x, now.filled.y - part.y);
        scene.paint(context, now.view, now.filled);
      });
      drawn = now;
      move(drawn, view);
    },
    isOffCentre() {
      if (drawn === null || view === null) return false;
      if (drawn.view.zoom !== view.zoom) return true;
      if (cover.kind === 'close') return false;
      const { x, y } = placeOf(drawn.part, drawn.view, view);
      return [x, y].some((edge) => Math.abs(edge + marginPx) > marginPx / 2);
    },
    destroy() {
      scene.end();
      element.remove();
    },
  };
}

const areaOf = ({ width, height }: ScreenPart) => width * height;

/** How far the sheet has moved on screen from one view to the next. */
function panOf(from: Viewport, to: Viewport): readonly [number, number] {
  return [(from.origin[0] - to.origin[0]) * to.zoom, (from.origin[1] - to.origin[1]) * to.zoom];
}
