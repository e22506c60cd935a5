import type { SheetPoint } from '#shared/contract/document.ts';

/** Left, top, width and height. */
export type ClipFrame = readonly [number, number, number, number];

/** A piece of a line inside a frame; `start`: distance along the whole line at which it begins. */
export type LinePiece = { readonly points: SheetPoint[]; readonly start: number };

/**
 * The pieces of a polyline that lie in a frame. A line seen at forty times its size is hundreds of thousands of screen
 * pixels long, and dashing or hatching what is out of sight would take longer than a frame.
 */
export function piecesIn(points: readonly SheetPoint[], frame: ClipFrame): LinePiece[] {
  const pieces: LinePiece[] = [];
  let open: LinePiece | null = null;
  let along = 0;
  for (let i = 0; i + 1 < points.length; i += 1) {
    const a = points[i]!;
    const b = points[i + 1]!;
    // Not by hypot, which takes ten times as long: this is done with every segment in every frame that is drawn.
    const length = Math.sqrt((b[0] - a[0]) ** 2 + (b[1] - a[1]) ** 2);
    const part = liesBeside(a, b, frame) ? null : clippedPart(a, b, frame);
    if (part === null) {
      open = null;
    } else {
      const [from, to] = part;
      if (open === null || from > 0) {
        open = { points: [between(a, b, from)], start: along + from * length };
        pieces.push(open);
      }
      open.points.push(between(a, b, to));
      if (to < 1) open = null;
    }
    along += length;
  }
  return pieces;
}

/** True when both ends lie beyond the same side. */
function liesBeside(a: SheetPoint, b: SheetPoint, frame: ClipFrame): boolean {
  const [right, bottom] = [frame[0] + frame[2], frame[1] + frame[3]];
  return (
    (a[0] < frame[0] && b[0] < frame[0]) ||
    (a[0] > right && b[0] > right) ||
    (a[1] < frame[1] && b[1] < frame[1]) ||
    (a[1] > bottom && b[1] > bottom)
  );
}

function between(a: SheetPoint, b: SheetPoint, t: number): SheetPoint {
  if (t === 0) return a;
  if (t === 1) return b;
  return [a[0] + t * (b[0] - a[0]), a[1] + t * (b[1] - a[1])];
}

/** Part of a segment inside a frame as two numbers from 0 to 1; null when none is. Liang and Barsky (1984). */
export function clippedPart(a: SheetPoint, b: SheetPoint, frame: ClipFrame): [number, number] | null {
  const [left, top, width, height] = frame;
  const dx = b[0] - a[0];
  const dy = b[1] - a[1];
  // Nothing is made on the way: this is asked of every segment in every frame that is drawn.
  if (dx === 0 && (a[0] < left || a[0] > left + width)) return null;
  if (dy === 0 && (a[1] < top || a[1] > top + height)) return null;
  let from = 0;
  let to = 1;
  if (dx !== 0) {
    const atLeft = (left - a[0]) / dx;
    const atRight = (left + width - a[0]) / dx;
    from = Math.max(from, Math.min(atLeft, atRight));
    to = Math.min(to, Math.max(atLeft, atRight));
  }
  if (dy !== 0) {
    const atTop = (top - a[1]) / dy;
    const atBottom = (top + height - a[1]) / dy;
    from = Math.max(from, Math.min(atTop, atBottom));
    to = Math.min(to, Math.max(atTop, atBottom));
  }
  return from <= to ? [from, to] : null;
}
