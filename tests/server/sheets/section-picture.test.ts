import sharp from 'sharp';
import { describe, expect, it } from 'vitest';
import { MOST_BYTES, pictureSize, scanWidth, sectionPicture } from '#server/sheets/section-picture.ts';
import type { SectionFigure } from '#shared/text/calculation-sheet/section-figure.ts';

/** A sheet of 4,000 × 2,000 px of which the part from (1,000, 500) on is shown. */
const figure: SectionFigure = {
  crop: [1000, 500, 2400, 1200],
  lines: [
    {
      id: 'a',
      kind: 'equipotential',
      label: '104.2',
      points: [
        [2200, 500],
        [2200, 1700],
      ],
    },
    {
      id: 'b',
      kind: 'impervious',
      label: '',
      points: [
        [1000, 1400],
        [3400, 1400],
      ],
    },
  ],
  profiles: [],
  points: [{ name: 'P1', at: [1600, 800] }],
  knownPoints: [],
  scaleBars: [],
  flow: 'right',
};
const grey = (value: (i: number) => number) => {
  const [width, height] = [scanWidth(figure.crop), scanWidth(figure.crop) / 2];
  const data = Buffer.from(Uint8Array.from({ length: width * height }, (_, i) => value(i)));
  return { data, width, height };
};
const paper = () => grey(() => 255);
/** Noise that no JPEG makes small. */
const noise = () => grey((i) => (Math.imul(i ^ (i >> 7), 2654435761) >>> 24) & 255);

async function pixels(jpeg: Buffer) {
  const { data, info } = await sharp(jpeg).raw().toBuffer({ resolveWithObject: true });
  return (x: number, y: number) => {
    const at = (Math.round(y * info.height) * info.width + Math.round(x * info.width)) * info.channels;
    return [...data.subarray(at, at + 3)];
  };
}

describe('the picture of a section', () => {
  it('keeps the shape of the part that it shows, within its greatest size', () => {
    expect(pictureSize([0, 0, 2400, 1200])).toEqual({ width: 600, height: 300 });
    expect(pictureSize([0, 0, 1000, 2000])).toEqual({ width: 260, height: 520 });
    expect(pictureSize([0, 0, 90_000, 10])).toEqual({ width: 600, height: 1 });
  });

  it('has the traces where they lie on the sheet, in their colours, and the scan elsewhere', async () => {
    const { jpeg, widthPx } = await sectionPicture(figure, paper());
    expect(widthPx).toBe(600);
    expect(await sharp(jpeg).metadata()).toMatchObject({ format: 'jpeg', width: 1200, height: 600 });
    const at = await pixels(jpeg);
    const [red = 0, green = 0, blue = 0] = at(0.5, 0.4);
    expect(green).toBeGreaterThan(red + 40);
    expect(blue).toBeGreaterThan(red + 40);
    const brown = at(0.2, 0.75);
    expect(Math.max(...brown)).toBeLessThan(150);
    expect(Math.min(...at(0.8, 0.2))).toBeGreaterThan(240);
    // The ring of the reading point, with paper inside.
    expect(Math.min(...at(0.25, 0.25))).toBeGreaterThan(200);
    const ring = at(0.25 + 4 / 600, 0.25);
    expect(ring[2]).toBeGreaterThan((ring[1] ?? 0) + 30);
  });

  it('is the same file for the same input', async () => {
    const [one, two] = [await sectionPicture(figure, noise()), await sectionPicture(figure, noise())];
    expect(one.jpeg.equals(two.jpeg)).toBe(true);
  });

  it('stays small over the noisiest scan', async () => {
    expect((await sectionPicture(figure, noise())).jpeg.length).toBeLessThanOrEqual(MOST_BYTES);
  });
});
