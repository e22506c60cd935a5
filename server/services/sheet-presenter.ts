import type { SheetEntity } from '#server/entities/drawing-entity.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';
import type { ShownPicture } from '#shared/contract/renditions.ts';

/** A sheet as the client sees it. `shown`: the cleaned-up picture by which it is shown; without one it is as scanned. */
export function presentSheet(sheet: SheetEntity, shown?: ShownPicture): SheetDto {
  const { id, pageNumber, widthPx, heightPx, dpi, note } = sheet;
  const { rendition, tileSizePx, maxZoom, tileFormat: format } = sheet;
  const ready = sheet.readyZoom === null ? {} : { readyZoom: sheet.readyZoom };
  const tiles = { rendition, tileSizePx, maxZoom, ...ready, format };
  const drawn = sheet.isDrawn ? { isDrawn: true } : {};
  return { id, pageNumber, widthPx, heightPx, dpi, ...drawn, ...(shown && { shown }), note, tiles };
}
