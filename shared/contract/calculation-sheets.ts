import * as z from 'zod/mini';
import { id, personRef, timestamp } from './common.ts';

export const sheetPaper = z.enum(['A4', 'A3']);
export type SheetPaper = z.infer<typeof sheetPaper>;

/** `POST /nets/:netId/calculation-sheets`: asks for a sheet of a revision, or of the net as it stands. */
export const calculationSheetInput = z.object({
  id,
  /** Null for a draft of the net as it stands. */
  revisionId: z.nullable(id),
  paper: sheetPaper,
  /** The office's own number; may stay empty. */
  jobNumber: z.string().check(z.trim(), z.maxLength(60)),
});

export const calculationSheetDto = z.object({
  id,
  revisionId: z.nullable(id),
  paper: sheetPaper,
  jobNumber: z.string(),
  state: z.enum(['waiting', 'done', 'failed']),
  /** Why there is none and what to do; empty otherwise. */
  message: z.string(),
  /** SHA-256 and size of the file once it is made. */
  sha256: z.nullable(z.string()),
  byteSize: z.nullable(z.number()),
  askedBy: personRef,
  askedAt: timestamp,
});
export type CalculationSheetDto = z.infer<typeof calculationSheetDto>;
export const calculationSheetListDto = z.object({ items: z.array(calculationSheetDto) });
