import type { SheetPx } from '#shared/compute/frames.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import type { ToolId } from '../model/tool-choice.ts';
import { NO_OVERLAY, type Sketch, type ToolOverlay } from '../model/tool-overlay.ts';
import { heldAt, snapWhileDragging } from './drag.ts';
import { drawnCrossingAt } from './drawn-crossing.ts';
import { sketchesAt } from './edit-step.ts';
import { growingEnd } from './line-points.ts';
import { knownPointStep, noteStep, readingPointStep } from './place-tool.ts';
import { nextProfilePlace, profileStep } from './profile-tool.ts';
import { nextRulerPlace, rulerStep } from './ruler-tool.ts';
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
  ruler: rulerStep,
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
  if (context.tool === 'ruler') return at === null ? NO_OVERLAY : rulerOverlay(at, keys, context);
  const magnify = context.tool === 'knownPoint' || state.at === 'dragging';
  if (at === null || context.readOnly) return { ...NO_OVERLAY, magnify: magnify && at !== null };
  if (state.at === 'framing') return { ...NO_OVERLAY, sketches: [frameSketch(state.from, at)] };
  if (state.at === 'moving') return NO_OVERLAY;
  if (context.pendingEdit != null) return { ...NO_OVERLAY, sketches: sketchesAt(at, keys, context) };
  if (state.at === 'dragging') {
    const { target } = state;
    const held = target.kind === 'mark' ? context.document.entities[target.id]?.value : undefined;
    if (held?.kind === 'knownPoint')
      return { ...NO_OVERLAY, ...crossingAbout(heldAt(state, at), keys, context), magnify };
    const snap = target.kind === 'vertex' ? snapWhileDragging(target, at, keys, context) : null;
    return { rubber: null, snap, magnify };
  }
  if (context.tool === 'profile') {
    const { from, to } = nextProfilePlace(at, keys, context);
    return { rubber: from === null ? null : [from, to], snap: snapAt(context, at, keys, null), magnify };
  }
  if (context.tool === 'knownPoint') return { ...NO_OVERLAY, ...crossingAbout(at, keys, context), magnify };
  if (context.choice === null) return { ...NO_OVERLAY, magnify };
  if (state.at === 'sketching') return { ...NO_OVERLAY, path: state.places.map(([x, y]) => [x, y]) };
  const line = draftLine(context);
  const end = line === null ? null : growingEnd(line, context.draft?.atStart ?? false);
  const rubber = end === null ? null : ([sheetPx(...end), nextPlace(at, keys, context)] as const);
  const growing = rubber === null ? null : growingLine(context);
  const path = growing === null || rubber === null ? null : pathTo(growing, rubber[1], context);
  return { rubber, path, snap: snapAt(context, at, keys, context.draft?.lineId ?? null), magnify };
}

function rulerOverlay(at: SheetPx, keys: Modifiers, context: ToolContext): ToolOverlay {
  const { places, done } = context.ruler;
  const last = done ? undefined : places.at(-1);
  const snap = snapAt(context, at, keys, null, last ?? null);
  const next = nextRulerPlace(at, keys, context);
  return { rubber: last === undefined ? null : [sheetPx(...last), next], snap, magnify: false };
}

function crossingAbout(at: SheetPx, keys: Modifiers, context: ToolContext) {
  return { drawnCrossing: drawnCrossingAt(at, keys, context), seeksCrossing: at };
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
