import { deskToolText } from '#client/text/desk-tools.ts';
import { drawingWayText as text } from '#client/text/drawing-ways.ts';
import type { SheetPx } from '#shared/compute/frames.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import type { DrawingWay } from '../../model/drawing-way.ts';
import { keptPoint } from '../line-points.ts';
import {
  type FollowedEvent,
  rest,
  type ToolCommand,
  type ToolContext,
  type ToolStep,
} from '../tool-types.ts';
import { endOf, type Growing, growingLine, grown } from './growing.ts';
import { inkReach, lookedPath, withPath } from './ink-way.ts';
import { joined, smoothEnd } from './smooth-way.ts';

/** Most points that a line may have; the contract refuses more. */
const MOST_POINTS = 5000;

/** A click that lengthens the line under way, as the way of drawing has it. `fixed`: the place has snapped. */
export function extendLine(growing: Growing, at: SheetPx, fixed: boolean, context: ToolContext): ToolStep {
  const place = keptPoint(at);
  const end = endOf(growing);
  if (end[0] === place[0] && end[1] === place[1]) return rest();
  if (context.way === 'ink') {
    const { lineId } = growing;
    return rest({ do: 'follow', lineId, reach: inkReach(growing, at, context), fixed });
  }
  const points = context.way === 'smooth' ? joined(smoothEnd(growing, place)) : [...growing.points, place];
  const way = context.way === 'smooth' ? 'smooth' : 'straight';
  return rest(...lengthened(growing, points, way, deskToolText.addedPoint(growing.line)));
}

/** The ink that a click asked for, added to the line that it was asked for; to another it is nothing. */
export function addFollowed(event: FollowedEvent, context: ToolContext): ToolStep {
  const growing = growingLine(context);
  if (growing === null || growing.lineId !== event.lineId) return rest();
  const end = endOf(growing);
  if (end[0] !== event.from[0] || end[1] !== event.from[1]) return rest();
  const { path, to, fixed } = event;
  const label = text.followedInk(deskToolText.lineWord(growing.line));
  if (path?.found) {
    return rest(...lengthened(growing, withPath(growing, path, to, fixed, context), 'ink', label));
  }
  const straight = lengthened(
    growing,
    [...growing.points, keptPoint(to)],
    'straight',
    deskToolText.addedPoint(growing.line),
  );
  return rest(...straight, { do: 'notice', text: path === null ? text.scanUnread : text.noInk });
}

/** The commands that give a line more points, and remember where it was clicked. */
export function lengthened(
  growing: Growing,
  points: readonly SheetPoint[],
  way: DrawingWay,
  label: string,
): ToolCommand[] {
  const { lineId } = growing;
  if (points.length > MOST_POINTS) return [{ do: 'notice', text: deskToolText.tooManyPoints(MOST_POINTS) }];
  const places = [
    // A start that moved onto the stroke is the first of the new points.
    { at: growing.points.length === 1 ? points[0]! : endOf(growing), way: null },
    { at: points[points.length - 1]!, way },
  ];
  return [
    { do: 'run', label, ops: [{ op: 'put', entityId: lineId, value: grown(growing, points) }] },
    { do: 'clicked', lineId, places },
  ];
}

/** How the line would go on to a place, its end first; null where it would go straight. */
export function pathTo(growing: Growing, place: SheetPx, context: ToolContext): SheetPoint[] | null {
  if (context.way === 'smooth') return [...smoothEnd(growing, keptPoint(place)).curve];
  return context.way === 'ink' ? lookedPath(growing, place, context) : null;
}
