import { useEffect, useState } from 'react';
import { v7 as newUuid } from 'uuid';
import type { DeskStore } from '#client/features/desk/model/desk-state.ts';
import type { TypedPoint, TypedReading } from '#client/features/revisions/components/blind-typed.ts';
import { parseTypedNumber } from '#client/lib/parse-number.ts';
import { blindText as text } from '#client/text/check-work.ts';
import { sectionPt } from '#shared/compute/frames.ts';
import { fittedMap } from '#shared/compute/set-out.ts';
import { type DocumentEntity, entitiesOf, type SheetPoint, UNSAID } from '#shared/contract/document.ts';
import type { BlindView } from '#shared/contract/review.ts';

/**
 * Shows on the sheet where the reviewer has placed points, and where the engineer's lie once that was asked for: as points
 * of the page's own copy of the document, which goes nowhere.
 */
export function useBlindMarks(store: DeskStore, view: BlindView, typed: TypedReading): void {
  const [engineers] = useState(() => new Map(view.points.map(({ id }) => [id, newUuid()])));
  useEffect(() => {
    const marks = new Map<string, DocumentEntity>();
    view.points.forEach(({ id, name, at }, order) => {
      const own = placeOf(view, typed.points[id]);
      const words = name || text.unnamed;
      const drawn = engineers.get(id);
      if (at !== null && drawn) marks.set(drawn, mark(words, at, order));
      if (own !== null) marks.set(id, mark(at === null ? words : text.own(words), own, order));
    });
    const shown = entitiesOf(store.getState().document, 'readingPoint').map(({ id }) => id);
    store.replay([
      ...shown
        .filter((id) => !marks.has(id))
        .map((entityId) => ({ op: 'remove' as const, entityId, baseVersion: 0 })),
      ...[...marks].map(([entityId, value]) => ({ op: 'put' as const, entityId, value, baseVersion: 0 })),
    ]);
  }, [store, view, typed, engineers]);
}

const mark = (name: string, at: SheetPoint, order: number): DocumentEntity => ({
  kind: 'readingPoint',
  ...UNSAID.readingPoint,
  name,
  place: { on: 'sheet', at },
  order,
});

/** Where it was pressed, or where offset and elevation put it. */
function placeOf({ document }: BlindView, point: TypedPoint | undefined): SheetPoint | null {
  if (point === undefined) return null;
  if (point.sheetAt !== null) return point.sheetAt;
  const [offset, elevation] = [parseTypedNumber(point.offset), parseTypedNumber(point.elevation)];
  const map = fittedMap(document);
  if (map === null || offset === null || elevation === null) return null;
  const [x, y] = map.toSheet(sectionPt(offset, elevation));
  return [x, y];
}
