import type { RenditionSettings } from '#shared/contract/renditions.ts';
import type { BaseTiles } from './base-tiles.ts';
import type { RefusalCode } from './refusal.ts';
import type { FileKind } from './sniff.ts';

export type TileFormat = 'png' | 'jpeg';

/** One page as the header tells it, before anything is drawn. */
export interface ProbedPage {
  pageNumber: number;
  /** Upright size, after EXIF, TIFF or PDF rotation, in pixels of a scan or points (1/72 inch) of a PDF. */
  width: number;
  height: number;
  unit: 'px' | 'pt';
  /** Dots per inch as the file states them; null when it states none that can be true, and for a PDF. */
  dpi: number | null;
  /** Why this page cannot be drawn; null when nothing in its header speaks against it. */
  refusal: RefusalInfo | null;
}

export interface RefusalInfo {
  code: RefusalCode;
  message: string;
}

export interface ProbeResult {
  kind: FileKind;
  pages: ProbedPage[];
}

export interface RenderRequest {
  file: string;
  kind: FileKind;
  /** From 1. */
  pageNumber: number;
  /** Not there yet; afterwards it holds `<z>/<x>_<y>.<format>` and `thumbnail.webp`. */
  outFolder: string;
  /** Dots per inch for a PDF page instead of the chosen one. */
  dpi?: number;
}

export interface RenderedSheet {
  widthPx: number;
  heightPx: number;
  dpi: number | null;
  tileFormat: TileFormat;
  tileSizePx: number;
  /** Level 0 is the whole sheet in one tile, this one the full size. */
  maxZoom: number;
  /** A sentence when the sheet was drawn reduced; empty otherwise. */
  note: string;
  /** True for a page of vectors, whose `dpi` could have been another. */
  isDrawn?: boolean;
}

/** The coarse levels of a sheet, to be looked at while the whole of it is being drawn. */
export interface FirstView extends RenderedSheet {
  /** Holds levels 0 to `readyZoom`, as the whole pyramid will. */
  folder: string;
  readyZoom: number;
}

/** What a rendering tells while it is under way. */
export interface RenderReport {
  progress(share: number): void;
  firstView(view: FirstView): void;
}

/** A cleaned-up picture of a sheet that is to be made of its base tiles. */
export interface RenditionRequest {
  base: BaseTiles;
  settings: RenditionSettings;
  /** Not there yet; afterwards as that of a sheet. */
  outFolder: string;
}

export type RenderedRendition = Omit<RenderedSheet, 'dpi' | 'note'>;

/** From the parent to the rendering process. */
export type RenderOrder =
  | { id: number; kind: 'probe'; file: string }
  | { id: number; kind: 'render'; request: RenderRequest }
  | { id: number; kind: 'rendition'; request: RenditionRequest };

/** From the rendering process to the parent. */
export type RenderAnswer =
  | { id: number; kind: 'progress'; share: number }
  | { id: number; kind: 'firstView'; view: FirstView }
  | { id: number; kind: 'probed'; result: ProbeResult }
  | { id: number; kind: 'rendered'; result: RenderedSheet }
  | { id: number; kind: 'renditionMade'; result: RenderedRendition }
  | { id: number; kind: 'refused'; refusal: RefusalInfo }
  | { id: number; kind: 'failed'; message: string };
