import { readFile, stat } from 'node:fs/promises';
import { PDFBool, type PDFDict, PDFDocument, PDFName, PDFNumber } from 'pdf-lib';

/** A file is read whole for this, twice over. */
const MAX_FILE_BYTES = 64 * 1024 * 1024;

let lastOpened: { key: string; document: PDFDocument } | null = null;

/**
 * The objects a PDF consists of, undecoded; null when the file is too large to be read this way. Kept for the next
 * call, since the pages of a file are asked for one after the other: change nothing in it.
 * @throws Error when the objects cannot be made out
 */
export async function openStructure(file: string): Promise<PDFDocument | null> {
  const { size, mtimeMs } = await stat(file);
  const key = `${file} ${size} ${mtimeMs}`;
  if (lastOpened?.key === key) return lastOpened.document;
  lastOpened = null;
  const document = await readStructure(file);
  if (document) lastOpened = { key, document };
  return document;
}

/** The same, for the caller alone. @throws Error when the objects cannot be made out */
export async function readStructure(file: string): Promise<PDFDocument | null> {
  if ((await stat(file)).size > MAX_FILE_BYTES) return null;
  return PDFDocument.load(await readFile(file), { ignoreEncryption: true, updateMetadata: false });
}

export function numberIn(dict: PDFDict, key: string, otherwise: number): number {
  const value = dict.lookup(PDFName.of(key));
  if (value instanceof PDFBool) return value.asBoolean() ? 1 : 0;
  return value instanceof PDFNumber ? value.asNumber() : otherwise;
}

export function nameIn(dict: PDFDict, key: string): string | undefined {
  const value = dict.lookup(PDFName.of(key));
  return value instanceof PDFName ? value.decodeText() : undefined;
}
