import { Polyline } from 'fabric';
import { type LinePiece, piecesIn } from '#shared/compute/geometry/clip-line.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import type { SheetFrame } from '../model/viewport.ts';
import { drawEndMark } from './end-mark.ts';
import { frameOfLine } from './line-frame.ts';
import { HALO } from './line-look.ts';
import type { SceneLine } from './scene.ts';
import { LINE_REACH_PX } from './screen-part.ts';
import { framesMeet, holdsFrame, seenBy } from './seen-by.ts';

const STRONGER_PX = 1.2;
const HATCH_LENGTH_PX = 6;
const HATCH_PX = 1;

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
    this.frame = frameOfLine(item.points);
  }

  override render(context: CanvasRenderingContext2D): void {
    const zoom = this.canvas?.viewportTransform[0] ?? 1;
    const seen = seenBy(this.canvas, LINE_REACH_PX);
    if (seen === null || !framesMeet(this.frame, seen)) return;
    const whole: LinePiece[] = [{ points: [...this.item.points], start: 0 }];
    const pieces = holdsFrame(seen, this.frame) ? whole : piecesIn(this.item.points, seen);
    const { look, strong } = this.item;
    const widthPx = look.widthPx + (strong ? STRONGER_PX : 0);
    context.save();
    context.lineJoin = 'round';
    context.lineCap = 'butt';
    const ticks =
      look.hatchPx > 0
        ? ticksOf(pieces, look.hatchPx / zoom, HATCH_LENGTH_PX / zoom, isDrawnRightwards(this.item.points))
        : null;
    context.globalAlpha = HALO.alpha;
    strokePieces(context, pieces, HALO.colour, (widthPx + HALO.widthPx) / zoom, []);
    if (ticks !== null) strokePath(context, ticks, HALO.colour, HATCH_PX + HALO.widthPx, zoom);
    context.globalAlpha = 1;
    const dash = look.dashPx.map((length) => length / zoom);
    strokePieces(context, pieces, look.colour, widthPx / zoom, dash);
    if (ticks !== null) strokePath(context, ticks, look.colour, HATCH_PX, zoom);
    this.endMarks(context, zoom, seen);
    context.restore();
  }

  /** The marks at both ends; those out of sight are left out. */
  private endMarks(context: CanvasRenderingContext2D, zoom: number, seen: SheetFrame): void {
    const { points, look } = this.item;
    const [first, last] = [points[0], points.at(-1)];
    if (look.end === 'none' || first === undefined || last === undefined) return;
    // A water level stands where the water ends: at the upper end of a face, at the start of a phreatic line.
    const level = last[1] < first[1] ? last : first;
    const ends = look.end === 'level' ? [level] : points.length > 1 ? [first, last] : [first];
    for (const end of ends) {
      if (!framesMeet([end[0], end[1], 0, 0], seen)) continue;
      const next = (end === first ? points[1] : points.at(-2)) ?? end;
      drawEndMark(context, look.end, end, next, 1 / zoom, look.colour);
    }
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

function strokePath(
  context: CanvasRenderingContext2D,
  path: Path2D,
  colour: string,
  widthPx: number,
  zoom: number,
): void {
  context.strokeStyle = colour;
  context.lineWidth = widthPx / zoom;
  context.stroke(path);
}

/** Slanting ticks on the side that is below as the line lies, as soil and rock are hatched on drawings. */
function ticksOf(pieces: readonly LinePiece[], spacing: number, length: number, rightwards: boolean): Path2D {
  const path = new Path2D();
  const side = rightwards ? 1 : -1;
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
        path.moveTo(x, y);
        path.lineTo(x + side * (-ty - 0.6 * tx) * length, y + side * (tx - 0.6 * ty) * length);
      }
      along += segment;
    }
  }
  return path;
}
