import { writeFile } from 'node:fs/promises';
import { PDFArray, type PDFDocument, PDFName, PDFRawStream, type PDFRef } from 'pdf-lib';
import { nameIn, openStructure, readStructure } from './pdf-structure.ts';

/**
 * What no JPEG can do without, whatever its coding: the marks of its beginning and end, a frame's head and a scan's
 * head for one component (ITU-T T.81, B.2: 2 + 2 + 13 + 10 bytes).
 */
const SHORTEST_JPEG = 27;

/**
 * What stands for a picture without any data: one that no renderer can decode, so that it complains when the page
 * shows it, or nothing, so that what it complains of then is another picture.
 */
export type StandIn = 'undecodable' | 'nothing';

/** Whether a PDF has pictures without any data; false also when the file cannot be read for it. */
export async function hasEmptyPictures(file: string): Promise<boolean> {
  try {
    const document = await openStructure(file);
    // Written anew, an encrypted file would lose what its strings and streams are read by.
    return document !== null && !document.isEncrypted && emptyPictures(document).length > 0;
  } catch {
    return false;
  }
}

/** Writes a copy of a PDF with a stand-in for every picture that has no data. */
export async function writeStandIns(file: string, copyFile: string, standIn: StandIn): Promise<void> {
  const document = await readStructure(file);
  if (!document) throw new Error('the file is too large to be changed');
  for (const ref of emptyPictures(document)) document.context.assign(ref, STAND_INS[standIn](document));
  await writeFile(copyFile, await document.save({ updateFieldAppearances: false }));
}

const STAND_INS: Record<StandIn, (document: PDFDocument) => PDFRawStream> = {
  nothing: ({ context }) =>
    PDFRawStream.of(context.obj({ Type: 'XObject', Subtype: 'Form', BBox: [0, 0, 1, 1] }), new Uint8Array()),
  undecodable: ({ context }) => {
    const size = { Width: 8, Height: 8, BitsPerComponent: 8, ColorSpace: 'DeviceGray' };
    const dict = context.obj({ Type: 'XObject', Subtype: 'Image', Filter: 'DCTDecode', ...size });
    return PDFRawStream.of(dict, new Uint8Array(SHORTEST_JPEG));
  },
};

function emptyPictures(document: PDFDocument): PDFRef[] {
  return document.context
    .enumerateIndirectObjects()
    .filter(([, object]) => object instanceof PDFRawStream && isEmptyPicture(object))
    .map(([ref]) => ref);
}

function isEmptyPicture({ dict, contents }: PDFRawStream): boolean {
  if (nameIn(dict, 'Subtype') !== 'Image') return false;
  const filter = dict.lookup(PDFName.of('Filter'));
  const first = filter instanceof PDFArray ? filter.lookup(0) : filter;
  return contents.length < (first === PDFName.of('DCTDecode') ? SHORTEST_JPEG : 1);
}
