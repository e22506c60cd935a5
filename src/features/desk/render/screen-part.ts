import type { Viewport } from '../model/viewport.ts';
import { labelWidthPx } from './label-layout.ts';
import { frameOfLine } from './line-frame.ts';
import type { SceneItem, SceneMark } from './scene.ts';

/** An upright part of the screen, in pixels from the view's upper left corner. */
export type ScreenPart = {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
};

/** How far a line's marks and hatching reach beyond its points. */
export const LINE_REACH_PX = 16;
/** How far a mark may reach from its place with its text. */
export const MARK_REACH_PX = 140;
/** How far one without text reaches: handles, and what shows a snap. */
const BARE_MARK_REACH_PX = 20;
/** Sides lie on such steps, so that the part keeps its size while something in it is dragged a little. */
const STEP_PX = 64;

/** The part of the screen on which items are drawn; null when there are none. */
export function partOfItems(items: readonly SceneItem[], { zoom, origin }: Viewport): ScreenPart | null {
  let [left, top, right, bottom] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const item of items) {
    const { frame, reachPx } = extentOf(item);
    left = Math.min(left, (frame[0] - origin[0]) * zoom - reachPx);
    top = Math.min(top, (frame[1] - origin[1]) * zoom - reachPx);
    right = Math.max(right, (frame[0] + frame[2] - origin[0]) * zoom + reachPx);
    bottom = Math.max(bottom, (frame[1] + frame[3] - origin[1]) * zoom + reachPx);
  }
  if (left > right) return null;
  const [x, y] = [down(left), down(top)];
  return { x, y, width: -down(-right) - x, height: -down(-bottom) - y };
}

const down = (px: number) => Math.floor(px / STEP_PX) * STEP_PX;

function extentOf(item: SceneItem): { frame: readonly [number, number, number, number]; reachPx: number } {
  if (item.shape === 'line') return { frame: frameOfLine(item.points), reachPx: LINE_REACH_PX };
  if (item.shape === 'area') return { frame: frameOfLine(item.outlines.flat()), reachPx: LINE_REACH_PX };
  return { frame: [item.at[0], item.at[1], 0, 0], reachPx: reachOfMark(item) };
}

/** A long name reaches farther than most, and would be cut off. */
function reachOfMark({ text, offsetPx }: SceneMark): number {
  if (text === '') return BARE_MARK_REACH_PX;
  const [dx, dy] = offsetPx;
  return Math.max(MARK_REACH_PX, labelWidthPx(text) + Math.max(Math.abs(dx), Math.abs(dy)));
}

/** What two parts have in common; null for nothing. */
export function commonPart(a: ScreenPart | null, b: ScreenPart): ScreenPart | null {
  if (a === null) return null;
  const [x, y] = [Math.max(a.x, b.x), Math.max(a.y, b.y)];
  const width = Math.min(a.x + a.width, b.x + b.width) - x;
  const height = Math.min(a.y + a.height, b.y + b.height) - y;
  return width > 0 && height > 0 ? { x, y, width, height } : null;
}

export function holdsPart(outer: ScreenPart, inner: ScreenPart): boolean {
  return (
    inner.x >= outer.x &&
    inner.y >= outer.y &&
    inner.x + inner.width <= outer.x + outer.width &&
    inner.y + inner.height <= outer.y + outer.height
  );
}
