import type { Sharp } from 'sharp';
import { flatShare, LINE_WORK_SHARE } from './flatness.ts';
import type { TileFormat } from './render-types.ts';

const SAMPLE_PX = 1024;

/**
 * PNG for line work, so that nothing is lost; JPEG for what has grain, where PNG would be many times larger. Told
 * from a sample in the middle of an image of this size.
 */
export async function sampledFormat(image: Sharp, widthPx: number, heightPx: number): Promise<TileFormat> {
  const [width, height] = [Math.min(SAMPLE_PX, widthPx), Math.min(SAMPLE_PX, heightPx)];
  const { data, info } = await image
    .extract({
      left: Math.floor((widthPx - width) / 2),
      top: Math.floor((heightPx - height) / 2),
      width,
      height,
    })
    .toColourspace('srgb')
    .raw()
    .toBuffer({ resolveWithObject: true });
  return flatShare(data, info.width, info.channels, info.channels) >= LINE_WORK_SHARE ? 'png' : 'jpeg';
}
