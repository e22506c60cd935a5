import { existsSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { BaseTiles } from '#server/imaging/base-tiles.ts';
import { createRenderProcess } from '#server/imaging/render-process.ts';
import type { RenderedRendition } from '#server/imaging/render-types.ts';
import { projectiveInverse, throughPlane } from '#shared/compute/plane-map.ts';
import { renditionGeometry, turnToLevel } from '#shared/compute/renditions/rendition-geometry.ts';
import { AS_SCANNED, type RenditionSettings } from '#shared/contract/renditions.ts';

const SIZE = { widthPx: 1300, heightPx: 900 };
/** Centres of the marks: off whole pixels, near the corners and on both sides of the tiles' edges. */
const MARKS = [
  [120.3, 90.7],
  [1180.2, 130.4],
  [640.5, 450.5],
  [511.9, 512.2],
  [150.6, 800.1],
  [1190.8, 780.3],
] as const;
const RADIUS = 9;
type Grey = { data: Buffer; width: number; height: number };

let folder: string;
const renderer = createRenderProcess();
beforeAll(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), 'tracehead-rendition-'));
});
afterAll(() => {
  renderer.close();
  rmSync(folder, { recursive: true, force: true });
});

/** Round marks with soft edges on paper that darkens to the right, one tone for each colour. */
function marked(paperAt: (x: number) => number, ink: number): Buffer {
  const { widthPx, heightPx } = SIZE;
  const data = Buffer.alloc(widthPx * heightPx * 3);
  for (let y = 0; y < heightPx; y += 1)
    for (let x = 0; x < widthPx; x += 1) {
      const off = Math.min(...MARKS.map(([u, v]) => Math.hypot(x + 0.5 - u, y + 0.5 - v)));
      const cover = Math.min(1, Math.max(0, RADIUS + 0.5 - off));
      const tone = paperAt(x) * (1 - cover) + ink * cover;
      data.fill(Math.round(tone), (y * widthPx + x) * 3, (y * widthPx + x) * 3 + 3);
    }
  return data;
}

let count = 0;
async function baseOf(data: Buffer): Promise<BaseTiles> {
  const file = path.join(folder, `base-${++count}.png`);
  const { widthPx: width, heightPx: height } = SIZE;
  await sharp(data, { raw: { width, height, channels: 3 } })
    .png()
    .toFile(file);
  const outFolder = path.join(folder, `base-${count}-tiles`);
  const sheet = await renderer.renderSheet({ file, kind: 'png', pageNumber: 1, outFolder });
  const { tileSizePx, maxZoom, tileFormat: format } = sheet;
  return { folder: outFolder, ...SIZE, tileSizePx, maxZoom, format };
}

async function cleaned(base: BaseTiles, change: Partial<RenditionSettings>) {
  const settings = { ...AS_SCANNED, ...change };
  const outFolder = path.join(folder, `rendition-${++count}`);
  const made = await renderer.renderRendition({ base, settings, outFolder });
  expect(existsSync(`${outFolder}.tif`)).toBe(false);
  const geometry = renditionGeometry(SIZE, settings)!;
  return { made, geometry, picture: await whole(outFolder, made) };
}

/** The full-size level put together. */
async function whole(outFolder: string, made: RenderedRendition): Promise<Grey> {
  const { widthPx: width, heightPx: height, tileSizePx, maxZoom, tileFormat } = made;
  const picture: Grey = { data: Buffer.alloc(width * height), width, height };
  for (let y = 0; y * tileSizePx < height; y += 1)
    for (let x = 0; x * tileSizePx < width; x += 1) {
      const file = path.join(outFolder, `${maxZoom}`, `${x}_${y}.${tileFormat}`);
      const { data, info } = await sharp(file)
        .toColourspace('b-w')
        .raw()
        .toBuffer({ resolveWithObject: true });
      for (let row = 0; row < info.height; row += 1)
        data.copy(
          picture.data,
          (y * tileSizePx + row) * width + x * tileSizePx,
          row * info.width,
          (row + 1) * info.width,
        );
    }
  return picture;
}

/** Centre of what is dark (or light, where inverted) about a place. */
function centreAbout(picture: Grey, [x, y]: readonly [number, number], paper: number): [number, number] {
  const reach = 2.2 * RADIUS;
  let [sumX, sumY, sum] = [0, 0, 0];
  for (let row = Math.floor(y - reach); row <= y + reach; row += 1)
    for (let column = Math.floor(x - reach); column <= x + reach; column += 1) {
      if (row < 0 || column < 0 || row >= picture.height || column >= picture.width) continue;
      const weight = Math.max(0, Math.abs(paper - picture.data[row * picture.width + column]!) - 20);
      sumX += weight * (column + 0.5);
      sumY += weight * (row + 0.5);
      sum += weight;
    }
  return [sumX / sum, sumY / sum];
}

const level = turnToLevel(MARKS[0], MARKS[1])!;
const corners = [
  [80, 60],
  [1240, 100],
  [1270, 850],
  [40, 830],
] as RenditionSettings['corners'];

describe('a cleaned-up picture', () => {
  let base: BaseTiles;
  beforeAll(async () => {
    base = await baseOf(marked(() => 235, 25));
  });

  it.each<[string, Partial<RenditionSettings>]>([
    ['as it was', {}],
    ['turned by a quarter', { turnDeg: 90 }],
    ['turned by half', { turnDeg: 180 }],
    ['straightened', { turnDeg: level }],
    ['turned far', { turnDeg: -37.3 }],
    ['cropped', { crop: [70, 40, 1200, 820] }],
    ['with four corners made a rectangle', { corners }],
    ['with corners, turned and cropped', { corners, turnDeg: 2.4, crop: [6, 5, 1210, 795] }],
  ])('%s has its marks where the stored transform puts them', async (_, change) => {
    const { made, geometry, picture } = await cleaned(base, change);
    expect([made.widthPx, made.heightPx]).toEqual([geometry.widthPx, geometry.heightPx]);
    const fromBase = projectiveInverse(geometry.toBase);
    for (const mark of MARKS) {
      const [x, y] = throughPlane(fromBase, mark[0], mark[1]);
      const [u, v] = centreAbout(picture, [x, y], 235);
      expect(Math.hypot(u - x, v - y)).toBeLessThan(0.5);
    }
  });

  it('straightened has the line through two marks level to a tenth of a pixel', async () => {
    const { geometry, picture } = await cleaned(base, { turnDeg: level });
    const fromBase = projectiveInverse(geometry.toBase);
    const [first, second] = [MARKS[0], MARKS[1]].map((mark) =>
      centreAbout(picture, throughPlane(fromBase, mark[0], mark[1]), 235),
    );
    expect(Math.abs(first![1] - second![1])).toBeLessThan(0.1);
  });

  it('as it was has every pixel as it was', async () => {
    const { picture, made } = await cleaned(base, {});
    const before = await whole(base.folder, { ...made, tileFormat: base.format as 'png' });
    expect(picture.data.equals(before.data)).toBe(true);
  });

  it('is white beside the sheet', async () => {
    const { picture } = await cleaned(base, { turnDeg: 20 });
    expect(picture.data[0]).toBe(255);
  });

  it('of corners that leave no picture is refused', async () => {
    const backwards = [...(corners ?? [])].reverse() as RenditionSettings['corners'];
    await expect(cleaned(base, { corners: backwards })).rejects.toMatchObject({ code: 'page-size' });
  });

  it('inverted has light marks on dark paper, at the same places', async () => {
    const { picture } = await cleaned(base, { invert: true });
    expect(picture.data[5 * SIZE.widthPx + 5]).toBe(20);
    for (const mark of MARKS) {
      const [u, v] = centreAbout(picture, mark, 20);
      expect(Math.hypot(u - mark[0], v - mark[1])).toBeLessThan(0.5);
    }
  });

  it('of dark paper with a shade is white paper, and black and white over a threshold, at the same places', async () => {
    const shaded = await baseOf(marked((x) => 220 - 0.08 * x, 30));
    const { picture, made } = await cleaned(shaded, { whitenPaper: true, threshold: 150 });
    expect(made.tileFormat).toBe('png');
    expect([...new Set(picture.data)].sort()).toEqual([0, 255]);
    const isNearMark = (x: number, y: number) =>
      MARKS.some(([u, v]) => Math.hypot(x - u, y - v) < RADIUS + 3);
    for (let y = 3; y < SIZE.heightPx; y += 11)
      for (let x = 3; x < SIZE.widthPx; x += 11)
        if (!isNearMark(x, y)) expect(picture.data[y * SIZE.widthPx + x]).toBe(255);
    for (const mark of MARKS) {
      const [u, v] = centreAbout(picture, mark, 255);
      expect(Math.hypot(u - mark[0], v - mark[1])).toBeLessThan(0.5);
    }
  });

  it('without specks keeps its marks and a hair line across the bands', async () => {
    const data = marked(() => 235, 25);
    const dark = (x: number, y: number) =>
      data.fill(10, (y * SIZE.widthPx + x) * 3, (y * SIZE.widthPx + x) * 3 + 3);
    const specks = Array.from({ length: 60 }, (_, i) => [30 + 20 * i, 20 + ((i * 257) % 860)] as const);
    for (const [x, y] of specks) for (const step of [0, 1]) dark(x + step, y);
    for (let y = 0; y < SIZE.heightPx; y += 1) dark(333, y);
    const { picture } = await cleaned(await baseOf(data), { specksPx: 6 });
    const at = (x: number, y: number) => picture.data[y * SIZE.widthPx + x]!;
    const isClear = ([x, y]: readonly [number, number]) =>
      Math.abs(x - 333) > 3 && MARKS.every(([u, v]) => Math.hypot(x - u, y - v) > RADIUS + 4);
    const clear = specks.filter(isClear);
    expect(clear.length).toBeGreaterThan(40);
    for (const [x, y] of clear) expect(at(x, y)).toBeGreaterThan(220);
    for (let y = 0; y < SIZE.heightPx; y += 1) expect(at(333, y)).toBeLessThan(60);
    const [u, v] = centreAbout(picture, MARKS[2], 235);
    expect(Math.hypot(u - MARKS[2][0], v - MARKS[2][1])).toBeLessThan(0.5);
  });

  it('of a large colour scan takes little memory', async () => {
    const file = path.join(folder, 'large.jpg');
    const size = { width: 5_000, height: 4_000 };
    writeFileSync(
      file,
      await sharp({ create: { ...size, channels: 3, background: '#e0d8c0' } })
        .jpeg()
        .toBuffer(),
    );
    const outFolder = path.join(folder, 'large-tiles');
    const sheet = await renderer.renderSheet({ file, kind: 'jpeg', pageNumber: 1, outFolder });
    const { tileSizePx, maxZoom, tileFormat: format } = sheet;
    const tiles = { folder: outFolder, widthPx: 5_000, heightPx: 4_000, tileSizePx, maxZoom, format };
    const settings = { ...AS_SCANNED, turnDeg: 1.3, whitenPaper: true, specksPx: 8 };
    const shares: number[] = [];
    const onProgress = (share: number) => shares.push(share);
    await renderer.renderRendition(
      { base: tiles, settings, outFolder: path.join(folder, 'large-out') },
      { onProgress },
    );
    expect(renderer.peakBytes()).toBeLessThan(700_000_000);
    expect(shares.every((share, i) => i === 0 || share >= shares[i - 1]!)).toBe(true);
    expect(Math.max(...shares)).toBeLessThanOrEqual(1);
  }, 120_000);
});
