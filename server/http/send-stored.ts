import { pipeline } from 'node:stream/promises';
import type { Request, Response } from 'express';
import { notFound } from '#server/errors/app-error.ts';
import { StorageError, type StoragePort } from '#server/storage/storage-port.ts';

/**
 * What lies under a key never changes, so a browser may keep it; only for this person, since somebody else at the
 * same proxy may not see the dam.
 */
const KEPT_BY_BROWSER = 'private, max-age=31536000, immutable';

/** Sends a stored file, or the one range that was asked for. The content type has been set by the caller. */
export async function sendStored(
  storage: StoragePort,
  key: string,
  req: Request,
  res: Response,
): Promise<void> {
  const found = await storage.stat(key);
  if (!found) throw notFound('This file is not there. Reload the page.');
  res.setHeader('Cache-Control', KEPT_BY_BROWSER);
  res.setHeader('Accept-Ranges', 'bytes');
  const ranges = req.range(found.byteSize);
  const range =
    Array.isArray(ranges) && ranges.type === 'bytes' && ranges.length === 1 ? ranges[0] : undefined;
  if (ranges === -1) {
    res.status(416).setHeader('Content-Range', `bytes */${found.byteSize}`);
    res.end();
    return;
  }
  const length = range ? range.end - range.start + 1 : found.byteSize;
  if (range)
    res.status(206).setHeader('Content-Range', `bytes ${range.start}-${range.end}/${found.byteSize}`);
  res.setHeader('Content-Length', length);
  const stream = await storage.read(key, range).catch(gone);
  await pipeline(stream, res).catch((error: NodeJS.ErrnoException) => {
    // The reader went away, or panned past the tile before it came.
    if (error.code !== 'ERR_STREAM_PREMATURE_CLOSE') throw error;
  });
}

function gone(error: unknown): never {
  if (error instanceof StorageError && error.fault === 'missing') throw notFound('This file is not there.');
  throw error;
}
