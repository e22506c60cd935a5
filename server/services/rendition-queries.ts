import { type EntityManager, In } from 'typeorm';
import type * as z from 'zod/mini';
import { RenditionEntity } from '#server/entities/rendition-entity.ts';
import { thumbnailKey, tileKey, tilePrefix } from '#server/storage/storage-keys.ts';
import type { RenditionDto, ShownPicture, toBaseMap } from '#shared/contract/renditions.ts';
import { personRefs } from './person-refs.ts';
import type { TileAddress } from './sheet-files.ts';

const LISTED = 30;
type ToBase = z.output<typeof toBaseMap>;

/** The cleaned-up pictures of a sheet, newest first. */
export async function listRenditions(manager: EntityManager, sheetId: string): Promise<RenditionDto[]> {
  const order = { madeAt: 'DESC', id: 'DESC' } as const;
  return present(manager, await manager.find(RenditionEntity, { where: { sheetId }, order, take: LISTED }));
}

export async function presentRendition(manager: EntityManager, row: RenditionEntity): Promise<RenditionDto> {
  const [dto] = await present(manager, [row]);
  return dto!;
}

async function present(manager: EntityManager, rows: RenditionEntity[]): Promise<RenditionDto[]> {
  const people = await personRefs(
    manager,
    rows.map((row) => row.madeBy),
  );
  return rows.map(
    ({ id, sheetId, settings, widthPx, heightPx, toBase, state, progress, message, ...row }) => ({
      id,
      sheetId,
      settings,
      widthPx,
      heightPx,
      toBase: toBase as ToBase,
      state,
      progress,
      message,
      shown: row.shown,
      madeBy: people.get(row.madeBy) ?? { id: row.madeBy, name: '' },
      madeAt: row.madeAt.toISOString(),
    }),
  );
}

/** The pictures by which sheets are shown, by sheet; a sheet without one is shown as it was scanned. */
export async function shownPictures(
  manager: EntityManager,
  sheetIds: readonly string[],
): Promise<Map<string, ShownPicture>> {
  if (sheetIds.length === 0) return new Map();
  const rows = await manager.findBy(RenditionEntity, { sheetId: In([...sheetIds]), shown: true });
  return new Map(rows.map((row) => [row.sheetId, shownPictureOf(row)]));
}

function shownPictureOf({ id, widthPx, heightPx, toBase, ...row }: RenditionEntity): ShownPicture {
  const tiles = {
    rendition: id,
    tileSizePx: row.tileSizePx ?? 0,
    maxZoom: row.maxZoom ?? 0,
    format: row.tileFormat ?? 'png',
  };
  return { id, widthPx, heightPx, toBase: toBase as ToBase, tiles };
}

const UUID = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/;

/** Where a tile of a finished rendition lies; null when there is none. */
export async function renditionFileKey(
  manager: EntityManager,
  { sheetId, rendition, z, x, y }: TileAddress,
): Promise<{ key: string; mediaType: string } | null> {
  if (!UUID.test(rendition)) return null;
  const row = await manager.findOneBy(RenditionEntity, { id: rendition, sheetId, state: 'done' });
  const { tileSizePx, maxZoom, tileFormat } = row ?? {};
  if (!row || !tileSizePx || !tileFormat || maxZoom == null || z > maxZoom) return null;
  const tilesPerSide = (lengthPx: number) => Math.ceil(lengthPx / 2 ** (maxZoom - z) / tileSizePx);
  if (x >= tilesPerSide(row.widthPx) || y >= tilesPerSide(row.heightPx)) return null;
  const key = tileKey(tilePrefix(sheetId, rendition), z, x, y, tileFormat);
  return { key, mediaType: `image/${tileFormat}` };
}

/** Thumbnail of the picture by which a sheet is shown; null where it is shown as scanned. */
export async function shownThumbnailKey(manager: EntityManager, sheetId: string): Promise<string | null> {
  const row = await manager.findOneBy(RenditionEntity, { sheetId, shown: true });
  return row && thumbnailKey(tilePrefix(sheetId, row.id));
}
