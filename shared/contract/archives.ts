import * as z from 'zod/mini';
import { id, personRef, timestamp } from './common.ts';

/** Name and version of the archive of a whole dam; a change of what its entries mean is a new version. */
export const ARCHIVE_FORMAT = 'tracehead/dam-archive';
export const ARCHIVE_VERSION = 1;

const sha256 = z.string().check(z.regex(/^[0-9a-f]{64}$/));
const bytes = z.number().check(z.int(), z.nonnegative());

/**
 * `manifest.json`, the last entry of an archive: what it is of, what made it, and size and hash of every other entry.
 * Restoring holds every entry against it before anything is written.
 */
export const archiveManifest = z.object({
  format: z.literal(ARCHIVE_FORMAT),
  version: z.literal(ARCHIVE_VERSION),
  madeAt: timestamp,
  dam: z.object({ id, name: z.string() }),
  /** Version of the nets' documents, which has to be the one of the installation that restores. */
  documentVersion: z.number(),
  engineVersion: z.string(),
  entries: z.array(z.object({ name: z.string(), byteSize: bytes, sha256 })),
});
export type ArchiveManifest = z.infer<typeof archiveManifest>;

/** Somebody whom the rows of an archive name: who it was, and nothing by which one could sign in. */
export const archivedPerson = z.object({ id, name: z.string(), email: z.string() });
export type ArchivedPerson = z.infer<typeof archivedPerson>;

/** What a restored archive came to. */
export const restoredDto = z.object({
  damId: id,
  name: z.string(),
  rows: z.number(),
  files: z.number(),
  /** Drawings whose tiles are made again in the background. */
  drawings: z.number(),
  /** Made without a password, to be let in by the administrator. */
  peopleMade: z.array(personRef),
});
export type RestoredDto = z.infer<typeof restoredDto>;
