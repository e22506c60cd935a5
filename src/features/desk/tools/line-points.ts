import type { SheetPx } from '#shared/compute/frames.ts';
import type { SheetPoint, TracedLine } from '#shared/contract/document.ts';

/** Finer than a hundredth of a pixel no place on a scan can be told. */
const PER_PIXEL = 100;

export function keptPoint(at: SheetPx): SheetPoint {
  return [Math.round(at[0] * PER_PIXEL) / PER_PIXEL, Math.round(at[1] * PER_PIXEL) / PER_PIXEL];
}

export function withPointMoved(line: TracedLine, index: number, at: SheetPx): TracedLine {
  return { ...line, points: line.points.map((point, i) => (i === index ? keptPoint(at) : point)) };
}

/** The line with a point put in after segment `segment`'s first end. */
export function withPointInserted(line: TracedLine, segment: number, at: SheetPx): TracedLine {
  const points = [...line.points];
  points.splice(segment + 1, 0, keptPoint(at));
  return { ...line, points };
}

export function withoutPoint(line: TracedLine, index: number): TracedLine {
  return { ...line, points: line.points.filter((_point, i) => i !== index) };
}

/** The end of a line at which it grows. */
export function growingEnd(line: TracedLine, atStart: boolean): SheetPoint | null {
  return (atStart ? line.points[0] : line.points.at(-1)) ?? null;
}
