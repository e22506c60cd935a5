import { editRefusals } from '#client/text/editing-lines.ts';
import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import { shifted } from '#shared/compute/geometry/edit-lines/shift.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { DocumentEntity, SheetPoint, TracedLine } from '#shared/contract/document.ts';
import { MAX_SHEET_PX } from '#shared/contract/limits.ts';
import type { LocalOp } from '../model/document-ops.ts';
import { keptPoint } from './line-points.ts';
import { isFree } from './pick.ts';
import { rest, type ToolContext, type ToolStep } from './tool-types.ts';

/** A thing of the document with its id. */
export type Thing<T extends DocumentEntity = DocumentEntity> = { readonly id: string; readonly value: T };

/** A step that is refused: nothing changes, and the reason is shown. */
export function refused(reason: string): ToolStep {
  return rest({ do: 'notice', text: reason });
}

/** Why nothing that is chosen may be changed now; null when it may. */
export function refusalToChange(context: ToolContext): string | null {
  if (context.readOnly) return editRefusals.readOnly;
  if (context.draft !== null) return editRefusals.drawing;
  if (context.selection.kind === 'none' || context.selection.kind === 'soil')
    return editRefusals.nothingChosen;
  return chosenThings(context).length === 0 ? editRefusals.locked : null;
}

/** What is chosen and may be picked and changed, in the order of choosing. */
export function chosenThings(context: ToolContext): Thing[] {
  if (context.selection.kind === 'soil') return [];
  return context.selection.ids.flatMap((id) => {
    const value = context.document.entities[id]?.value;
    return value === undefined || !isFree(context, value) ? [] : [{ id, value }];
  });
}

export const isLineThing = (thing: Thing): thing is Thing<TracedLine> => thing.value.kind === 'line';

/** Those of things whose place is on the sheet, moved; a thing typed by its coordinates stays where its figures say. */
export function movedThings(things: readonly Thing[], by: SheetPoint): Thing[] {
  return things.flatMap(({ id, value }) => {
    const moved = movedValue(value, by);
    return moved === null ? [] : [{ id, value: moved }];
  });
}

/** A thing moved by a step in sheet pixels; null for one that was typed by its coordinates. */
export function movedValue(value: DocumentEntity, by: SheetPoint): DocumentEntity | null {
  const move = (points: readonly SheetPoint[]) => shifted(points, by).map(keptPlace);
  if (value.kind === 'line') return { ...value, points: move(value.points) };
  if (value.kind === 'knownPoint') return { ...value, at: move([value.at])[0]! };
  if (value.kind === 'readingPoint' && value.place.on === 'sheet') {
    return { ...value, place: { on: 'sheet', at: move([value.place.at])[0]! } };
  }
  if (value.kind === 'profile' && value.place.on === 'sheet') {
    return { ...value, place: { on: 'sheet', points: move(value.place.points) } };
  }
  return null;
}

/** True when a place of a thing lies farther from the sheet's corner than a document may hold. */
export function isOffTheSheet({ value }: Thing): boolean {
  return placesOf(value).some(([x, y]) => !(Math.abs(x) <= MAX_SHEET_PX && Math.abs(y) <= MAX_SHEET_PX));
}

/** The places on the sheet that a thing is made of; none for one typed by its coordinates. */
export function placesOf(value: DocumentEntity): readonly SheetPoint[] {
  if (value.kind === 'line') return value.points;
  if (value.kind === 'knownPoint') return [value.at];
  if (value.kind === 'readingPoint') return value.place.on === 'sheet' ? [value.place.at] : [];
  return value.kind === 'profile' && value.place.on === 'sheet' ? value.place.points : [];
}

export function putAll(things: readonly Thing[]): LocalOp[] {
  return things.map(({ id, value }) => ({ op: 'put', entityId: id, value }));
}

/** A place to the hundredth of a pixel, as places are kept. */
export const keptPlace = ([x, y]: Pair): SheetPoint => keptPoint(sheetPx(x, y));

/** Where the balloons of the notes about a line stand. */
export function notesAbout(lineId: string, { balloons }: ToolContext): SheetPx[] {
  return balloons.filter((balloon) => balloon.lineId === lineId).map(({ at }) => at);
}
