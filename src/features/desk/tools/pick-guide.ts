import type { SheetPx } from '#shared/compute/frames.ts';
import { nearestOnLines } from '#shared/compute/geometry/hit-test.ts';
import { reachOf } from './pick.ts';
import type { ToolContext } from './tool-types.ts';

/** The line of the computed net shown under the pointer, by its guide; null when none is. */
export function computedLineAt(context: ToolContext, at: SheetPx): string | null {
  const lines = context.guides.computedNet?.lines ?? [];
  return nearestOnLines(lines, at, reachOf(context))?.id ?? null;
}
