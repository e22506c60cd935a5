import type { EntityManager } from 'typeorm';
import { ReviewRecordEntity } from '#server/entities/review-entity.ts';
import { blindedDocument } from '#shared/compute/blinded-document.ts';
import { singleInputs } from '#shared/compute/single-inputs.ts';
import type { BlindView } from '#shared/contract/review.ts';
import { areFiguresKeptBack } from './figures-kept-back.ts';
import { placeOfNet } from './net-place.ts';
import { openRevision } from './revision-queries.ts';
import { presentSheet } from './sheet-presenter.ts';

/** What a reviewer sees who may still read blind; null for everybody else, who reads the revision itself. */
export async function blindViewOf(
  manager: EntityManager,
  revisionId: string,
  personId: string,
): Promise<BlindView | null> {
  if (!(await areFiguresKeptBack(manager, revisionId, personId))) return null;
  const { row, payload } = await openRevision(manager, revisionId);
  const { dam, drawing, section, document, reading } = payload;
  const { sheet } = await placeOfNet(manager, row.netId);
  const { headwater, tailwater, gammaW } = singleInputs(document).water;
  const placesShown = (await placesShownAt(manager, revisionId, personId)) !== null;
  return {
    revisionId,
    label: payload.label,
    netId: payload.netId,
    netName: payload.netName,
    dam: { id: dam.id, name: dam.name },
    drawing: { id: drawing.id, number: drawing.number, revision: drawing.revision },
    section: { name: section.name, chainage: section.chainage },
    pageNumber: payload.sheet.pageNumber,
    sentBy: payload.sentBy,
    sentAt: payload.sentAt,
    sheet: presentSheet(sheet),
    document: blindedDocument(document),
    setOut: reading.setOut,
    points: reading.points.map(({ id, name, sheetAt }) => ({ id, name, at: placesShown ? sheetAt : null })),
    placesShown,
    levels: { headwater, tailwater, gammaW },
    asked: payload.blindFirst === true,
    figuresMailed: figuresMailedWith(payload),
  };
}

/** The mail of a revision tells its figures unless a blind reading was asked for. */
export const figuresMailedWith = ({ blindFirst }: { blindFirst: boolean | null }) => blindFirst !== true;

/** When a reviewer asked to see where the engineer's points lie; null when they have not. */
export async function placesShownAt(
  manager: EntityManager,
  revisionId: string,
  personId: string,
): Promise<Date | null> {
  const shown = await manager.findOneBy(ReviewRecordEntity, { revisionId, personId, kind: 'placesShown' });
  return shown?.at ?? null;
}
