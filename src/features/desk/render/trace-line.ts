import { Polyline } from 'fabric';
import type { SheetPoint } from '#shared/contract/document.ts';
import type { SheetFrame } from '../model/viewport.ts';
import { type LinePiece, piecesIn } from './clip-line.ts';
import { COLOURS, type EndMark } from './line-look.ts';
import type { SceneLine } from './scene.ts';
import { framesMeet, holdsFrame, seenBy } from './seen-by.ts';

const HALO_PX = 3;
const HALO_ALPHA = 0.72;
const STRONGER_PX = 1.2;
const HATCH_LENGTH_PX = 6;
/** How far marks and hatching reach beyond the line, screen pixels. */
const REACH_PX = 16;

/** A traced line in sheet pixels, drawn with strokes of constant width on screen and a halo over the scan. */
export class TraceLine extends Polyline {
  declare item: SceneLine;
  declare frame: SheetFrame;

  constructor(item: SceneLine) {
    super([], { objectCaching: false, selectable: false, evented: false });
    this.show(item);
  }

  show(item: SceneLine): void {
    this.item = item;
    this.points = item.points.map(([x, y]) => ({ x, y }));
    this.setBoundingBox(true);
    const xs = item.points.map((point) => point[0]);
    const ys = item.points.map((point) => point[1]);
    const left = Math.min(...xs);
    const top = Math.min(...ys);
    this.frame = [left, top, Math.max(...xs) - left, Math.max(...ys) - top];
  }

  override render(context: CanvasRenderingContext2D): void {
    const zoom = this.canvas?.viewportTransform[0] ?? 1;
    const seen = seenBy(this.canvas, REACH_PX);
    if (seen === null || !framesMeet(this.frame, seen)) return;
    const whole: LinePiece[] = [{ points: [...this.item.points], start: 0 }];
    const pieces = holdsFrame(seen, this.frame) ? whole : piecesIn(this.item.points, seen);
    const { look, strong } = this.item;
    const widthPx = look.widthPx + (strong ? STRONGER_PX : 0);
    context.save();
    context.lineJoin = 'round';
    context.lineCap = 'butt';
    context.globalAlpha = HALO_ALPHA;
    strokePieces(context, pieces, COLOURS.film, (widthPx + HALO_PX) / zoom, []);
    context.globalAlpha = 1;
    const dash = look.dashPx.map((length) => length / zoom);
    strokePieces(context, pieces, look.colour, widthPx / zoom, dash);
    if (look.hatchPx > 0)
      hatch(context, pieces, look.hatchPx / zoom, zoom, isDrawnRightwards(this.item.points));
    this.endMarks(context, zoom);
    context.restore();
  }

  private endMarks(context: CanvasRenderingContext2D, zoom: number): void {
    const { points, look } = this.item;
    const first = points[0];
    const last = points.at(-1);
    if (look.end === 'none' || first === undefined || last === undefined) return;
    if (look.end === 'level') {
      // A water level stands where the water ends: at the upper end of a face, at the start of a phreatic line.
      endMark(context, look.end, last[1] < first[1] ? last : first, first, look.colour, zoom);
      return;
    }
    endMark(context, look.end, first, points[1] ?? first, look.colour, zoom);
    if (points.length > 1) endMark(context, look.end, last, points.at(-2) ?? last, look.colour, zoom);
  }
}

function strokePieces(
  context: CanvasRenderingContext2D,
  pieces: readonly LinePiece[],
  colour: string,
  width: number,
  dash: number[],
): void {
  context.strokeStyle = colour;
  context.lineWidth = width;
  context.setLineDash(dash);
  for (const { points, start } of pieces) {
    context.lineDashOffset = start;
    context.beginPath();
    points.forEach(([x, y], i) => {
      if (i === 0) context.moveTo(x, y);
      else context.lineTo(x, y);
    });
    context.stroke();
  }
  context.setLineDash([]);
}

function isDrawnRightwards(points: readonly SheetPoint[]): boolean {
  return (points.at(-1)?.[0] ?? 0) >= (points[0]?.[0] ?? 0);
}

/** Slanting ticks on the side that is below as the line lies, as soil and rock are hatched on drawings. */
function hatch(
  context: CanvasRenderingContext2D,
  pieces: readonly LinePiece[],
  spacing: number,
  zoom: number,
  rightwards: boolean,
): void {
  const length = HATCH_LENGTH_PX / zoom;
  const side = rightwards ? 1 : -1;
  context.lineWidth = 1 / zoom;
  context.beginPath();
  for (const { points, start } of pieces) {
    let along = start;
    for (let i = 0; i + 1 < points.length; i += 1) {
      const [ax, ay] = points[i]!;
      const [bx, by] = points[i + 1]!;
      const segment = Math.hypot(bx - ax, by - ay);
      if (segment === 0) continue;
      const tx = (bx - ax) / segment;
      const ty = (by - ay) / segment;
      for (let s = Math.ceil(along / spacing) * spacing; s < along + segment; s += spacing) {
        const x = ax + (s - along) * tx;
        const y = ay + (s - along) * ty;
        context.moveTo(x, y);
        context.lineTo(x + side * (-ty - 0.6 * tx) * length, y + side * (tx - 0.6 * ty) * length);
      }
      along += segment;
    }
  }
  context.stroke();
}

function endMark(
  context: CanvasRenderingContext2D,
  mark: EndMark,
  at: SheetPoint,
  next: SheetPoint,
  colour: string,
  zoom: number,
): void {
  const px = 1 / zoom;
  context.fillStyle = colour;
  context.strokeStyle = colour;
  context.beginPath();
  if (mark === 'bar') {
    const length = Math.hypot(next[0] - at[0], next[1] - at[1]) || 1;
    const nx = (-(next[1] - at[1]) / length) * 4 * px;
    const ny = ((next[0] - at[0]) / length) * 4 * px;
    context.moveTo(at[0] - nx, at[1] - ny);
    context.lineTo(at[0] + nx, at[1] + ny);
    context.lineWidth = 2 * px;
    context.stroke();
  } else if (mark === 'level') {
    context.moveTo(at[0], at[1] - 2 * px);
    context.lineTo(at[0] - 5 * px, at[1] - 10 * px);
    context.lineTo(at[0] + 5 * px, at[1] - 10 * px);
    context.closePath();
    context.lineWidth = 1.4 * px;
    context.stroke();
  } else if (mark === 'square') {
    context.rect(at[0] - 3.2 * px, at[1] - 3.2 * px, 6.4 * px, 6.4 * px);
    context.lineWidth = 1.4 * px;
    context.fillStyle = COLOURS.film;
    context.fill();
    context.stroke();
  } else {
    context.arc(at[0], at[1], 3 * px, 0, 2 * Math.PI);
    context.lineWidth = 1.4 * px;
    if (mark === 'ring') {
      context.fillStyle = COLOURS.film;
      context.fill();
      context.stroke();
    } else context.fill();
  }
}
