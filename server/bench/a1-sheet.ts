import sharp from 'sharp';

/** A1 at 300 dpi, landscape. */
export const A1_PX = { width: 9933, height: 7016 };

/** A sheet of line work as a drawing office made it: frame, contours, hatching, lettering-sized strokes. */
function lineWork(): string {
  const { width, height } = A1_PX;
  const lines: string[] = [`<rect x="120" y="120" width="${width - 240}" height="${height - 240}"/>`];
  for (let index = 0; index < 60; index++) {
    const y = 400 + index * 95;
    const bend = (part: number) => (y + 180 * Math.sin(index / 7 + part)).toFixed(1);
    lines.push(`<path d="M300 ${bend(0)} C 3300 ${bend(1)}, 6600 ${bend(2)}, 9600 ${bend(3)}"/>`);
  }
  for (let index = 0; index < 3000; index++) {
    // Strokes the size of lettering, spread without chance so that each run has the same sheet.
    const [x, y] = [(index * 7919) % (width - 600), (index * 104_729) % (height - 600)];
    lines.push(`<path d="M${x + 300} ${y + 300} l${8 + (index % 9)} 22 l-14 ${9 - (index % 5)}"/>`);
  }
  return `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}">
    <rect width="100%" height="100%" fill="white"/>
    <g fill="none" stroke="black" stroke-width="3">${lines.join('')}</g></svg>`;
}

/** Grey pixels of the sheet; `copy` changes a few of them, so that no two copies are the same file. */
async function pixels(copy: number): Promise<Buffer> {
  const sheet = sharp(Buffer.from(lineWork()), { limitInputPixels: false });
  const grey = await sheet.flatten({ background: 'white' }).greyscale().raw().toBuffer();
  grey.fill(0, 200 * A1_PX.width + 200, 200 * A1_PX.width + 210 + copy * 10);
  return grey;
}

const raw = { raw: { ...A1_PX, channels: 1 as const } };

/** 1 bit, CCITT group 4, as plan scanners write it. */
export async function a1GroupFour(copy: number): Promise<Buffer> {
  return sharp(await pixels(copy), { ...raw, limitInputPixels: false })
    .toColourspace('b-w')
    .tiff({ compression: 'ccittfax4', bitdepth: 1, xres: 300 / 25.4, yres: 300 / 25.4 })
    .toBuffer();
}

/** Colour with a paper's tone and grain, quality 90. */
export async function a1Jpeg(copy: number): Promise<Buffer> {
  const grey = await pixels(copy);
  const rgb = Buffer.alloc(grey.length * 3);
  let grain = 1;
  for (let index = 0; index < grey.length; index++) {
    // A short linear congruence is grain enough and the same every time.
    grain = (grain * 1_103_515_245 + 12_345) & 0x7fffffff;
    const tone = Math.max(0, (grey[index] ?? 0) - 12 - ((grain >> 16) & 15));
    rgb[index * 3] = tone;
    rgb[index * 3 + 1] = Math.max(0, tone - 4);
    rgb[index * 3 + 2] = Math.max(0, tone - 18);
  }
  return sharp(rgb, { raw: { ...A1_PX, channels: 3 }, limitInputPixels: false })
    .withMetadata({ density: 300 })
    .jpeg({ quality: 90 })
    .toBuffer();
}
