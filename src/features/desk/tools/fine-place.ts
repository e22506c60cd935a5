import { deskToolText as text } from '#client/text/desk-tools.ts';
import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import type { DocumentEntity, FlowNetDocument } from '#shared/contract/document.ts';
import type { LocalOp } from '../model/document-ops.ts';
import type { Selection } from '../model/selection.ts';

/** The one chosen thing that can be placed finely: a known point, a reading point on the sheet, a vertex. */
export type FinePlace = { readonly id: string; readonly at: SheetPx };

/** Steps of a tenth of a pixel: finer than that a hand cannot tell on a scan. */
const PER_PIXEL = 10;

export function finePlaceOf(document: FlowNetDocument, selection: Selection): FinePlace | null {
  const id = selection.ids.length === 1 ? selection.ids[0] : undefined;
  const value = id === undefined ? undefined : document.entities[id]?.value;
  if (id === undefined || value === undefined) return null;
  if (value.kind === 'knownPoint') return { id, at: sheetPx(...value.at) };
  if (value.kind === 'readingPoint' && value.place.on === 'sheet')
    return { id, at: sheetPx(...value.place.at) };
  const vertex =
    value.kind === 'line' && selection.vertex !== null ? value.points[selection.vertex] : undefined;
  return vertex === undefined ? null : { id, at: sheetPx(...vertex) };
}

/** The chosen thing put at a place, to a tenth of a pixel; null when nothing chosen can be. */
export function finelyPlaced(
  document: FlowNetDocument,
  selection: Selection,
  at: SheetPx,
): { label: string; op: Extract<LocalOp, { op: 'put' }> } | null {
  const place = finePlaceOf(document, selection);
  const value = place === null ? undefined : document.entities[place.id]?.value;
  if (place === null || value === undefined) return null;
  const point: [number, number] = [
    Math.round(at[0] * PER_PIXEL) / PER_PIXEL,
    Math.round(at[1] * PER_PIXEL) / PER_PIXEL,
  ];
  const moved = movedTo(value, selection, point);
  const label =
    value.kind === 'line' ? text.movedVertex(value) : text.movedMark('name' in value ? value.name : '');
  return { label, op: { op: 'put', entityId: place.id, value: moved } };
}

function movedTo(value: DocumentEntity, selection: Selection, point: [number, number]): DocumentEntity {
  if (value.kind === 'knownPoint') return { ...value, at: point };
  if (value.kind === 'readingPoint') return { ...value, place: { on: 'sheet', at: point } };
  if (value.kind === 'line')
    return { ...value, points: value.points.map((p, i) => (i === selection.vertex ? point : p)) };
  return value;
}
