import { DamEntity } from '#server/entities/dam-entity.ts';
import { DrawingEntity, SheetEntity } from '#server/entities/drawing-entity.ts';
import { conflict, notFound } from '#server/errors/app-error.ts';
import type { BlankSheet } from '#server/http/blank-sheet.ts';
import type { Actor } from '#server/http/route-record.ts';
import { writeEvent } from './event-writer.ts';
import type { ServiceDeps } from './service-deps.ts';

/** Drawings without a scan. Runs in a transaction of the caller. */
export function createBlankDrawingService({
  manager,
  clock,
  live,
}: Pick<ServiceDeps, 'manager' | 'clock' | 'live'>) {
  return {
    /** Enters a drawing of one empty sheet, whose file and tiles are in storage already. */
    async enter(
      damId: string,
      drawingId: string,
      { sheetId, sha256, byteSize, sheet }: BlankSheet,
      dpi: number | null,
      actor: Actor,
    ): Promise<void> {
      const dam = await manager.findOneBy(DamEntity, { id: damId });
      if (!dam) throw notFound();
      if (dam.archivedAt) throw putAway();
      const createdAt = clock.now();
      const fileName = `empty sheet ${sheet.widthPx} × ${sheet.heightPx} px.png`;
      await manager.insert(DrawingEntity, {
        id: drawingId,
        damId,
        sha256,
        byteSize: String(byteSize),
        fileName,
        mediaType: 'image/png',
        title: 'Net without a scan',
        source: 'Empty sheet, made for a net from a file',
        uploadedBy: actor.id,
        uploadedAt: createdAt,
      });
      const own = { id: sheetId, drawingId, pageNumber: 1, rendition: 'base', createdAt };
      await manager.insert(SheetEntity, { ...sheet, ...own, dpi });
      const event = { damId, drawingId, personId: actor.id };
      await writeEvent(manager, { ...event, type: 'drawing.uploaded', text: `made ${fileName}` });
      await live.publish(manager, { type: 'drawing', damId, drawingId });
    },
  };
}

const putAway = () =>
  conflict('conflict', 'This dam is put away', 'Bring the dam back before you make a drawing on it.');
