import type { StaticCanvas } from 'fabric';
import type { SheetFrame } from '../model/viewport.ts';

/** The part of the sheet a canvas shows, widened by so many screen pixels; null when it shows none. */
export function seenBy(canvas: StaticCanvas | undefined, marginPx: number): SheetFrame | null {
  if (canvas === undefined) return null;
  const [zoom, , , , dx, dy] = canvas.viewportTransform;
  const margin = marginPx / zoom;
  return [
    -dx / zoom - margin,
    -dy / zoom - margin,
    canvas.width / zoom + 2 * margin,
    canvas.height / zoom + 2 * margin,
  ];
}

export function framesMeet(a: SheetFrame, b: SheetFrame): boolean {
  return a[0] <= b[0] + b[2] && b[0] <= a[0] + a[2] && a[1] <= b[1] + b[3] && b[1] <= a[1] + a[3];
}

export function holdsFrame(outer: SheetFrame, inner: SheetFrame): boolean {
  return (
    inner[0] >= outer[0] &&
    inner[1] >= outer[1] &&
    inner[0] + inner[2] <= outer[0] + outer[2] &&
    inner[1] + inner[3] <= outer[1] + outer[3]
  );
}
