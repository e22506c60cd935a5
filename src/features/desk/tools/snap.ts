import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import { nearestOnLines, nearestVertex, type PickableLine } from '#shared/compute/geometry/hit-test.ts';
import type { Snap } from '../model/tool-overlay.ts';
import { reachOf, shownLines } from './pick.ts';
import type { Modifiers, ToolContext } from './tool-types.ts';

/**
 * What a place near existing lines snaps to: an end before a vertex before the nearest place on a line, within reach
 * on screen; null when nothing is that near or Ctrl is held. `except`: the line being drawn or dragged.
 */
export function snapAt(
  context: ToolContext,
  at: SheetPx,
  keys: Modifiers,
  except: string | null,
): Snap | null {
  if (keys.ctrl) return null;
  const lines = shownLines(context, except);
  const reach = reachOf(context);
  const end = nearestVertex(lines.map(endsOf), at, reach);
  if (end !== null) return { kind: 'end', at: sheetPx(end.at[0], end.at[1]), lineId: end.id };
  const vertex = nearestVertex(lines, at, reach);
  if (vertex !== null) return { kind: 'vertex', at: sheetPx(vertex.at[0], vertex.at[1]), lineId: vertex.id };
  const place = nearestOnLines(lines, at, reach);
  return place === null ? null : { kind: 'line', at: sheetPx(place.at[0], place.at[1]), lineId: place.id };
}

function endsOf(line: PickableLine): PickableLine {
  const first = line.points[0];
  const last = line.points.at(-1);
  return { id: line.id, points: first === undefined || last === undefined ? [] : [first, last] };
}
