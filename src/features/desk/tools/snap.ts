import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import {
  type NearPlace,
  nearestCrossing,
  nearestFoot,
  nearestOnPieces,
  nearestOnward,
} from '#shared/compute/geometry/near-places.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { isBoundaryKind } from '../model/sheet-kinds.ts';
import { SNAP_KINDS, type Snap, type SnapKind } from '../model/tool-overlay.ts';
import { growingEnd } from './line-points.ts';
import { reachOf } from './pick.ts';
import { piecesNear, type ShownPiece, shownEnds } from './snap-lines.ts';
import type { Modifiers, ToolContext } from './tool-types.ts';

/** What is asked about: the place, how far things are met, the lines there and the end of the segment drawn. */
type Asked = {
  readonly context: ToolContext;
  readonly at: SheetPx;
  readonly reach: number;
  readonly pieces: readonly ShownPiece[];
  readonly except: string | null;
  readonly from: Pair | null;
};

type Found = NearPlace<string> & { readonly from?: Pair };

/** Part of the reach within which a kind is met: what lies everywhere must not take a place from what is rare. */
const REACH: Readonly<Record<SnapKind, number>> = {
  end: 1,
  crossing: 1,
  vertex: 1,
  rightAngle: 0.75,
  boundary: 1,
  line: 1,
  extension: 0.6,
};
/** How far beyond its end a line is drawn on, screen pixels. */
const LONGEST_ONWARD_PX = 320;

const FINDERS: Readonly<Record<SnapKind, (asked: Asked, reach: number) => Found | null>> = {
  end: ({ pieces, at }, reach) => nearestOf(pieces.flatMap(endsOf), at, reach),
  vertex: ({ pieces, at }, reach) => nearestOf(pieces.flatMap(verticesOf), at, reach),
  crossing: ({ pieces, at }, reach) => nearestCrossing(pieces, at, reach),
  rightAngle: ({ pieces, at, from, context }, reach) =>
    from === null ? null : nearestFoot(pieces, from, at, reach, context.working),
  boundary: ({ pieces, at }, reach) =>
    nearestOnPieces(
      pieces.filter(({ value }) => isBoundaryKind(value.line)),
      at,
      reach,
    ),
  line: ({ pieces, at }, reach) =>
    nearestOnPieces(
      pieces.filter(({ value }) => !isBoundaryKind(value.line)),
      at,
      reach,
    ),
  extension: ({ pieces, at, context, except }, reach) =>
    nearestOnward(shownEnds(context, except), pieces, at, reach, LONGEST_ONWARD_PX / context.zoom),
};

/**
 * What a place near existing lines snaps to, within reach on screen: of the kinds of place that are switched on the
 * first in the order of `SNAP_KINDS`, and of one kind the nearest. Null when nothing is that near, or while Alt or Ctrl
 * is held. `except`: the line being drawn or dragged. `from`: where the segment comes from that ends at the place; left
 * out, the end of the line under way.
 */
export function snapAt(
  context: ToolContext,
  at: SheetPx,
  keys: Modifiers,
  except: string | null,
  from: Pair | null = endUnderWay(context),
): Snap | null {
  if (keys.ctrl || keys.alt) return null;
  const reach = reachOf(context);
  const asked: Asked = { context, at, reach, pieces: piecesNear(context, at, reach, except), except, from };
  for (const kind of SNAP_KINDS) {
    const found = context.snapKinds.includes(kind) ? FINDERS[kind](asked, REACH[kind] * reach) : null;
    if (found !== null) return snapOf(kind, found);
  }
  return null;
}

function snapOf(kind: SnapKind, { id, at, from }: Found): Snap {
  return { kind, at: sheetPx(...at), lineId: id, from: from === undefined ? null : sheetPx(...from) };
}

function endUnderWay({ draft, document }: ToolContext): Pair | null {
  const value = draft === null ? undefined : document.entities[draft.lineId]?.value;
  return draft !== null && value?.kind === 'line' ? growingEnd(value, draft.atStart) : null;
}

type Place = { readonly id: string; readonly at: Pair };

function endsOf({ id, value, segment, a, b }: ShownPiece): Place[] {
  const places: Place[] = [];
  if (segment === 0) places.push({ id, at: a });
  if (segment >= value.points.length - 2) places.push({ id, at: b });
  return places;
}

function verticesOf({ id, a, b }: ShownPiece): Place[] {
  return [
    { id, at: a },
    { id, at: b },
  ];
}

function nearestOf(places: readonly Place[], at: SheetPx, reach: number): Found | null {
  let best: Found | null = null;
  for (const place of places) {
    const distance = Math.hypot(place.at[0] - at[0], place.at[1] - at[1]);
    if (distance <= reach && (best === null || distance < best.distance)) best = { ...place, distance };
  }
  return best;
}
