import { sheetPx } from '#shared/compute/frames.ts';
import { piecesIn } from '#shared/compute/geometry/clip-line.ts';
import type { DocumentEntity, FlowNetDocument } from '#shared/contract/document.ts';
import { type SheetFrame, seenFrame, toScreen, type Viewport } from '../model/viewport.ts';
import { frameOfLine } from './line-frame.ts';
import { COLOURS, lookOf } from './line-look.ts';
import { framesMeet } from './seen-by.ts';
import type { SheetRenderer } from './sheet-renderer.ts';

const CROSS_GAP_PX = 4;

/** Paints a magnified part of the sheet with the traced lines and points, and a cross in its middle. */
export function paintMagnified(
  canvas: HTMLCanvasElement,
  renderer: SheetRenderer,
  view: Viewport,
  shown: { document: FlowNetDocument; preview: Readonly<Record<string, DocumentEntity>> },
): void {
  const ratio = globalThis.devicePixelRatio || 1;
  const width = Math.round(view.widthPx * ratio);
  const height = Math.round(view.heightPx * ratio);
  // Told a size, even the one it has, a canvas begins anew and the page is laid out.
  if (canvas.width !== width || canvas.height !== height) Object.assign(canvas, { width, height });
  const context = canvas.getContext('2d', { alpha: false });
  if (context === null) return;
  renderer.paintInto(context, view);
  context.setTransform(ratio, 0, 0, ratio, 0, 0);
  const seen = seenFrame(view);
  for (const { id, value } of Object.values(shown.document.entities)) {
    paintEntity(context, view, seen, shown.preview[id] ?? value);
  }
  paintCross(context, view);
}

function paintEntity(
  context: CanvasRenderingContext2D,
  view: Viewport,
  seen: SheetFrame,
  value: DocumentEntity,
): void {
  context.lineWidth = 1;
  if (value.kind === 'line') {
    if (!framesMeet(frameOfLine(value.points), seen)) return;
    context.strokeStyle = lookOf(value.line).colour;
    for (const { points } of piecesIn(value.points, seen)) {
      context.beginPath();
      for (const point of points) {
        const [x, y] = toScreen(view, sheetPx(...point));
        context.lineTo(x, y);
      }
      context.stroke();
    }
  } else if (value.kind === 'knownPoint') {
    context.strokeStyle = COLOURS.ink;
    const [x, y] = toScreen(view, sheetPx(...value.at));
    context.beginPath();
    context.arc(x, y, 5, 0, 2 * Math.PI);
    context.stroke();
  }
}

/** A cross that leaves the very place free. */
function paintCross(context: CanvasRenderingContext2D, view: Viewport): void {
  const x = view.widthPx / 2;
  const y = view.heightPx / 2;
  for (const [colour, width] of [
    [COLOURS.film, 3],
    [COLOURS.ink, 1],
  ] as const) {
    context.strokeStyle = colour;
    context.lineWidth = width;
    context.beginPath();
    context.moveTo(0, y);
    context.lineTo(x - CROSS_GAP_PX, y);
    context.moveTo(x + CROSS_GAP_PX, y);
    context.lineTo(view.widthPx, y);
    context.moveTo(x, 0);
    context.lineTo(x, y - CROSS_GAP_PX);
    context.moveTo(x, y + CROSS_GAP_PX);
    context.lineTo(x, view.heightPx);
    context.stroke();
  }
}
