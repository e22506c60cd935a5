import { DrawingEntity, SheetEntity } from '#server/entities/drawing-entity.ts';
import { SectionEntity } from '#server/entities/net-entity.ts';
import { RenditionEntity } from '#server/entities/rendition-entity.ts';
import { conflict, notFound } from '#server/errors/app-error.ts';
import type { Actor } from '#server/http/route-record.ts';
import { tilePrefix } from '#server/storage/storage-keys.ts';
import { drawingTitle } from './drawing-title.ts';
import { writeEvent } from './event-writer.ts';
import { createRenderJobService } from './render-job-service.ts';
import type { ServiceDeps } from './service-deps.ts';

/**
 * Asks for a page of vectors to be drawn at another resolution, as long as nothing lies on its sheet: traces are
 * kept in the sheet's pixels. Gives the prefix of the tiles that are of no use any more, once this is committed.
 * @throws AppError not-found, or conflict when the page is a scan, is in use or is being prepared
 */
export async function drawSheetAgain(
  { manager, clock, live, jobs }: ServiceDeps,
  sheetId: string,
  dpi: number,
  actor: Actor,
): Promise<{ drawingId: string; oldTiles: string }> {
  const sheet = await manager.findOneBy(SheetEntity, { id: sheetId });
  if (!sheet) throw notFound();
  const { drawingId, pageNumber } = sheet;
  const drawing = await manager.findOneOrFail(DrawingEntity, {
    where: { id: drawingId },
    lock: { mode: 'pessimistic_write' },
  });
  if (drawing.archivedAt) throw putAway();
  if (!sheet.isDrawn) throw isScan();
  const isUsed =
    (await manager.existsBy(SectionEntity, { sheetId })) ||
    (await manager.existsBy(RenditionEntity, { sheetId }));
  if (isUsed) throw inUse();
  if (!(await createRenderJobService({ manager, clock, live, jobs }).startAtDpi(drawingId, dpi)))
    throw underWay();
  await manager.delete(SheetEntity, { id: sheetId });
  const text = `asked for page ${pageNumber} of ${drawingTitle(drawing)} to be drawn at ${dpi} dots per inch`;
  const { damId } = drawing;
  await writeEvent(manager, { damId, drawingId, personId: actor.id, type: 'drawing.again', text });
  await live.publish(manager, { type: 'drawing', damId, drawingId });
  return { drawingId, oldTiles: tilePrefix(sheetId, sheet.rendition) };
}

const putAway = () =>
  conflict(
    'conflict',
    'This drawing is put away',
    'Bring the drawing back before you change anything in it.',
  );

const isScan = () =>
  conflict(
    'conflict',
    'This page is a scan',
    'It is shown in its own pixels; no other resolution would show more of it.',
  );

const inUse = () =>
  conflict(
    'conflict',
    'Something lies on this sheet',
    'Sections, traces and cleaned-up pictures are kept in the pixels of the sheet. Upload the file once more and choose the resolution before the first section is made.',
  );

const underWay = () =>
  conflict(
    'conflict',
    'The drawing is being prepared',
    'Wait until it is ready, then choose the resolution.',
  );
