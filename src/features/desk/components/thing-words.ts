import { deskToolText } from '#client/text/desk-tools.ts';
import { crosshairText as text } from '#client/text/keys.ts';
import type { SheetPx } from '#shared/compute/frames.ts';
import { nearestOnLines, nearestVertex } from '#shared/compute/geometry/hit-test.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { entitiesOf } from '#shared/contract/document.ts';
import type { DeskState } from '../model/desk-state.ts';
import { isHidden, placeOf } from '../tools/pick.ts';

type Of = Pick<DeskState, 'document' | 'hiddenKinds' | 'lockedKinds'>;

/** The shown thing at a place in words: a mark before a point of a line before a line; null on bare sheet. */
export function thingWords(state: Of, map: SectionMap | null, at: SheetPx, reach: number): string | null {
  const { document } = state;
  const marks = [
    ...entitiesOf(document, 'readingPoint').map(({ value }) => ({ value, at: placeOf(value, map) })),
    ...entitiesOf(document, 'knownPoint').map(({ value }) => ({ value, at: value.at })),
  ];
  const mark = marks.find(
    (each) =>
      each.at !== null &&
      !isHidden(state, each.value) &&
      Math.hypot(each.at[0] - at[0], each.at[1] - at[1]) <= reach,
  );
  if (mark !== undefined) return text.onMark(mark.value.name);
  const lines = entitiesOf(document, 'line').filter(({ value }) => !isHidden(state, value));
  const shapes = lines.map(({ id, value }) => ({ id, points: value.points }));
  const vertex = nearestVertex(shapes, at, reach);
  const id = vertex?.id ?? nearestOnLines(shapes, at, reach)?.id;
  const line = lines.find((each) => each.id === id)?.value;
  if (line === undefined) return null;
  const number = vertex === null ? null : vertex.index + 1;
  return text.onLine(deskToolText.lineWord(line), number, line.points.length);
}
