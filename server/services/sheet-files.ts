import type { EntityManager } from 'typeorm';
import { SheetEntity } from '#server/entities/drawing-entity.ts';
import { notFound } from '#server/errors/app-error.ts';
import { thumbnailKey, tileKey, tilePrefix } from '#server/storage/storage-keys.ts';
import { renditionFileKey, shownThumbnailKey } from './rendition-queries.ts';

export interface TileAddress {
  sheetId: string;
  rendition: string;
  /** 0 is the whole sheet in one tile. */
  z: number;
  x: number;
  y: number;
}

/** Where a sheet's thumbnail lies. @throws AppError not-found */
export async function thumbnailOf(manager: EntityManager, sheetId: string): Promise<string> {
  const { rendition } = await sheetById(manager, sheetId);
  const shown = await shownThumbnailKey(manager, sheetId);
  return shown ?? thumbnailKey(tilePrefix(sheetId, rendition));
}

/** Where a tile lies; null when the sheet has no such tile. @throws AppError not-found */
export async function sheetFileKey(
  manager: EntityManager,
  { sheetId, rendition, z, x, y }: TileAddress,
): Promise<{ key: string; mediaType: string } | null> {
  const sheet = await sheetById(manager, sheetId);
  if (rendition !== sheet.rendition) return renditionFileKey(manager, { sheetId, rendition, z, x, y });
  if (z > (sheet.readyZoom ?? sheet.maxZoom)) return null;
  const tilesPerSide = (lengthPx: number) =>
    Math.ceil(lengthPx / 2 ** (sheet.maxZoom - z) / sheet.tileSizePx);
  if (x >= tilesPerSide(sheet.widthPx) || y >= tilesPerSide(sheet.heightPx)) return null;
  const key = tileKey(tilePrefix(sheetId, rendition), z, x, y, sheet.tileFormat);
  return { key, mediaType: `image/${sheet.tileFormat}` };
}

async function sheetById(manager: EntityManager, sheetId: string): Promise<SheetEntity> {
  const sheet = await manager.findOneBy(SheetEntity, { id: sheetId });
  if (!sheet) throw notFound();
  return sheet;
}
