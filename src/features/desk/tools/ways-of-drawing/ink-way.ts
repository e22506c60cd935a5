import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import { nearestOnPieces } from '#shared/compute/geometry/near-places.ts';
import type { FollowedPath } from '#shared/compute/ink/follow-over-sheet.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import type { InkReach } from '../../model/ink-client.ts';
import { keptPoint } from '../line-points.ts';
import { piecesNear } from '../snap-lines.ts';
import type { ToolContext } from '../tool-types.ts';
import { endOf, type Growing } from './growing.ts';

/** How near a stroke has to be to a click to be meant: on screen, and bounded on the sheet. */
const GRIP_PX = 6;
const [LEAST_GRIP, MOST_GRIP] = [4, 32];
/** A place nearer than this to another line lies on it, sheet pixels. */
const ON_LINE = 0.05;
/** A look that was for another place by less than this is shown still, screen pixels. */
const SAME_PLACE_PX = 1;

/** From where to where the ink would be followed by a click at a place. */
export function inkReach(growing: Growing, place: SheetPx, context: ToolContext): InkReach {
  return lookReach([sheetPx(...endOf(growing)), place], context);
}

export function lookReach(
  [from, to]: readonly [SheetPx, SheetPx],
  { zoom }: Pick<ToolContext, 'zoom'>,
): InkReach {
  return { from, to, grip: Math.min(MOST_GRIP, Math.max(LEAST_GRIP, GRIP_PX / zoom)) };
}

/**
 * The line with a followed path added. Its first vertex moves onto the stroke, unless it lies on another line; a new
 * end that is `fixed`, as one that has snapped, stays where it was clicked.
 */
export function withPath(
  growing: Growing,
  path: FollowedPath,
  to: SheetPx,
  fixed: boolean,
  context: ToolContext,
): SheetPoint[] {
  const found = path.points.map(([x, y]) => keptPoint(sheetPx(x, y)));
  if (fixed) found[found.length - 1] = keptPoint(to);
  const alone = growing.points.length === 1 && !isOnLine(context, endOf(growing), growing.lineId);
  const kept = alone ? found.slice(0, 1) : growing.points;
  return [...kept, ...found.slice(1)];
}

function isOnLine(context: ToolContext, at: SheetPoint, except: string): boolean {
  return nearestOnPieces(piecesNear(context, at, ON_LINE, except), at, ON_LINE) !== null;
}

/** What the newest look shows of the line to a place; null where no look from this end has been answered yet. */
export function lookedPath(growing: Growing, place: SheetPx, context: ToolContext): SheetPoint[] | null {
  const { inkLook: look } = context;
  const end = endOf(growing);
  if (look === null || look.from[0] !== end[0] || look.from[1] !== end[1]) return null;
  if (look.path === null || !look.path.found) return [end, [place[0], place[1]]];
  const path = look.path.points.map(([x, y]): SheetPoint => [x, y]);
  const away = Math.hypot(look.to[0] - place[0], look.to[1] - place[1]) * context.zoom;
  return away > SAME_PLACE_PX ? [...path, [place[0], place[1]]] : path;
}
