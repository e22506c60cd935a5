import { type EntityManager, In, IsNull, Not } from 'typeorm';
import { DrawingEntity, RenderJobEntity, SheetEntity } from '#server/entities/drawing-entity.ts';
import { notFound } from '#server/errors/app-error.ts';
import { originalKey } from '#server/storage/storage-keys.ts';
import type { DrawingDto, RenderJobDto, SectionDto, SheetDto } from '#shared/contract/drawings.ts';
import { personRefs } from './person-refs.ts';
import { shownPictures } from './rendition-queries.ts';
import { sectionsOfSheets } from './section-queries.ts';
import { presentSheet } from './sheet-presenter.ts';

/** The drawings of a dam, newest first: those in use, or those put away; with what is new in them to the reader. */
export async function listDrawings(
  manager: EntityManager,
  damId: string,
  archived: boolean,
  readerId: string,
): Promise<DrawingDto[]> {
  const drawings = await manager.find(DrawingEntity, {
    where: { damId, archivedAt: archived ? Not(IsNull()) : IsNull() },
    order: { uploadedAt: 'DESC', id: 'DESC' },
  });
  return present(manager, drawings, readerId);
}

/** @throws AppError not-found */
export async function getDrawing(
  manager: EntityManager,
  drawingId: string,
  readerId: string,
): Promise<DrawingDto> {
  const drawings = await manager.findBy(DrawingEntity, { id: drawingId });
  const [drawing] = await present(manager, drawings, readerId);
  if (!drawing) throw notFound();
  return drawing;
}

/** What serving the original needs: where it lies and what it is called. @throws AppError not-found */
export async function originalOf(
  manager: EntityManager,
  drawingId: string,
): Promise<{ key: string; fileName: string; mediaType: string }> {
  const drawing = await manager.findOneBy(DrawingEntity, { id: drawingId });
  if (!drawing) throw notFound();
  const { fileName, mediaType, sha256 } = drawing;
  return { key: originalKey(sha256), fileName, mediaType };
}

async function present(
  manager: EntityManager,
  drawings: DrawingEntity[],
  readerId: string,
): Promise<DrawingDto[]> {
  if (drawings.length === 0) return [];
  const drawingId = In(drawings.map((drawing) => drawing.id));
  const sheets = await manager.find(SheetEntity, { where: { drawingId }, order: { pageNumber: 'ASC' } });
  const jobs = await manager.findBy(RenderJobEntity, { drawingId });
  const uploaders = drawings.map((drawing) => drawing.uploadedBy);
  const people = await personRefs(manager, uploaders);
  const sections = await sectionsOfSheets(
    manager,
    sheets.map((sheet) => sheet.id),
    readerId,
  );
  const shown = await shownPictures(
    manager,
    sheets.map((sheet) => sheet.id),
  );
  return drawings.map((drawing) => {
    const own = sheets.filter((sheet) => sheet.drawingId === drawing.id);
    return toDto(
      drawing,
      own.map((sheet) => presentSheet(sheet, shown.get(sheet.id))),
      sections.filter((section) => own.some((sheet) => sheet.id === section.sheetId)),
      jobs.find((job) => job.drawingId === drawing.id),
      people.get(drawing.uploadedBy)?.name ?? '',
    );
  });
}

function toDto(
  drawing: DrawingEntity,
  sheets: SheetDto[],
  sections: SectionDto[],
  job: RenderJobEntity | undefined,
  uploaderName: string,
): DrawingDto {
  const { id, damId, number, title, revision, drawnOn, stage, source, fileName, mediaType, sha256 } = drawing;
  return {
    id,
    damId,
    number,
    title,
    revision,
    drawnOn,
    stage,
    source,
    fileName,
    mediaType,
    sha256,
    byteSize: Number(drawing.byteSize),
    uploadedBy: { id: drawing.uploadedBy, name: uploaderName },
    uploadedAt: drawing.uploadedAt.toISOString(),
    archivedAt: drawing.archivedAt?.toISOString() ?? null,
    job: jobDto(job),
    sheets,
    sections,
  };
}

/** A drawing whose sheets were put in place by a script has no job; nothing is waited for. */
function jobDto(job: RenderJobEntity | undefined): RenderJobDto {
  if (!job) return { state: 'done', pagesTotal: null, pagesDone: 0, pageProgress: 0, message: '' };
  const { state, pagesTotal, pagesDone, pageProgress, message } = job;
  return { state, pagesTotal, pagesDone, pageProgress, message };
}
