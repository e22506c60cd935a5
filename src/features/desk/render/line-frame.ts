import type { SheetPoint } from '#shared/contract/document.ts';
import type { SheetFrame } from '../model/viewport.ts';

const kept = new WeakMap<readonly SheetPoint[], SheetFrame>();

/** The upright frame about a line's points, worked out once for each list of points. */
export function frameOfLine(points: readonly SheetPoint[]): SheetFrame {
  const known = kept.get(points);
  if (known !== undefined) return known;
  const xs = points.map((point) => point[0]);
  const ys = points.map((point) => point[1]);
  const left = Math.min(...xs);
  const top = Math.min(...ys);
  const frame: SheetFrame = [left, top, Math.max(...xs) - left, Math.max(...ys) - top];
  kept.set(points, frame);
  return frame;
}
