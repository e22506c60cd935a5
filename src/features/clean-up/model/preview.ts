import { planeProduct } from '#shared/compute/plane-map.ts';
import { type PaperTone, paperToneOf, whitenPaper } from '#shared/compute/renditions/paper-tone.ts';
import { type PictureSize, renditionGeometry } from '#shared/compute/renditions/rendition-geometry.ts';
import {
  applyTable,
  endTable,
  levelTable,
  makeGrey,
  type PixelRows,
} from '#shared/compute/renditions/tones.ts';
import type { RenditionSettings } from '#shared/contract/renditions.ts';

/** A sheet in small: its pixels with opacity, as a canvas has them, the paper's tone, and the size of the sheet itself. */
export type SmallSheet = {
  readonly rows: PixelRows;
  readonly whitened: PixelRows;
  readonly paper: PaperTone;
  readonly base: PictureSize;
};
export type PreviewPicture = { readonly rows: PixelRows; readonly full: PictureSize };

/** Pixels along the longer side of a preview. */
const PREVIEW_PX = 1400;

export function smallSheetOf(rows: PixelRows, base: PictureSize): SmallSheet {
  const paper = paperToneOf(rows);
  const whitened = { ...rows, data: rows.data.slice() };
  whitenPaper(whitened, paper, { left: 0, top: 0, widthPx: rows.widthPx, heightPx: rows.heightPx });
  return { rows, whitened, paper, base };
}

/**
 * What the settings make of a sheet, in small: the same steps in the same order as the server takes at full size, but for
 * specks, which are too small to be seen. Null where the settings leave no picture.
 */
export function previewOf(sheet: SmallSheet, settings: RenditionSettings): PreviewPicture | null {
  const geometry = renditionGeometry(sheet.base, settings);
  if (geometry === null) return null;
  const { widthPx, heightPx } = geometry;
  const out = Math.min(1, PREVIEW_PX / Math.max(widthPx, heightPx));
  const source = settings.whitenPaper ? sheet.whitened : sheet.rows;
  const down = source.widthPx / sheet.base.widthPx;
  const small = planeProduct(
    [down, 0, 0, 0, down, 0, 0, 0, 1],
    planeProduct(geometry.toBase, [1 / out, 0, 0, 0, 1 / out, 0, 0, 0, 1]),
  );
  const width = Math.max(1, Math.round(widthPx * out));
  const height = Math.max(1, Math.round(heightPx * out));
  const rows = sampled(source, small, width, height);
  applyTones(rows, settings);
  return { rows, full: { widthPx, heightPx } };
}

/** Greys, levels, threshold and inversion, in place. */
export function applyTones(rows: PixelRows, settings: RenditionSettings): void {
  if (settings.threshold !== null) makeGrey(rows);
  applyTable(rows, levelTable(settings));
  applyTable(rows, endTable(settings));
}

/** The nearest pixel of the source: a preview is drawn anew with each step of a slider. */
function sampled(
  source: PixelRows,
  [a, b, c, d, e, f, g, h, i]: ReturnType<typeof planeProduct>,
  widthPx: number,
  heightPx: number,
): PixelRows {
  const into = new Uint8ClampedArray(widthPx * heightPx * 4).fill(255);
  for (let y = 0; y < heightPx; y += 1)
    for (let x = 0; x < widthPx; x += 1) {
      const [u, v] = [x + 0.5, y + 0.5];
      const w = g * u + h * v + i;
      const column = Math.floor((a * u + b * v + c) / w);
      const row = Math.floor((d * u + e * v + f) / w);
      if (column < 0 || row < 0 || column >= source.widthPx || row >= source.heightPx) continue;
      const from = (row * source.widthPx + column) * 4;
      const at = (y * widthPx + x) * 4;
      into[at] = source.data[from]!;
      into[at + 1] = source.data[from + 1]!;
      into[at + 2] = source.data[from + 2]!;
    }
  return { data: into, widthPx, heightPx, channels: 4 };
}
