import type { SheetPoint } from '#shared/contract/document.ts';
import { COLOURS, type EndMark, HALO } from './line-look.ts';

const BAR = { halfLengthPx: 4, widthPx: 2 } as const;
const RADIUS_PX = 3;
const HALF_SIDE_PX = 3.2;
const EDGE_PX = 1.4;
const REACH_OF_HALO_PX = HALO.widthPx / 2;

/**
 * The mark at an end of a line, on a halo of its own as it reaches beyond the line's. Round and square ones are filled
 * shapes over one another: stroking outlines of some hundred marks took longer than a frame has.
 * @param next the line's point beside that end
 * @param px how much of the sheet a pixel of the screen is
 */
export function drawEndMark(
  context: CanvasRenderingContext2D,
  mark: Exclude<EndMark, 'none'>,
  at: SheetPoint,
  next: SheetPoint,
  px: number,
  colour: string,
): void {
  if (mark === 'bar') drawBar(context, at, next, px, colour);
  else if (mark === 'level') drawLevel(context, at, px, colour);
  else drawFilled(context, mark, at, px, colour);
}

function drawFilled(
  context: CanvasRenderingContext2D,
  mark: 'dot' | 'ring' | 'square',
  at: SheetPoint,
  px: number,
  colour: string,
): void {
  const fill = mark === 'square' ? fillSquare : fillCircle;
  const middlePx = mark === 'square' ? HALF_SIDE_PX : RADIUS_PX;
  const outerPx = mark === 'dot' ? middlePx : middlePx + EDGE_PX / 2;
  haloed(context, () => fill(context, at, (outerPx + REACH_OF_HALO_PX) * px, HALO.colour));
  fill(context, at, outerPx * px, colour);
  if (mark !== 'dot') fill(context, at, (middlePx - EDGE_PX / 2) * px, COLOURS.film);
}

function haloed(context: CanvasRenderingContext2D, draw: () => void): void {
  context.globalAlpha = HALO.alpha;
  draw();
  context.globalAlpha = 1;
}

function fillCircle(context: CanvasRenderingContext2D, [x, y]: SheetPoint, radius: number, colour: string) {
  context.fillStyle = colour;
  context.beginPath();
  context.arc(x, y, radius, 0, 2 * Math.PI);
  context.fill();
}

function fillSquare(context: CanvasRenderingContext2D, [x, y]: SheetPoint, half: number, colour: string) {
  context.fillStyle = colour;
  context.fillRect(x - half, y - half, 2 * half, 2 * half);
}

/** Across the end of the line. */
function drawBar(
  context: CanvasRenderingContext2D,
  at: SheetPoint,
  next: SheetPoint,
  px: number,
  colour: string,
): void {
  const length = Math.hypot(next[0] - at[0], next[1] - at[1]) || 1;
  const half = BAR.halfLengthPx * px;
  const nx = (-(next[1] - at[1]) / length) * half;
  const ny = ((next[0] - at[0]) / length) * half;
  context.beginPath();
  context.moveTo(at[0] - nx, at[1] - ny);
  context.lineTo(at[0] + nx, at[1] + ny);
  haloed(context, () => stroke(context, HALO.colour, (BAR.widthPx + HALO.widthPx) * px));
  stroke(context, colour, BAR.widthPx * px);
}

/** The triangle that stands on a water level. */
function drawLevel(context: CanvasRenderingContext2D, [x, y]: SheetPoint, px: number, colour: string): void {
  context.beginPath();
  context.moveTo(x, y - 2 * px);
  context.lineTo(x - 5 * px, y - 10 * px);
  context.lineTo(x + 5 * px, y - 10 * px);
  context.closePath();
  haloed(context, () => stroke(context, HALO.colour, (EDGE_PX + HALO.widthPx) * px));
  stroke(context, colour, EDGE_PX * px);
}

function stroke(context: CanvasRenderingContext2D, colour: string, width: number): void {
  context.strokeStyle = colour;
  context.lineWidth = width;
  context.stroke();
}
