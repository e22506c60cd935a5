import sharp from 'sharp';

/** A PNG of line work: a frame and a diagonal, told apart from others by `seed`. */
export async function pngDrawing({ width = 700, height = 500, seed = 1 } = {}): Promise<Buffer> {
  return sharp(lineWork(width, height, seed))
    .png()
    .toBuffer();
}

/** A 1-bit TIFF in CCITT G4, as an office scanner writes it. */
export async function g4Drawing({ width = 700, height = 500, seed = 1, dpi = 300 } = {}): Promise<Buffer> {
  const perMillimetre = dpi / 25.4;
  const { data, info } = await sharp(lineWork(width, height, seed))
    .threshold(128)
    .extractChannel(0)
    .raw()
    .toBuffer({ resolveWithObject: true });
  return sharp(data, { raw: { width: info.width, height: info.height, channels: 1 } })
    .toColourspace('b-w')
    .tiff({ compression: 'ccittfax4', bitdepth: 1, xres: perMillimetre, yres: perMillimetre })
    .toBuffer();
}

export interface PdfPage {
  /** Points. */
  width: number;
  height: number;
  rotate?: number;
  /** Shows a picture whose JPEG data are no JPEG. */
  brokenPicture?: boolean;
  /** Shows a picture that has no data at all. */
  emptyPicture?: boolean;
}

/** A PDF of vector line work with a page for each size. */
export function pdfDrawing(pages: PdfPage[]): Buffer {
  const picture = 3 + pages.length * 2;
  const kids = pages.map((_page, index) => `${3 + index * 2} 0 R`).join(' ');
  const objects = [
    '<< /Type /Catalog /Pages 2 0 R >>',
    `<< /Type /Pages /Kids [${kids}] /Count ${pages.length} >>`,
    ...pages.flatMap(({ width, height, rotate = 0, brokenPicture, emptyPicture }, index) => {
      const content = `2 w 10 10 m ${width - 10} ${height - 10} l S 10 10 ${width - 20} ${height - 20} re S${brokenPicture ? ' /I Do' : ''}${emptyPicture ? ' /E Do' : ''}`;
      return [
        `<< /Type /Page /Parent 2 0 R /MediaBox [0 0 ${width} ${height}] /Rotate ${rotate} /Contents ${4 + index * 2} 0 R /Resources << /XObject << /I ${picture} 0 R /E ${picture + 1} 0 R >> >> >>`,
        `<< /Length ${content.length} >>\nstream\n${content}\nendstream`,
      ];
    }),
    pictureOf('no JPEG'.repeat(100)),
    ...(pages.some((page) => page.emptyPicture) ? [pictureOf('')] : []),
  ];
  return Buffer.from(assembled(objects), 'latin1');
}

function pictureOf(data: string): string {
  return (
    '<< /Type /XObject /Subtype /Image /Width 400 /Height 300 /ColorSpace /DeviceRGB /BitsPerComponent 8 ' +
    `/Filter /DCTDecode /Length ${data.length} >>\nstream\n${data}\nendstream`
  );
}

function assembled(objects: string[]): string {
  let out = '%PDF-1.5\n';
  const offsets = objects.map((object, index) => {
    const at = out.length;
    out += `${index + 1} 0 obj\n${object}\nendobj\n`;
    return at;
  });
  const table = offsets.map((at) => `${String(at).padStart(10, '0')} 00000 n \n`).join('');
  const size = objects.length + 1;
  return `${out}xref\n0 ${size}\n0000000000 65535 f \n${table}trailer\n<< /Size ${size} /Root 1 0 R >>\nstartxref\n${out.length}\n%%EOF\n`;
}

function lineWork(width: number, height: number, seed: number): Buffer {
  return Buffer.from(
    `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}">
      <rect width="100%" height="100%" fill="white"/>
      <rect x="10" y="10" width="${width - 20}" height="${height - 20}" fill="none" stroke="black" stroke-width="3"/>
      <path d="M10 ${10 + seed} L${width - 10} ${height - 10}" stroke="black" stroke-width="3"/>
    </svg>`,
  );
}
