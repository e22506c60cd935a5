import { gridText as text } from '#client/text/set-out.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { decimalsOf, type GridLine, sectionGridOf } from '../model/section-grid.ts';
import type { Viewport } from '../model/viewport.ts';
import { drawAnew } from './drawing-surface.ts';
import { COLOURS, HALO } from './line-look.ts';
import { onceAFrame } from './once-a-frame.ts';

const FONT = '12px "Public Sans", "Liberation Sans", Arial, sans-serif';
/** As pale as it may be to be told from dark and from pale ground, with its halo of film. */
export const GRID = { colour: COLOURS.attention, alpha: 0.9, widthPx: 1 } as const;

export type GridLayer = {
  /** Shows the grid of a section in a view, or none with null; drawn with the next frame. */
  show(map: SectionMap | null, view: Viewport): void;
  destroy(): void;
};

/** Lies between the scan and the traces; a canvas that is there only while the grid is shown. */
export function createGridLayer(host: HTMLElement): GridLayer {
  let canvas: HTMLCanvasElement | null = null;
  let wanted: { map: SectionMap; view: Viewport } | null = null;
  const frame = onceAFrame(draw);

  function draw(): void {
    if (wanted === null) {
      canvas?.remove();
      canvas = null;
      return;
    }
    canvas ??= inserted(host);
    const { map, view } = wanted;
    drawAnew(canvas, { width: view.widthPx, height: view.heightPx }, (context) =>
      paintGrid(context, map, view),
    );
  }

  return {
    show(map, view) {
      if (map === null && wanted === null) return;
      wanted = map === null ? null : { map, view };
      frame.due();
    },
    destroy() {
      frame.end();
      canvas?.remove();
      canvas = null;
    },
  };
}

/** Over the tiles, which are the first layer of the host, and under everything else. */
function inserted(host: HTMLElement): HTMLCanvasElement {
  const canvas = host.ownerDocument.createElement('canvas');
  canvas.setAttribute('aria-hidden', 'true');
  canvas.dataset.layer = 'grid';
  Object.assign(canvas.style, { position: 'absolute', left: '0', top: '0', pointerEvents: 'none' });
  host.insertBefore(canvas, host.children[1] ?? null);
  return canvas;
}

function paintGrid(context: CanvasRenderingContext2D, map: SectionMap, view: Viewport): void {
  const grid = sectionGridOf(map, view);
  if (grid === null) return;
  paintLines(context, grid.lines);
  context.font = FONT;
  for (const line of grid.lines) {
    const step = line.of === 'offset' ? grid.offsetStep : grid.elevationStep;
    paintLabel(context, line, text[line.of](line.value, decimalsOf(step)));
  }
}

function paintLines(context: CanvasRenderingContext2D, lines: readonly GridLine[]): void {
  for (const { colour, alpha, widthPx } of [{ ...HALO, widthPx: 3 }, GRID]) {
    context.globalAlpha = alpha;
    context.strokeStyle = colour;
    context.lineWidth = widthPx;
    context.beginPath();
    for (const { from, to } of lines) {
      context.moveTo(...from);
      context.lineTo(...to);
    }
    context.stroke();
  }
  context.globalAlpha = 1;
}

function paintLabel(context: CanvasRenderingContext2D, { of, label }: GridLine, words: string): void {
  if (label === null) return;
  const isOffset = of === 'offset';
  context.textAlign = isOffset ? 'center' : 'left';
  context.textBaseline = isOffset ? 'bottom' : 'middle';
  const width = context.measureText(words).width + 6;
  const [x, y] = label;
  context.fillStyle = COLOURS.film;
  context.fillRect(isOffset ? x - width / 2 : x - 3, isOffset ? y - 15 : y - 8, width, 16);
  context.fillStyle = COLOURS.attention;
  context.fillText(words, x, y);
}
