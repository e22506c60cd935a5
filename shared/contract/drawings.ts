import * as z from 'zod/mini';
import { id, personRef, shortText, timestamp } from './common.ts';
import { shownPicture } from './renditions.ts';

export const drawingStage = z.enum(['asBuilt', 'design']);

export const drawingFields = z.object({
  number: shortText,
  title: shortText,
  revision: z.string().check(z.trim(), z.maxLength(20)),
  /** As written on the drawing; often only a year. */
  drawnOn: z.string().check(z.trim(), z.maxLength(40)),
  stage: z.nullable(drawingStage),
  /** Where the file came from: archive, box, roll, who scanned it. */
  source: z.string().check(z.trim(), z.maxLength(500)),
});
export const drawingPatch = z.partial(drawingFields);

export const sheetDto = z.object({
  id,
  pageNumber: z.number(),
  widthPx: z.number(),
  heightPx: z.number(),
  dpi: z.nullable(z.number()),
  /** True for a page of vectors: `dpi` is what it was drawn at, and may be chosen anew. */
  isDrawn: z.optional(z.boolean()),
  tiles: z.object({
    rendition: z.string(),
    tileSizePx: z.number(),
    /** Zoom levels 0 (whole sheet in one tile) to this one (full size). */
    maxZoom: z.number(),
    /** While the sheet is being prepared: the finest level there is. Absent when all are there. */
    readyZoom: z.optional(z.number()),
    format: z.enum(['png', 'jpeg', 'webp']),
  }),
  /** The cleaned-up picture by which the sheet is shown; absent where it is shown as it was scanned. */
  shown: z.optional(shownPicture),
  /** A plain sentence when the sheet was drawn reduced or with damage; empty otherwise. */
  note: z.string(),
});
export type SheetDto = z.infer<typeof sheetDto>;

export const renderState = z.enum(['waiting', 'running', 'done', 'refused', 'failed']);
export const renderJobDto = z.object({
  state: renderState,
  pagesTotal: z.nullable(z.number()),
  pagesDone: z.number(),
  /** 0 to 1 within the page under way. */
  pageProgress: z.number(),
  /** Why it was refused or failed and what to do; empty otherwise. */
  message: z.string(),
});
export type RenderJobDto = z.infer<typeof renderJobDto>;

/** A net as lists show it. */
export const netSummary = z.object({
  id,
  name: z.string(),
  /** Drops of a net that can be read; null while it is not finished, even if a count was stated. */
  drops: z.nullable(z.number()),
  openNotes: z.number(),
  /** Notes in which others wrote what the reader has not seen; absent where there are none. */
  unreadNotes: z.optional(z.number()),
  /** Derived from the ledger: never sent, waiting for a reviewer, accepted, returned. */
  state: z.enum(['draft', 'sent', 'accepted', 'returned']),
  revisionLabel: z.nullable(z.string()),
  /** True when lines, points or levels were changed after the newest revision was frozen. */
  changedSinceRevision: z.optional(z.boolean()),
  reviewer: z.nullable(personRef),
  archivedAt: z.nullable(timestamp),
});
export type NetSummary = z.infer<typeof netSummary>;

export const sectionDto = z.object({
  id,
  sheetId: id,
  name: z.string(),
  /** As written: "212", "0+212", "axis". */
  chainage: z.string(),
  /** Frame on the sheet `[left, top, width, height]` in base-raster pixels; null = the whole sheet. */
  frame: z.nullable(z.tuple([z.number(), z.number(), z.number(), z.number()])),
  calibrated: z.boolean(),
  archivedAt: z.nullable(timestamp),
  nets: z.array(netSummary),
});
export type SectionDto = z.infer<typeof sectionDto>;

export const drawingDto = z.object({
  id,
  damId: id,
  number: z.string(),
  title: z.string(),
  revision: z.string(),
  drawnOn: z.string(),
  stage: z.nullable(drawingStage),
  source: z.string(),
  fileName: z.string(),
  mediaType: z.string(),
  byteSize: z.number(),
  sha256: z.string(),
  uploadedBy: personRef,
  uploadedAt: timestamp,
  archivedAt: z.nullable(timestamp),
  job: renderJobDto,
  sheets: z.array(sheetDto),
  sections: z.array(sectionDto),
});
export type DrawingDto = z.infer<typeof drawingDto>;
export const drawingListDto = z.object({ items: z.array(drawingDto) });
export const drawingListQuery = z.object({ archived: z.optional(z.enum(['yes', 'no'])) });
/** Query of the upload: `again=yes` keeps a second drawing of a file the dam already holds. */
export const uploadQuery = z.object({ again: z.optional(z.enum(['yes'])) });
