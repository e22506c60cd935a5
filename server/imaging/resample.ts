import { type ProjectiveMap, throughPlane } from '#shared/compute/plane-map.ts';
import type { PixelRows } from '#shared/compute/renditions/tones.ts';
import type { BaseRaster } from './base-tiles.ts';

/** Side of the pieces of a band that are worked on at once, so that the window of the base they need stays small. */
const PIECE_PX = 256;
/** Pixels of the base that one piece may need at once. */
const MOST_SEEN_PX = 16_000_000;
/** What lies beside the sheet: paper. */
const BESIDE = 255;

/**
 * Rows `top` to `top + heightPx` of a picture that `toBase` takes pixel by pixel to the base raster, bilinear between its
 * pixel centres (at + 0.5) and white beside the sheet.
 */
export async function resampledRows(
  base: BaseRaster,
  toBase: ProjectiveMap,
  top: number,
  widthPx: number,
  heightPx: number,
): Promise<PixelRows> {
  const shift = wholeShift(toBase);
  if (shift !== null) return base.window(shift[0], shift[1] + top, widthPx, heightPx);
  const { channels } = base;
  const band: PixelRows = {
    data: new Uint8Array(widthPx * heightPx * channels).fill(BESIDE),
    widthPx,
    heightPx,
    channels,
  };
  for (let y = 0; y < heightPx; y += PIECE_PX)
    for (let x = 0; x < widthPx; x += PIECE_PX) {
      const piece = {
        x,
        y,
        width: Math.min(PIECE_PX, widthPx - x),
        height: Math.min(PIECE_PX, heightPx - y),
      };
      await resamplePiece(band, piece, top, toBase, base);
    }
  return band;
}

/** Whole pixels by which a picture is only cut out of the base raster; null where it is turned or slants. */
function wholeShift([a, b, c, d, e, f, g, h, i]: ProjectiveMap): readonly [x: number, y: number] | null {
  const isShift = a === 1 && b === 0 && d === 0 && e === 1 && g === 0 && h === 0 && i === 1;
  return isShift && Number.isInteger(c) && Number.isInteger(f) ? [c, f] : null;
}

/** A piece that sees very much of the base, far off in a slanting view, is worked on in quarters. */
async function resamplePiece(
  band: PixelRows,
  piece: Piece,
  bandTop: number,
  toBase: ProjectiveMap,
  base: BaseRaster,
): Promise<void> {
  const seen = windowOf(toBase, { ...piece, y: piece.y + bandTop }, base);
  if (seen === null) return;
  if (seen.width * seen.height > MOST_SEEN_PX && piece.width * piece.height > 1) {
    for (const quarter of quartersOf(piece)) await resamplePiece(band, quarter, bandTop, toBase, base);
    return;
  }
  const source = await base.window(seen.left, seen.top, seen.width, seen.height);
  samplePiece(band, piece, bandTop, toBase, source, seen);
}

function quartersOf({ x, y, width, height }: Piece): Piece[] {
  const [left, upper] = [Math.ceil(width / 2), Math.ceil(height / 2)];
  return [
    { x, y, width: left, height: upper },
    { x: x + left, y, width: width - left, height: upper },
    { x, y: y + upper, width: left, height: height - upper },
    { x: x + left, y: y + upper, width: width - left, height: height - upper },
  ].filter((quarter) => quarter.width > 0 && quarter.height > 0);
}

interface Piece {
  x: number;
  y: number;
  width: number;
  height: number;
}

interface Window {
  left: number;
  top: number;
  width: number;
  height: number;
}

/** The pixels of the base that a piece needs; null where it lies wholly beside the sheet. Convex figures stay convex. */
function windowOf(toBase: ProjectiveMap, piece: Piece, base: BaseRaster): Window | null {
  const corners = [
    throughPlane(toBase, piece.x, piece.y),
    throughPlane(toBase, piece.x + piece.width, piece.y),
    throughPlane(toBase, piece.x, piece.y + piece.height),
    throughPlane(toBase, piece.x + piece.width, piece.y + piece.height),
  ];
  const xs = corners.map(([x]) => x);
  const ys = corners.map(([, y]) => y);
  const left = Math.max(0, Math.floor(Math.min(...xs)) - 1);
  const top = Math.max(0, Math.floor(Math.min(...ys)) - 1);
  const right = Math.min(base.widthPx, Math.ceil(Math.max(...xs)) + 1);
  const bottom = Math.min(base.heightPx, Math.ceil(Math.max(...ys)) + 1);
  if (!(right > left) || !(bottom > top)) return null;
  return { left, top, width: right - left, height: bottom - top };
}

function samplePiece(
  band: PixelRows,
  piece: Piece,
  bandTop: number,
  [a, b, c, d, e, f, g, h, i]: ProjectiveMap,
  source: PixelRows,
  seen: Window,
): void {
  const { channels } = band;
  const into = band.data;
  const from = source.data;
  const [lastX, lastY] = [seen.width - 1, seen.height - 1];
  for (let row = 0; row < piece.height; row += 1) {
    const v = bandTop + piece.y + row + 0.5;
    let at = ((piece.y + row) * band.widthPx + piece.x) * channels;
    for (let column = 0; column < piece.width; column += 1, at += channels) {
      const u = piece.x + column + 0.5;
      const w = g * u + h * v + i;
      const x = (a * u + b * v + c) / w - 0.5 - seen.left;
      const y = (d * u + e * v + f) / w - 0.5 - seen.top;
      // A pixel whose centre lies beside the sheet is paper.
      if (!(x >= -0.5 && x <= lastX + 0.5 && y >= -0.5 && y <= lastY + 0.5)) continue;
      const x0 = x <= 0 ? 0 : x >= lastX ? lastX : Math.floor(x);
      const y0 = y <= 0 ? 0 : y >= lastY ? lastY : Math.floor(y);
      const x1 = x0 < lastX ? x0 + 1 : x0;
      const y1 = y0 < lastY ? y0 + 1 : y0;
      const partX = x <= 0 ? 0 : x >= lastX ? 0 : x - x0;
      const partY = y <= 0 ? 0 : y >= lastY ? 0 : y - y0;
      const upper = y0 * seen.width;
      const lower = y1 * seen.width;
      for (let colour = 0; colour < channels; colour += 1) {
        const above =
          from[(upper + x0) * channels + colour]! * (1 - partX) +
          from[(upper + x1) * channels + colour]! * partX;
        const below =
          from[(lower + x0) * channels + colour]! * (1 - partX) +
          from[(lower + x1) * channels + colour]! * partX;
        into[at + colour] = above * (1 - partY) + below * partY + 0.5;
      }
    }
  }
}
