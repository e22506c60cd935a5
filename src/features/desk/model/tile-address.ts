import type { SheetDto } from '#shared/contract/drawings.ts';

export type TilePlace = { readonly z: number; readonly x: number; readonly y: number };
export type TileSource = Pick<SheetDto, 'id' | 'tiles'>;

/** Where a tile of a sheet is fetched. */
export function tileAddress({ id, tiles }: TileSource, { z, x, y }: TilePlace): string {
  return `/api/v1/sheets/${id}/tiles/${tiles.rendition}/${z}/${x}_${y}`;
}
