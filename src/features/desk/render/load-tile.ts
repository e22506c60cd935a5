import { type TileSource, tileAddress } from '../model/tile-address.ts';
import type { Tile } from './tile-grid.ts';
import type { TilePicture } from './tile-store.ts';

export type LoadedTile = TilePicture & { readonly image: HTMLImageElement };

/** Fetches one tile and decodes it off the main thread. */
export function tileLoader(sheet: TileSource) {
  return async (tile: Tile, signal: AbortSignal): Promise<LoadedTile> => {
    const response = await fetch(tileAddress(sheet, tile), { signal, credentials: 'same-origin' });
    if (!response.ok) throw new Error(`The tile answered ${response.status}.`);
    return decoded(await response.blob());
  };
}

async function decoded(blob: Blob): Promise<LoadedTile> {
  const source = URL.createObjectURL(blob);
  const image = new Image();
  image.alt = '';
  image.draggable = false;
  // Painted late, a tile that was decoded before and let go would flash empty.
  image.decoding = 'sync';
  Object.assign(image.style, { position: 'absolute', maxWidth: 'none', pointerEvents: 'none' });
  image.src = source;
  try {
    await image.decode();
  } catch (error) {
    URL.revokeObjectURL(source);
    throw error;
  }
  return {
    image,
    width: image.naturalWidth,
    height: image.naturalHeight,
    close() {
      image.remove();
      URL.revokeObjectURL(source);
    },
  };
}
