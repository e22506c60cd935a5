import { distancesOf } from '#shared/compute/geometry/edit-lines/cut.ts';
import { segmentAt } from '#shared/compute/geometry/hit-test.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { SheetPoint, TracedLine } from '#shared/contract/document.ts';
import type { LocalOp } from '../model/document-ops.ts';
import type { Selection } from '../model/selection.ts';
import type { Sketch } from '../model/tool-overlay.ts';
import { keptPlace, type Thing } from './edit-things.ts';

/** What an edit of a line would do: shown before the click, carried out by it. */
export type LineEdit = {
  readonly label: string;
  readonly ops: LocalOp[];
  readonly selection: Selection;
  /** What is told afterwards, of notes whose line has changed. */
  readonly notice: string | null;
  readonly sketches: readonly Sketch[];
};

export type Refusal = { readonly refusal: string };
export type EditResult = LineEdit | Refusal;
export type LineThing = Thing<TracedLine>;

export const isRefusal = (result: EditResult): result is Refusal => 'refusal' in result;

/** A line through other points; those it had already are kept as they are, new ones to the hundredth of a pixel. */
export function withPoints(value: TracedLine, points: readonly Pair[]): TracedLine {
  const known = new Set<Pair>(value.points);
  return {
    ...value,
    points: points.map((point) => (known.has(point) ? (point as SheetPoint) : keptPlace(point))),
  };
}

export const lengthOf = (points: readonly Pair[]): number => distancesOf(points).at(-1) ?? 0;

/** True when a place is nearer to the first of two lines than to the second. */
export function isNearer(at: Pair, first: readonly Pair[], second: readonly Pair[]): boolean {
  const away = (points: readonly Pair[]) => segmentAt(points, at, Number.POSITIVE_INFINITY)?.distance ?? 0;
  return away(first) < away(second);
}
