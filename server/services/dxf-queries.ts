import type { EntityManager } from 'typeorm';
import { dxfText } from './dxf-file.ts';
import { readDocument } from './net-document.ts';
import { placeOfNet } from './net-place.ts';
import { openRevision } from './revision-queries.ts';
import { type Download, fileNameOf, readingOf } from './schedule-queries.ts';

/** The traces of a net as it stands. @throws AppError not-found, net-unfinished */
export async function netDxf(manager: EntityManager, netId: string): Promise<Download> {
  const place = await placeOfNet(manager, netId);
  const document = await readDocument(manager, place);
  return { fileName: fileNameOf(place, 'dxf'), text: dxfText(document, await readingOf(manager, place)) };
}

/** The traces of a revision with the heads that were frozen. @throws AppError not-found, net-unfinished, internal */
export async function revisionDxf(manager: EntityManager, revisionId: string): Promise<Download> {
  const { row, payload } = await openRevision(manager, revisionId);
  const place = await placeOfNet(manager, row.netId);
  return {
    fileName: fileNameOf(place, 'dxf').replace(/\.dxf$/, ` revision ${payload.label}.dxf`),
    text: dxfText(payload.document, payload.reading),
  };
}
