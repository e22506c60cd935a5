import type { TiffPage } from './tiff-directory.ts';

export interface PixelSize {
  widthPx: number;
  heightPx: number;
}

/** A smaller difference is the rounding of a resolution, not the shape of a pixel. */
const TOLERANCE = 0.01;
/** The coarsest fax has 204 × 98 dots per inch; beyond this the tags are wrong. */
const MOST = 4;

/**
 * How many times higher than wide a page's pixels are, as stored, before it is set upright; 1 when square or not
 * stated. Fax machines scan 204 × 98 or 204 × 196 dots per inch, and a sheet shown with square pixels then would be
 * pressed flat, and every elevation read off it wrong.
 */
export function pixelHeightRatio(page: TiffPage | undefined): number {
  const [across, down] = page?.resolution ?? [0, 0];
  if (!(across > 0 && down > 0)) return 1;
  const ratio = across / down;
  if (Math.abs(ratio - 1) <= TOLERANCE || ratio > MOST || ratio < 1 / MOST) return 1;
  return ratio;
}

/** Size with square pixels: the coarser direction is stretched, so that nothing is lost. `ratio` as shown upright. */
export function squaredSize({ widthPx, heightPx }: PixelSize, ratio: number): PixelSize {
  if (ratio > 1) return { widthPx, heightPx: Math.round(heightPx * ratio) };
  return { widthPx: Math.round(widthPx / ratio), heightPx };
}
