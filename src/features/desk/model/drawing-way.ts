import { createStore } from 'zustand/vanilla';

/** How a line comes about between one click and the next. */
export const DRAWING_WAYS = ['straight', 'smooth', 'freehand', 'ink'] as const;
export type DrawingWay = (typeof DRAWING_WAYS)[number];

const KEPT_UNDER = 'tracehead way of drawing';

/** The way in which this browser's user draws, whatever net is open. */
export const drawingWayChoice = createStore<{ readonly way: DrawingWay }>(() => ({ way: keptWay() }));

export function chooseDrawingWay(way: DrawingWay): void {
  drawingWayChoice.setState({ way });
  try {
    globalThis.localStorage?.setItem(KEPT_UNDER, way);
  } catch {
    // A browser that keeps nothing draws so until the page is left.
  }
}

/** Goes on to the next way, after the last to the first. */
export function nextDrawingWay(): void {
  const at = DRAWING_WAYS.indexOf(drawingWayChoice.getState().way);
  chooseDrawingWay(DRAWING_WAYS[(at + 1) % DRAWING_WAYS.length] ?? 'straight');
}

function keptWay(): DrawingWay {
  try {
    const kept = globalThis.localStorage?.getItem(KEPT_UNDER);
    return DRAWING_WAYS.find((way) => way === kept) ?? 'straight';
  } catch {
    return 'straight';
  }
}
