import { createHash, randomUUID } from 'node:crypto';
import { mkdir, rm, writeFile } from 'node:fs/promises';
import path from 'node:path';
import type { AppDeps } from '#server/app-deps.ts';
import { AppError } from '#server/errors/app-error.ts';
import { blankPng } from '#server/imaging/blank-png.ts';
import { createRenderProcess } from '#server/imaging/render-process.ts';
import type { RenderedSheet } from '#server/imaging/render-types.ts';
import { originalKey, tilePrefix } from '#server/storage/storage-keys.ts';

/** A sheet to be made: its id, which its tiles lie under, and its size. */
export interface SheetToMake {
  sheetId: string;
  widthPx: number;
  heightPx: number;
}

/** A white sheet whose file and tiles are in storage, to be entered as a drawing. */
export interface BlankSheet {
  sheetId: string;
  sha256: string;
  byteSize: number;
  sheet: RenderedSheet;
}

/**
 * Makes a white sheet and puts its file and tiles into storage, where they harm nobody if no drawing comes to refer to
 * them. It is drawn by a process of its own, as an uploaded scan is.
 */
export async function storeBlankSheet(
  { config, storage }: Pick<AppDeps, 'config' | 'storage'>,
  { sheetId, widthPx, heightPx }: SheetToMake,
): Promise<BlankSheet> {
  if ((await storage.freeBytes()) < config.minFreeBytes) throw noRoom();
  const folder = path.join(config.storageDir, 'work', randomUUID());
  const renderer = createRenderProcess();
  try {
    await mkdir(folder, { recursive: true });
    const bytes = await blankPng(widthPx, heightPx);
    const file = path.join(folder, 'blank.png');
    await writeFile(file, bytes);
    const outFolder = path.join(folder, '1');
    const sheet = await renderer.renderSheet({ file, kind: 'png', pageNumber: 1, outFolder });
    const sha256 = createHash('sha256').update(bytes).digest('hex');
    await storage.putTree(tilePrefix(sheetId, 'base'), outFolder);
    await storage.putFile(originalKey(sha256), file);
    return { sheetId, sha256, byteSize: bytes.length, sheet };
  } finally {
    renderer.close();
    await rm(folder, { recursive: true, force: true });
  }
}

const noRoom = () =>
  new AppError(
    'disk-full',
    507,
    'The disk is nearly full',
    'The server has no room for another sheet. Nothing was made; tell the administrator and try again later.',
  );
