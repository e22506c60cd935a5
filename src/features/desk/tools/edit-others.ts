import type { SheetPx } from '#shared/compute/frames.ts';
import { nearestOnLines, segmentAt } from '#shared/compute/geometry/hit-test.ts';
import { entitiesOf } from '#shared/contract/document.ts';
import type { LineThing } from './edit-result.ts';
import { isHidden, reachOf } from './pick.ts';
import type { ToolContext } from './tool-types.ts';

/** The shown line nearest to a place within reach, the chosen one left out; locked ones may be met too. */
export function otherLineAt(except: string, at: SheetPx, context: ToolContext): LineThing | null {
  const others = otherLines(except, context);
  const hit = nearestOnLines(
    others.map(({ id, value }) => ({ id, points: value.points })),
    at,
    reachOf(context),
  );
  return hit === null ? null : (others.find(({ id }) => id === hit.id) ?? null);
}

/** All shown lines but one. */
export function otherLines(except: string, context: ToolContext): LineThing[] {
  return entitiesOf(context.document, 'line').filter(
    ({ id, value }) => id !== except && !isHidden(context, value) && value.points.length > 1,
  );
}

/** True when a place is within reach of a line. */
export function isOn(line: LineThing, at: SheetPx, context: ToolContext): boolean {
  return segmentAt(line.value.points, at, reachOf(context)) !== null;
}
