import sharp, { type Sharp } from 'sharp';
import { seededRandom } from './seeded-random.ts';

const PAPER = { r: 239, g: 232, b: 214 };

/** Grain, a fold's shadow and specks of dirt, as one grey layer (128 = leave the paper as it is). */
function grain(width: number, height: number, seed: number): Buffer {
  const random = seededRandom(seed);
  const pixels = Buffer.alloc(width * height);
  const fold = width * 0.51;
  for (let y = 0; y < height; y += 1)
    for (let x = 0; x < width; x += 1) {
      const shadow = 16 * Math.exp(-(((x - fold) / 12) ** 2)) + 10 * (Math.abs(y / height - 0.5) * 2) ** 4;
      pixels[y * width + x] = 128 - shadow + (random() - 0.5) * 60;
    }
  for (let speck = 0; speck < 1200; speck += 1) {
    const at = Math.floor(random() * width * (height - 1));
    const tone = 10 + Math.floor(random() * 60);
    // Most specks are one grain; every fourth is a smudge of two by two.
    for (const neighbour of speck % 4 === 0 ? [0, 1, width, width + 1] : [0]) pixels[at + neighbour] = tone;
  }
  return pixels;
}

/**
 * A drawing in SVG as a scanner would give it: paper tone, grain, fold, specks, ink softened by the optics.
 * Grain is made at half the resolution, which is coarse enough to look like paper and quick to make.
 */
export async function scanOf(svg: string, widthPx: number, heightPx: number, seed: number): Promise<Sharp> {
  const [grainWidth, grainHeight] = [Math.ceil(widthPx / 2), Math.ceil(heightPx / 2)];
  const texture = await sharp(grain(grainWidth, grainHeight, seed), {
    raw: { width: grainWidth, height: grainHeight, channels: 1 },
  })
    .resize(widthPx, heightPx, { kernel: 'linear', fit: 'fill' })
    .png({ compressionLevel: 1 })
    .toBuffer();
  const inked = await sharp({ create: { width: widthPx, height: heightPx, channels: 3, background: PAPER } })
    .composite([{ input: Buffer.from(svg) }, { input: texture, blend: 'overlay' }])
    .removeAlpha()
    .raw()
    .toBuffer();
  return sharp(inked, { raw: { width: widthPx, height: heightPx, channels: 3 } })
    .blur(0.6)
    .withMetadata({ density: 300 });
}
