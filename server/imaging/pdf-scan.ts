import {
  decodePDFRawStream,
  PDFArray,
  PDFBool,
  PDFDict,
  PDFName,
  PDFNumber,
  type PDFPage,
  PDFRawStream,
} from 'pdf-lib';
import { MAX_PIXELS } from '#shared/contract/limits.ts';
import { lonePicture, type PlacedPicture } from './pdf-content.ts';
import { nameIn, numberIn, openStructure } from './pdf-structure.ts';

const MAX_CONTENT_BYTES = 4 * 1024 * 1024;
/** Finer than this is a picture in a picture, not a scan of paper. */
const MAX_SCAN_DPI = 1200;
/** A scan may miss the page's edge by so much of the page's side. */
const EDGE = 0.005;

/** The picture of a page that is nothing but a scan. */
export interface PageScan {
  data: Uint8Array;
  coding: 'jpeg' | 'fax' | 'flate';
  widthPx: number;
  heightPx: number;
  samples: 1 | 3;
  bits: 1 | 8;
  /** Whether the highest value means black. */
  inverted: boolean;
  /** Quarter turns clockwise that set the page upright. */
  turns: 0 | 1 | 2 | 3;
  dpi: number;
  /** Numbers of the filter's own parameters; absent ones have their defaults. */
  parameter(name: string, otherwise: number): number;
}

/**
 * The scan that a page consists of, undecoded; null when the page shows anything else, or when it is not certain.
 * Taken as it is a scan keeps every pixel, and needs a fraction of the time and memory of drawing it.
 */
export async function findPageScan(file: string, pageNumber: number): Promise<PageScan | null> {
  try {
    const document = await openStructure(file);
    if (!document) return null;
    if (document.isEncrypted) return null;
    const page = document.getPage(pageNumber - 1);
    const placed = hasVisibleNotes(page) ? null : placedPicture(page);
    return placed ? describeScan(page, placed) : null;
  } catch {
    // What this reader cannot make out, the renderer proper decides.
    return null;
  }
}

/** The fax pictures that a page's own resources name; none when the file cannot be read this way. */
export async function findFaxPictures(
  file: string,
  pageNumber: number,
): Promise<Array<Pick<PageScan, 'data' | 'widthPx' | 'heightPx' | 'inverted' | 'parameter'>>> {
  try {
    const document = await openStructure(file);
    if (!document || document.isEncrypted) return [];
    const pictures = document
      .getPage(pageNumber - 1)
      .node.Resources()
      ?.lookupMaybe(PDFName.of('XObject'), PDFDict);
    const streams = pictures?.keys().map((name) => pictures.lookup(name)) ?? [];
    return streams
      .filter((each) => each instanceof PDFRawStream)
      .filter(({ dict }) => nameIn(dict, 'Subtype') === 'Image' && codingOf(dict) === 'fax')
      .map(({ dict, contents: data }) => {
        const size = { widthPx: numberIn(dict, 'Width', 0), heightPx: numberIn(dict, 'Height', 0) };
        return { data, ...size, inverted: false, parameter: parameterOf(dict) };
      });
  } catch {
    return [];
  }
}

/** Links show nothing; every other annotation may. */
function hasVisibleNotes(page: PDFPage): boolean {
  const notes = page.node.Annots()?.asArray() ?? [];
  return notes.some((note) => nameIn(page.doc.context.lookup(note, PDFDict), 'Subtype') !== 'Link');
}

function placedPicture(page: PDFPage): PlacedPicture | null {
  const contents = page.node.Contents();
  const parts = contents instanceof PDFArray ? contents.asArray() : contents ? [contents] : [];
  const streams = parts.map((part) => page.doc.context.lookup(part));
  let content = '';
  for (const stream of streams) {
    if (!(stream instanceof PDFRawStream)) return null;
    content += `${Buffer.from(decodePDFRawStream(stream).decode()).toString('latin1')}\n`;
    if (content.length > MAX_CONTENT_BYTES) return null;
  }
  const states = page.node.Resources()?.lookupMaybe(PDFName.of('ExtGState'), PDFDict);
  return lonePicture(content, (name) =>
    isPlainState(states?.lookupMaybe(PDFName.of(name.slice(1)), PDFDict)),
  );
}

/** A graphics state without transparency, blending or mask. */
function isPlainState(state: PDFDict | undefined): boolean {
  if (!state) return false;
  const opacity = ['ca', 'CA'].map((key) => numberIn(state, key, 1));
  const isNormal = ['Normal', undefined].includes(nameIn(state, 'BM'));
  const isUnmasked = ['None', undefined].includes(
    state.get(PDFName.of('SMask')) ? nameIn(state, 'SMask') : undefined,
  );
  return opacity.every((value) => value === 1) && isNormal && isUnmasked;
}

function describeScan(page: PDFPage, { name, rect }: PlacedPicture): PageScan | null {
  const pictures = page.node.Resources()?.lookup(PDFName.of('XObject'), PDFDict);
  const picture = pictures?.lookup(PDFName.of(name));
  if (!(picture instanceof PDFRawStream) || nameIn(picture.dict, 'Subtype') !== 'Image') return null;
  const { dict, contents: data } = picture;
  if (['SMask', 'Mask', 'OC'].some((key) => dict.has(PDFName.of(key)))) return null;
  const size = { widthPx: numberIn(dict, 'Width', 0), heightPx: numberIn(dict, 'Height', 0) };
  const dpi = scanDpi(page, rect, size);
  const coding = codingOf(dict);
  const samples = samplesOf(dict);
  const bits = dict.lookupMaybe(PDFName.of('ImageMask'), PDFBool)?.asBoolean()
    ? 1
    : numberIn(dict, 'BitsPerComponent', 1);
  const inverted = isInverted(dict, samples ?? 1);
  const turns = quarterTurns(page);
  if (dpi === null || !coding || !samples || inverted === null || turns === null) return null;
  if ((bits !== 1 && bits !== 8) || (bits === 1 && samples === 3)) return null;
  if (size.widthPx * size.heightPx > MAX_PIXELS) return null;
  const parameter = parameterOf(dict);
  return { data, coding, ...size, samples, bits, inverted, turns, dpi, parameter };
}

function parameterOf(dict: PDFDict): PageScan['parameter'] {
  const parameters = dict.lookupMaybe(PDFName.of('DecodeParms'), PDFDict);
  return (name, otherwise) => (parameters ? numberIn(parameters, name, otherwise) : otherwise);
}

/** Resolution of a scan that covers the page to its edges with square pixels; null when it does not. */
function scanDpi(
  page: PDFPage,
  [left, bottom, width, height]: PlacedPicture['rect'],
  { widthPx, heightPx }: { widthPx: number; heightPx: number },
): number | null {
  const box = page.getCropBox();
  const misses = [
    [left - box.x, box.width],
    [bottom - box.y, box.height],
    [left + width - box.x - box.width, box.width],
    [bottom + height - box.y - box.height, box.height],
  ] as const;
  if (misses.some(([miss, side]) => !(Math.abs(miss) <= EDGE * side))) return null;
  const pointsPerUnit = numberIn(page.node, 'UserUnit', 1);
  const across = (72 * widthPx) / (width * pointsPerUnit);
  const down = (72 * heightPx) / (height * pointsPerUnit);
  if (!(across > 0 && across <= MAX_SCAN_DPI) || Math.abs(across / down - 1) > 0.01) return null;
  return Math.round(across * 100) / 100;
}

function codingOf(dict: PDFDict): PageScan['coding'] | null {
  const filter = dict.lookup(PDFName.of('Filter'));
  const names = filter instanceof PDFArray ? filter.asArray().map(String) : [String(filter)];
  if (names.length !== 1) return null;
  const codings: Record<string, PageScan['coding']> = {
    '/DCTDecode': 'jpeg',
    '/CCITTFaxDecode': 'fax',
    '/FlateDecode': 'flate',
  };
  return codings[names[0] ?? ''] ?? null;
}

/** 1 for grey, 3 for RGB; null for palettes, CMYK and whatever else has to be converted. */
function samplesOf(dict: PDFDict): 1 | 3 | null {
  if (dict.lookupMaybe(PDFName.of('ImageMask'), PDFBool)?.asBoolean()) return 1;
  const space = dict.lookup(PDFName.of('ColorSpace'));
  const name = String(space instanceof PDFArray ? space.get(0) : space);
  if (name === '/DeviceGray' || name === '/CalGray') return 1;
  if (name === '/DeviceRGB' || name === '/CalRGB') return 3;
  if (name !== '/ICCBased' || !(space instanceof PDFArray)) return null;
  const profile = space.lookup(1);
  const count = profile instanceof PDFRawStream ? numberIn(profile.dict, 'N', 0) : 0;
  return count === 1 || count === 3 ? count : null;
}

/** A mask's 0 paints black, the colour a page starts with, so that it reads as grey does. */
function isInverted(dict: PDFDict, samples: number): boolean | null {
  const ranges = dict.lookupMaybe(PDFName.of('Decode'), PDFArray);
  const values = ranges?.asArray().map((each) => (each instanceof PDFNumber ? each.asNumber() : Number.NaN));
  if (!values || values.join() === Array(samples).fill('0,1').join()) return false;
  return samples === 1 && values.join() === '1,0' ? true : null;
}

function quarterTurns(page: PDFPage): PageScan['turns'] | null {
  const turns = (((page.getRotation().angle / 90) % 4) + 4) % 4;
  return turns === 0 || turns === 1 || turns === 2 || turns === 3 ? turns : null;
}
