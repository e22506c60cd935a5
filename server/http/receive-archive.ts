import { randomUUID } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { mkdir, rm } from 'node:fs/promises';
import path from 'node:path';
import { pipeline } from 'node:stream/promises';
import type { Request } from 'express';
import type { AppDeps } from '#server/app-deps.ts';
import { AppError } from '#server/errors/app-error.ts';

/** A connection that sends nothing for so long has gone. */
const SILENT_MS = 60_000;

/**
 * Receives an archive as the body of a request, streamed to disk, and hands its path to `use`; nothing of it is left
 * behind. It may be as large as the disk has room for it and for what is restored from it.
 */
export async function withReceivedArchive<T>(
  { config, storage }: Pick<AppDeps, 'config' | 'storage'>,
  req: Request,
  use: (file: string) => Promise<T>,
): Promise<T> {
  const announced = Number(req.get('content-length') ?? 0);
  if ((await storage.freeBytes()) - 2 * announced < config.minFreeBytes)
    throw new AppError(
      'disk-full',
      507,
      'The disk is nearly full',
      'The server has no room for this archive and what is in it. Nothing was kept; tell the administrator.',
    );
  const folder = path.join(config.storageDir, 'incoming');
  await mkdir(folder, { recursive: true });
  const file = path.join(folder, randomUUID());
  req.setTimeout(SILENT_MS, () => req.destroy());
  try {
    await pipeline(req, createWriteStream(file, { flags: 'wx' })).catch((cause: unknown) => {
      const detail = 'The archive did not arrive whole. Nothing was kept; upload it again.';
      throw new AppError('invalid-input', 400, 'The upload broke off', detail, { cause });
    });
    return await use(file);
  } finally {
    await rm(file, { force: true });
  }
}
