import type { SheetPx } from '#shared/compute/frames.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import type { ToolId } from '../model/tool-choice.ts';
import { NO_OVERLAY, type Sketch, type ToolOverlay } from '../model/tool-overlay.ts';
import { snapWhileDragging } from './drag.ts';
import { sketchesAt } from './edit-step.ts';
import { growingEnd } from './line-points.ts';
import { knownPointStep, noteStep, readingPointStep } from './place-tool.ts';
import { nextProfilePlace, profileStep } from './profile-tool.ts';
import { selectStep } from './select-tool.ts';
import { snapAt } from './snap.ts';
import { soilPlaceStep } from './soil-tool.ts';
import {
  type FollowedEvent,
  type Modifiers,
  rest,
  type ToolContext,
  type ToolEvent,
  type ToolState,
  type ToolStep,
} from './tool-types.ts';
import { draftLine, nextPlace, traceStep } from './trace-tool.ts';
import { addFollowed, pathTo } from './ways-of-drawing/extend-line.ts';
import { growingLine } from './ways-of-drawing/growing.ts';

type Machine = (state: ToolState, event: ToolEvent, context: ToolContext) => ToolStep;

const MACHINES: Record<ToolId, Machine> = {
  select: selectStep,
  knownPoint: knownPointStep,
  equipotential: traceStep,
  flowLine: traceStep,
  phreaticLine: traceStep,
  boundary: traceStep,
  readingPoint: readingPointStep,
  profile: profileStep,
  soilPlace: soilPlaceStep,
  note: noteStep,
};

/** One step of the tool in hand: `(state, event, context) → {state, commands}`. */
export function stepTool(state: ToolState, event: ToolEvent | FollowedEvent, context: ToolContext): ToolStep {
  if (event.type === 'followed') return context.choice === null ? rest() : addFollowed(event, context);
  return MACHINES[context.tool](state, event, context);
}

export function overlayOf(
  state: ToolState,
  at: SheetPx | null,
  keys: Modifiers,
  context: ToolContext,
): ToolOverlay {
  const magnify = context.tool === 'knownPoint' || state.at === 'dragging';
  if (at === null || context.readOnly) return { ...NO_OVERLAY, magnify: magnify && at !== null };
  if (state.at === 'framing') return { ...NO_OVERLAY, sketches: [frameSketch(state.from, at)] };
  if (state.at === 'moving') return NO_OVERLAY;
  if (context.pendingEdit != null) return { ...NO_OVERLAY, sketches: sketchesAt(at, keys, context) };
  if (state.at === 'dragging') {
    const { target } = state;
    const snap = target.kind === 'vertex' ? snapWhileDragging(target, at, keys, context) : null;
    return { rubber: null, snap, magnify };
  }
  if (context.tool === 'profile') {
    const { from, to } = nextProfilePlace(at, keys, context);
    return { rubber: from === null ? null : [from, to], snap: snapAt(context, at, keys, null), magnify };
  }
  if (context.choice === null) return { ...NO_OVERLAY, magnify };
  if (state.at === 'sketching') return { ...NO_OVERLAY, path: state.places.map(([x, y]) => [x, y]) };
  const line = draftLine(context);
  const end = line === null ? null : growingEnd(line, context.draft?.atStart ?? false);
  const rubber = end === null ? null : ([sheetPx(...end), nextPlace(at, keys, context)] as const);
  const growing = rubber === null ? null : growingLine(context);
  const path = growing === null || rubber === null ? null : pathTo(growing, rubber[1], context);
  return { rubber, path, snap: snapAt(context, at, keys, context.draft?.lineId ?? null), magnify };
}

/** The outline of the rectangle that is drawn about what is to be chosen. */
function frameSketch([left, top]: SheetPx, [right, bottom]: SheetPx): Sketch {
  return {
    kind: 'frame',
    points: [
      [left, top],
      [right, top],
      [right, bottom],
      [left, bottom],
      [left, top],
    ],
  };
}
