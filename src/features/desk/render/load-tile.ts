import type { SheetDto } from '#shared/contract/drawings.ts';
import type { Tile } from './tile-grid.ts';

/** Fetches one tile and decodes it off the main thread. */
export function tileLoader(sheet: Pick<SheetDto, 'id' | 'tiles'>) {
  return async (tile: Tile, signal: AbortSignal): Promise<ImageBitmap> => {
    const { rendition } = sheet.tiles;
    const address = `/api/v1/sheets/${sheet.id}/tiles/${rendition}/${tile.z}/${tile.x}_${tile.y}`;
    const response = await fetch(address, { signal, credentials: 'same-origin' });
    if (!response.ok) throw new Error(`The tile answered ${response.status}.`);
    return createImageBitmap(await response.blob());
  };
}
