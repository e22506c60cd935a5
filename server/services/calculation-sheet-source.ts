import type { EntityManager } from 'typeorm';
import type { CalculationSheetEntity } from '#server/entities/calculation-sheet-entity.ts';
import { SheetEntity } from '#server/entities/drawing-entity.ts';
import { ENGINE_VERSION } from '#shared/compute/engine-version.ts';
import type { SheetSource } from '#shared/text/calculation-sheet/content.ts';
import { revisionSource } from '#shared/text/calculation-sheet/revision-source.ts';
import { readDocument } from './net-document.ts';
import { drawersOfNet } from './net-drawers.ts';
import { placeOfNet } from './net-place.ts';
import { notesOfNet } from './note-queries.ts';
import { reviewOf } from './review-queries.ts';
import { openRevision, revisionSummaryOf } from './revision-queries.ts';
import { readingOf } from './schedule-queries.ts';

/** What a calculation sheet is made from, with the sheet of the drawing that lies below the traces. */
export interface SheetMaterial {
  source: SheetSource;
  sheet: SheetEntity;
  /** The moment the sheet speaks of. */
  madeAt: Date;
}

type Asked = Pick<CalculationSheetEntity, 'netId' | 'revisionId' | 'jobNumber'>;

/**
 * Gathers a sheet's material: the frozen payload of a revision, or the net as it stands.
 * @throws AppError not-found; internal for a damaged record; net-unfinished for a net that cannot be read in time
 */
export function sheetMaterial(manager: EntityManager, asked: Asked, now: Date): Promise<SheetMaterial> {
  return asked.revisionId === null
    ? draftMaterial(manager, asked, now)
    : revisionMaterial(manager, asked.revisionId, asked.jobNumber);
}

async function revisionMaterial(
  manager: EntityManager,
  revisionId: string,
  jobNumber: string,
): Promise<SheetMaterial> {
  const { row, payload } = await openRevision(manager, revisionId);
  const summary = await revisionSummaryOf(manager, revisionId);
  const review = await reviewOf(manager, row);
  const notes = await notesOfNet(manager, row.netId);
  return {
    sheet: await manager.findOneByOrFail(SheetEntity, { id: payload.sheet.id }),
    madeAt: new Date(summary.decision?.decidedAt ?? payload.sentAt),
    source: revisionSource({ payload, hash: row.payloadHash, summary, review, notes, jobNumber }),
  };
}

async function draftMaterial(
  manager: EntityManager,
  { netId, jobNumber }: Asked,
  now: Date,
): Promise<SheetMaterial> {
  const place = await placeOfNet(manager, netId);
  const { dam, drawing, section, sheet, net } = place;
  const drawn = await drawersOfNet(manager, netId);
  return {
    sheet,
    madeAt: now,
    source: {
      status: { kind: 'draft', at: now.toISOString() },
      jobNumber,
      dam,
      drawing,
      section,
      pageNumber: sheet.pageNumber,
      netName: net.name,
      document: await readDocument(manager, place),
      reading: await readingOf(manager, place),
      engineVersion: ENGINE_VERSION,
      drawnBy: drawn.map((person) => person.name),
      notes: await notesOfNet(manager, netId),
    },
  };
}
