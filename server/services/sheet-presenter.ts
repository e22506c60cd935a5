import type { SheetEntity } from '#server/entities/drawing-entity.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';

/** A sheet as the client sees it. */
export function presentSheet(sheet: SheetEntity): SheetDto {
  const { id, pageNumber, widthPx, heightPx, dpi, note } = sheet;
  const { rendition, tileSizePx, maxZoom, tileFormat: format } = sheet;
  const ready = sheet.readyZoom === null ? {} : { readyZoom: sheet.readyZoom };
  const tiles = { rendition, tileSizePx, maxZoom, ...ready, format };
  const drawn = sheet.isDrawn ? { isDrawn: true } : {};
  return { id, pageNumber, widthPx, heightPx, dpi, ...drawn, note, tiles };
}
