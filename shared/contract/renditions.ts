import * as z from 'zod/mini';
import { id, personRef, timestamp } from './common.ts';
import { MAX_SHEET_PX, MAX_SPECK_PX } from './limits.ts';

const pixel = z.number().check(z.gte(-MAX_SHEET_PX), z.lte(MAX_SHEET_PX));
const corner = z.tuple([pixel, pixel]);
const tone = z.number().check(z.int(), z.gte(0), z.lte(255));

/** What is done to a sheet's picture. Geometry first: corners, then the turn, then the crop; then the tones, as listed. */
export const renditionSettings = z.object({
  /** Corners of what was a rectangle, in base-raster pixels: top left, top right, bottom right, bottom left. */
  corners: z.nullable(z.tuple([corner, corner, corner, corner])),
  /** Clockwise turn of the picture in degrees. */
  turnDeg: z.number().check(z.gte(-360), z.lte(360)),
  /** What is kept of the turned picture, `[left, top, width, height]` in its pixels; null = all of it. */
  crop: z.nullable(
    z.tuple([
      pixel,
      pixel,
      z.number().check(z.gte(1), z.lte(MAX_SHEET_PX)),
      z.number().check(z.gte(1), z.lte(MAX_SHEET_PX)),
    ]),
  ),
  /** Paper made evenly white: each place divided by the paper's tone about it. */
  whitenPaper: z.boolean(),
  /** Dark specks of up to so many pixels are taken out; 0 = none. */
  specksPx: z.number().check(z.int(), z.gte(0), z.lte(MAX_SPECK_PX)),
  /** Tones that become black and white; what lies between is spread. */
  black: tone,
  white: tone,
  /** Tones below become black, the others white; null = greys and colours stay. */
  threshold: z.nullable(tone),
  invert: z.boolean(),
});
export type RenditionSettings = z.infer<typeof renditionSettings>;

/** A sheet's picture as it was scanned. */
export const AS_SCANNED: RenditionSettings = {
  corners: null,
  turnDeg: 0,
  crop: null,
  whitenPaper: false,
  specksPx: 0,
  black: 0,
  white: 255,
  threshold: null,
  invert: false,
};

const entry = z.number();
/** A projective map row by row, from pixels of a rendition to those of the base raster. */
export const toBaseMap = z.tuple([entry, entry, entry, entry, entry, entry, entry, entry, entry]);

export const pictureTiles = z.object({
  rendition: z.string(),
  tileSizePx: z.number(),
  maxZoom: z.number(),
  format: z.enum(['png', 'jpeg', 'webp']),
});

/** The cleaned-up picture that a sheet is shown by. */
export const shownPicture = z.object({
  id,
  widthPx: z.number(),
  heightPx: z.number(),
  toBase: toBaseMap,
  tiles: pictureTiles,
});
export type ShownPicture = z.infer<typeof shownPicture>;

export const renditionState = z.enum(['waiting', 'running', 'done', 'refused', 'failed']);
export const renditionDto = z.object({
  id,
  sheetId: id,
  settings: renditionSettings,
  widthPx: z.number(),
  heightPx: z.number(),
  toBase: toBaseMap,
  state: renditionState,
  /** 0 to 1. */
  progress: z.number(),
  /** Why it was refused or failed; empty otherwise. */
  message: z.string(),
  /** True for the one by which the sheet is shown. */
  shown: z.boolean(),
  madeBy: personRef,
  madeAt: timestamp,
});
export type RenditionDto = z.infer<typeof renditionDto>;
/** Newest first. */
export const renditionListDto = z.object({ items: z.array(renditionDto) });

export const renditionInput = z.object({ id, settings: renditionSettings });
/** Which finished rendition the sheet is shown by; null = the picture as it was scanned. */
export const showRenditionInput = z.object({ renditionId: z.nullable(id) });
