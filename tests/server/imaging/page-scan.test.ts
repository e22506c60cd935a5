import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { deflateSync } from 'node:zlib';
import sharp, { type Sharp } from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createRenderProcess, type RenderProcess } from '#server/imaging/render-process.ts';

/**
 * A page that is one scan is taken as it is; the same page with a speck beside it has to be drawn by pdf.js. Both
 * must show the same: the renderer is the outside source for what a scan's parameters mean.
 */
const SIDE_PX = 512;
const SCAN_DPI = 200;
const SIDE_PT = (SIDE_PX / SCAN_DPI) * 72;
const DRAWN_DPI = 300;

let folder: string;
let renderer: RenderProcess;
let grey: Buffer;
beforeAll(async () => {
  folder = mkdtempSync(path.join(os.tmpdir(), 'tracehead-scan-'));
  renderer = createRenderProcess();
  // Nothing in it is symmetric, so that each turn and each inversion shows.
  const drawing = `<svg xmlns="http://www.w3.org/2000/svg" width="${SIDE_PX}" height="${SIDE_PX}">
    <rect width="100%" height="100%" fill="white"/><rect x="20" y="30" width="300" height="90" fill="black"/>
    <circle cx="120" cy="350" r="80" fill="black"/></svg>`;
  grey = await sharp(Buffer.from(drawing)).extractChannel(0).threshold(128).raw().toBuffer();
});
afterAll(() => {
  renderer.close();
  rmSync(folder, { recursive: true, force: true });
});

const greyImage = () => sharp(grey, { raw: { width: SIDE_PX, height: SIDE_PX, channels: 1 } });
const colourImage = () => greyImage().toColourspace('srgb').tint('#804020');

/** One tile as large as the image, so that the fax data are one run. */
async function g4(): Promise<Buffer> {
  const tiff = await greyImage()
    .toColourspace('b-w')
    .tiff({ compression: 'ccittfax4', bitdepth: 1, tile: true, tileWidth: SIDE_PX, tileHeight: SIDE_PX })
    .toBuffer();
  const directory = tiff.readUInt32LE(4);
  const entries = new Map<number, number>();
  for (let i = 0; i < tiff.readUInt16LE(directory); i++) {
    const at = directory + 2 + i * 12;
    entries.set(tiff.readUInt16LE(at), tiff.readUInt32LE(at + 8));
  }
  const [offset = 0, bytes = 0] = [entries.get(324), entries.get(325)];
  return tiff.subarray(offset, offset + bytes);
}

/** Rows of 8 pixels a byte, 1 for white. */
function bits(): Buffer {
  const packed = Buffer.alloc((SIDE_PX / 8) * SIDE_PX);
  grey.forEach((value, at) => {
    if (value > 127) packed[at >> 3]! |= 0x80 >> (at & 7);
  });
  return packed;
}

/** The compressed data of a PNG, whose rows carry PNG's filters. */
async function pngData(image: Sharp): Promise<Buffer> {
  const png = await image.png({ adaptiveFiltering: true }).toBuffer();
  const parts: Buffer[] = [];
  for (let at = 8; at < png.length; at += 12 + png.readUInt32BE(at)) {
    if (png.toString('latin1', at + 4, at + 8) === 'IDAT')
      parts.push(png.subarray(at + 8, at + 8 + png.readUInt32BE(at)));
  }
  return Buffer.concat(parts);
}

interface Page {
  data: Buffer;
  picture: string;
  rotate?: number;
  content?: string;
}

function pdfOf({
  data,
  picture,
  rotate = 0,
  content = `q ${SIDE_PT} 0 0 ${SIDE_PT} 0 0 cm /I Do Q`,
}: Page): Buffer {
  const dictionary = `/Type /XObject /Subtype /Image /Width ${SIDE_PX} /Height ${SIDE_PX} ${picture} /Length ${data.length}`;
  const objects: Array<[string, Buffer?]> = [
    ['<< /Type /Catalog /Pages 2 0 R >>'],
    ['<< /Type /Pages /Kids [3 0 R] /Count 1 >>'],
    [
      `<< /Type /Page /Parent 2 0 R /MediaBox [0 0 ${SIDE_PT} ${SIDE_PT}] /Rotate ${rotate} /Contents 4 0 R
        /Resources << /XObject << /I 5 0 R >> /Font << /F << /Type /Font /Subtype /Type1 /BaseFont /Helvetica >> >> >> >>`,
    ],
    [`<< /Length ${content.length} >>`, Buffer.from(content)],
    [`<< ${dictionary} >>`, data],
  ];
  const parts: Buffer[] = [Buffer.from('%PDF-1.5\n')];
  const offsets: number[] = [];
  let length = parts[0]!.length;
  const add = (part: Buffer) => {
    parts.push(part);
    length += part.length;
  };
  objects.forEach(([head, stream], index) => {
    offsets.push(length);
    add(Buffer.from(`${index + 1} 0 obj\n${head}\n`));
    if (stream) add(Buffer.concat([Buffer.from('stream\n'), stream, Buffer.from('\nendstream\n')]));
    add(Buffer.from('endobj\n'));
  });
  const table = offsets.map((at) => `${String(at).padStart(10, '0')} 00000 n \n`).join('');
  add(
    Buffer.from(
      `xref\n0 6\n0000000000 65535 f \n${table}trailer\n<< /Size 6 /Root 1 0 R >>\nstartxref\n${length}\n%%EOF`,
    ),
  );
  return Buffer.concat(parts);
}

let count = 0;
async function rendered(pdf: Buffer) {
  const file = path.join(folder, `${++count}.pdf`);
  writeFileSync(file, pdf);
  const outFolder = path.join(folder, String(count));
  const sheet = await renderer.renderSheet({ file, kind: 'pdf', pageNumber: 1, outFolder });
  const small = await sharp(path.join(outFolder, 'thumbnail.webp'))
    .resize(128, 128)
    .greyscale()
    .raw()
    .toBuffer();
  return { sheet, small };
}

const SPECK = ' 0 0 0.01 0.01 re f';
const plain = `q ${SIDE_PT} 0 0 ${SIDE_PT} 0 0 cm /I Do Q`;

/** Largest mean difference of brightness, of 255, that another resolution and JPEG tiles make. */
const SAME = 4;

async function bothWays(page: Page) {
  const taken = await rendered(pdfOf(page));
  const drawn = await rendered(pdfOf({ ...page, content: (page.content ?? plain) + SPECK }));
  let sum = 0;
  taken.small.forEach((value, at) => {
    sum += Math.abs(value - (drawn.small[at] ?? 0));
  });
  return { taken: taken.sheet, drawn: drawn.sheet, difference: sum / taken.small.length };
}

const codings: Array<[string, () => Promise<Buffer>, string]> = [
  ['fax data', g4, fax('')],
  ['fax data with black as 1', g4, fax('/BlackIs1 true')],
  ['fax data shown inverted', g4, `${fax('')} /Decode [1 0]`],
  ['fax data with black as 1 shown inverted', g4, `${fax('/BlackIs1 true')} /Decode [1 0]`],
  ['a fax mask', g4, fax('').replace('/ColorSpace /DeviceGray', '/ImageMask true')],
  [
    'packed bits',
    async () => deflateSync(bits()),
    '/Filter /FlateDecode /ColorSpace /DeviceGray /BitsPerComponent 1',
  ],
  [
    'packed bits shown inverted',
    async () => deflateSync(bits()),
    '/Filter /FlateDecode /ColorSpace /DeviceGray /BitsPerComponent 1 /Decode [1 0]',
  ],
  [
    'grey bytes',
    async () => deflateSync(grey),
    '/Filter /FlateDecode /ColorSpace /DeviceGray /BitsPerComponent 8',
  ],
  [
    'colour with PNG filters',
    async () => pngData(colourImage()),
    `/Filter /FlateDecode /ColorSpace /DeviceRGB /BitsPerComponent 8 /DecodeParms << /Predictor 15 /Colors 3 /Columns ${SIDE_PX} >>`,
  ],
  [
    'a colour JPEG',
    () => colourImage().jpeg().toBuffer(),
    '/Filter /DCTDecode /ColorSpace /DeviceRGB /BitsPerComponent 8',
  ],
  [
    'a grey JPEG shown inverted',
    () => greyImage().toColourspace('b-w').jpeg().toBuffer(),
    '/Filter /DCTDecode /ColorSpace /DeviceGray /BitsPerComponent 8 /Decode [1 0]',
  ],
];

function fax(parameters: string): string {
  return `/Filter /CCITTFaxDecode /ColorSpace /DeviceGray /BitsPerComponent 1 /DecodeParms << /K -1 /Columns ${SIDE_PX} /Rows ${SIDE_PX} ${parameters} >>`;
}

describe('a PDF page that is one scan', () => {
  it.each(codings)(
    'of %s is taken in its own pixels and shows what pdf.js draws',
    async (_name, data, picture) => {
      const { taken, drawn, difference } = await bothWays({ data: await data(), picture });
      expect(taken).toMatchObject({ widthPx: SIDE_PX, heightPx: SIDE_PX, dpi: SCAN_DPI });
      expect(drawn).toMatchObject({ widthPx: SIDE_PX * 1.5, dpi: DRAWN_DPI });
      expect(difference).toBeLessThan(SAME);
    },
  );

  it.each([90, 180, 270, -90])('stands as the page says when turned by %i degrees', async (rotate) => {
    const { taken, difference } = await bothWays({ data: await g4(), picture: fax(''), rotate });
    expect(taken.dpi).toBe(SCAN_DPI);
    expect(difference).toBeLessThan(SAME);
  });

  it('may carry text in invisible letters, as text recognition leaves it', async () => {
    const content = `${plain} BT 3 Tr /F 9 Tf 20 20 Td (EL 118.2 \\(m\\)) Tj [(a) -20 (b)] TJ ET`;
    const { taken, difference } = await bothWays({ data: await g4(), picture: fax(''), content });
    expect(taken.dpi).toBe(SCAN_DPI);
    expect(difference).toBeLessThan(SAME);
  });

  it.each([
    ['a visible word', `${plain} BT /F 9 Tf 20 20 Td (EL 118.2) Tj ET`],
    ['a line', `${plain} 0 0 m 50 50 l S`],
    ['the picture twice', `${plain} ${plain}`],
    ['the picture off the edge', `q ${SIDE_PT} 0 0 ${SIDE_PT} 30 0 cm /I Do Q`],
    ['the picture in a corner', `q ${SIDE_PT / 2} 0 0 ${SIDE_PT / 2} 0 0 cm /I Do Q`],
    ['the picture upside down', `q ${SIDE_PT} 0 0 ${-SIDE_PT} 0 ${SIDE_PT} cm /I Do Q`],
  ])('with %s is drawn instead', async (_name, content) => {
    const { sheet } = await rendered(pdfOf({ data: await g4(), picture: fax(''), content }));
    expect(sheet.dpi).toBe(DRAWN_DPI);
  });

  it.each(codings)('of %s that end half-way is refused, not shown in part', async (_name, data, picture) => {
    const whole = await data();
    const half = whole.subarray(0, whole.length >> 1);
    await expect(rendered(pdfOf({ data: half, picture }))).rejects.toMatchObject({ code: 'damaged' });
    const stamped = plain + SPECK;
    await expect(rendered(pdfOf({ data: half, picture, content: stamped }))).rejects.toMatchObject({
      code: 'damaged',
    });
  });

  it('whose data are damaged is refused, not shown in part', async () => {
    const picture = '/Filter /DCTDecode /ColorSpace /DeviceGray /BitsPerComponent 8';
    const data = Buffer.from('no JPEG'.repeat(100));
    await expect(rendered(pdfOf({ data, picture }))).rejects.toMatchObject({ code: 'damaged' });
  });
});
