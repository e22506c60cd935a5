import { indexLines, type LineIndex } from '#shared/compute/geometry/line-index.ts';
import { type LineEnd, nearestOnPieces, type Piece } from '#shared/compute/geometry/near-places.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { entitiesOf, type FlowNetDocument, type TracedLine } from '#shared/contract/document.ts';
import { isHidden, reachOf } from './pick.ts';
import type { ToolContext } from './tool-types.ts';

type Traced = { readonly id: string; readonly value: TracedLine };
type Indexed = { readonly lines: readonly Traced[]; readonly index: LineIndex };

/** Kept for each state of the document: a pointer asks many times between two changes. */
const kept = new WeakMap<FlowNetDocument['entities'], Indexed>();

function indexed({ document }: ToolContext): Indexed {
  const known = kept.get(document.entities);
  if (known !== undefined) return known;
  const lines = entitiesOf(document, 'line');
  const made = { lines, index: indexLines(lines.map(({ value }) => value.points)) };
  kept.set(document.entities, made);
  return made;
}

/** A piece of a shown line with the line itself, and which of its points it lies between. */
export type ShownPiece = Piece<string> & {
  readonly value: TracedLine;
  readonly segment: number;
};

/** Pieces of shown lines within `reach` of a place, sheet pixels; `except` leaves a line out. */
export function piecesNear(
  context: ToolContext,
  at: Pair,
  reach: number,
  except: string | null,
): ShownPiece[] {
  const { lines, index } = indexed(context);
  return index.near(at, reach).flatMap(({ line, segment, a, b }) => {
    const { id, value } = lines[line]!;
    return id === except || isHidden(context, value) ? [] : [{ id, value, segment, a, b }];
  });
}

/** Both ends of each shown line that has a direction there. */
export function shownEnds(context: ToolContext, except: string | null): LineEnd<string>[] {
  return indexed(context).lines.flatMap(({ id, value }) => {
    const { points } = value;
    if (id === except || points.length < 2 || isHidden(context, value)) return [];
    return [
      { id, at: points[0]!, inward: points[1]! },
      { id, at: points.at(-1)!, inward: points.at(-2)! },
    ];
  });
}

/** The shown line nearest to a place within reach; null when there is none. */
export function shownLineAt(context: ToolContext, at: Pair): string | null {
  const reach = reachOf(context);
  return nearestOnPieces(piecesNear(context, at, reach, null), at, reach)?.id ?? null;
}
