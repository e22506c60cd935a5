import { createHash, randomUUID } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { mkdir, rm } from 'node:fs/promises';
import path from 'node:path';
import { pipeline } from 'node:stream/promises';
import type { Request, Response } from 'express';
import multer, { MulterError, type StorageEngine } from 'multer';
import type { AppDeps } from '#server/app-deps.ts';
import { AppError, invalidInput } from '#server/errors/app-error.ts';
import { RenderRefusal } from '#server/imaging/refusal.ts';
import { type FileKind, mediaTypes, sniffFile } from '#server/imaging/sniff.ts';
import { MAX_UPLOAD_BYTES } from '#shared/contract/limits.ts';
import { cleanFileName } from '#shared/text/file-name.ts';

/** A file that has arrived whole, in a place of its own; whoever takes it moves it away. */
export interface ReceivedFile {
  path: string;
  fileName: string;
  kind: FileKind;
  mediaType: string;
  byteSize: number;
  sha256: string;
}

/** A connection that sends nothing for so long has gone. */
const SILENT_MS = 60_000;
/** What a form adds around a file. */
const FORM_BYTES = 64 * 1024;

/**
 * Receives the one file of a form, field `file`, streamed to disk and hashed on the way, and hands it to `use`.
 * Whatever happens, refused, cut off or thrown, nothing is left behind but what `use` moved away.
 */
export async function withReceivedFile<T>(
  deps: Pick<AppDeps, 'config' | 'storage'>,
  req: Request,
  res: Response,
  use: (file: ReceivedFile) => Promise<T>,
): Promise<T> {
  await refuseBeforeReading(deps, req);
  const folder = path.join(deps.config.storageDir, 'incoming');
  await mkdir(folder, { recursive: true });
  req.setTimeout(SILENT_MS, () => req.destroy());
  const file = await receive(req, res, folder);
  try {
    return await use({ ...file, ...(await kindOf(file.path)) });
  } finally {
    await rm(file.path, { force: true });
  }
}

async function refuseBeforeReading({ config, storage }: Pick<AppDeps, 'config' | 'storage'>, req: Request) {
  const announced = Number(req.get('content-length') ?? 0);
  if (announced > MAX_UPLOAD_BYTES + FORM_BYTES) throw tooLarge();
  if ((await storage.freeBytes()) - announced < config.minFreeBytes) {
    throw new AppError(
      'disk-full',
      507,
      'The disk is nearly full',
      'The server has no room for this file. Nothing was kept; tell the administrator and try again later.',
    );
  }
}

type Stored = Omit<ReceivedFile, 'kind' | 'mediaType'>;

async function receive(req: Request, res: Response, folder: string): Promise<Stored> {
  const form = multer({
    storage: hashingStorage(folder),
    limits: { fileSize: MAX_UPLOAD_BYTES, files: 1, fields: 8, fieldSize: 4096, parts: 9 },
    defParamCharset: 'utf8',
  });
  await new Promise<void>((resolve, reject) => {
    form.single('file')(req, res, (error: unknown) => (error ? reject(explained(error)) : resolve()));
  });
  const received = (req.file as (Express.Multer.File & { sha256?: string }) | undefined) ?? null;
  if (!received?.sha256) throw invalidInput([{ path: 'file', message: 'no file was sent' }]);
  const { path: file, originalname, size, sha256 } = received;
  return { path: file, fileName: cleanFileName(originalname), byteSize: size, sha256 };
}

/** Disk storage that hashes what passes, so that a large file is read once. */
function hashingStorage(folder: string): StorageEngine {
  return {
    _handleFile(_req, file, done) {
      const target = path.join(folder, randomUUID());
      const hash = createHash('sha256');
      let size = 0;
      file.stream.on('data', (chunk: Buffer) => {
        hash.update(chunk);
        size += chunk.length;
      });
      pipeline(file.stream, createWriteStream(target, { flags: 'wx' })).then(
        () => done(null, { path: target, size, sha256: hash.digest('hex') } as Partial<Express.Multer.File>),
        async (error: unknown) => {
          await rm(target, { force: true });
          done(error);
        },
      );
    },
    _removeFile(_req, file, done) {
      rm(file.path, { force: true }).then(() => done(null), done);
    },
  };
}

async function kindOf(file: string): Promise<Pick<ReceivedFile, 'kind' | 'mediaType'>> {
  try {
    const kind = await sniffFile(file);
    return { kind, mediaType: mediaTypes[kind] };
  } catch (error) {
    if (!(error instanceof RenderRefusal)) throw error;
    if (error.code === 'empty') throw new AppError('refused-file', 422, 'The file is empty', error.message);
    throw new AppError('unsupported-file', 415, 'This kind of file is not taken', error.message);
  }
}

function explained(error: unknown): unknown {
  if (!(error instanceof MulterError)) {
    const isForm =
      error instanceof Error && /multipart|boundary|unexpected end of form|aborted/i.test(error.message);
    return isForm ? cutOff(error) : error;
  }
  if (error.code === 'LIMIT_FILE_SIZE') return tooLarge();
  return invalidInput([{ path: 'file', message: 'send one file, in the field "file"' }]);
}

const cutOff = (cause: Error) =>
  new AppError(
    'invalid-input',
    400,
    'The upload broke off',
    'The file did not arrive whole. Nothing was kept; upload it again.',
    { cause },
  );

const tooLarge = () =>
  new AppError(
    'too-large',
    413,
    'The file is too large',
    `A file may have up to ${MAX_UPLOAD_BYTES / 1024 / 1024} MB. Split the PDF, or scan the sheet in black and white.`,
  );
