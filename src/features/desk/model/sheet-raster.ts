import { type ProjectiveMap, projectiveInverse, SAME_PLACE } from '#shared/compute/plane-map.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';

/**
 * The raster by which a sheet is shown: its base raster, or a cleaned-up picture of it. Its pixels are those of its tiles;
 * the sheet's pixels, in which everything is traced, are those of the base raster whatever is shown.
 */
export type SheetRaster = {
  readonly id: string;
  readonly widthPx: number;
  readonly heightPx: number;
  /** Finer ones come while the sheet is being prepared. */
  tiles: SheetDto['tiles'];
  /** Between its pixels and the sheet's; null where they are the same. */
  readonly toBase: ProjectiveMap | null;
  readonly fromBase: ProjectiveMap | null;
};

/** The cleaned-up picture of a sheet, or the sheet as it was scanned where there is none or where that is asked for. */
export function rasterOf(sheet: SheetDto, asScanned: boolean): SheetRaster {
  const { shown, id } = sheet;
  if (shown === undefined || asScanned) {
    const { widthPx, heightPx, tiles } = sheet;
    return { id, widthPx, heightPx, tiles, toBase: null, fromBase: null };
  }
  const { widthPx, heightPx, tiles, toBase } = shown;
  const isSame = toBase.every((entry, index) => entry === SAME_PLACE[index]);
  const maps = isSame ? { toBase: null, fromBase: null } : { toBase, fromBase: projectiveInverse(toBase) };
  return { id, widthPx, heightPx, tiles, ...maps };
}
