/** Why a file or a page cannot become a sheet. The texts go to the person who uploaded it. */
export type RefusalCode =
  | 'empty'
  | 'unsupported-type'
  | 'damaged'
  | 'encrypted'
  | 'no-pages'
  | 'too-many-pages'
  | 'too-many-pixels'
  | 'page-size'
  | 'out-of-memory'
  | 'too-slow';

/** What happened and what to do, in one or two sentences, with the code a program may switch on. */
export class RenderRefusal extends Error {
  readonly code: RefusalCode;

  constructor(code: RefusalCode, message: string, options?: ErrorOptions) {
    super(message, options);
    this.name = 'RenderRefusal';
    this.code = code;
  }
}

const wholeNumber = new Intl.NumberFormat('en-GB', { maximumFractionDigits: 0 });

export const refusals = {
  empty: () =>
    new RenderRefusal('empty', 'The file is empty. Copy it again from where it came and upload that.'),
  unsupported: (what: string, advice = 'Save it as PDF, TIFF, PNG or JPEG and upload that.') =>
    new RenderRefusal('unsupported-type', `${what} ${advice}`),
  damagedImage: (cause?: unknown) =>
    new RenderRefusal(
      'damaged',
      'The image is damaged or cut short and cannot be decoded. Copy it again from its source, or scan it again.',
      { cause },
    ),
  damagedPdf: (cause?: unknown) =>
    new RenderRefusal(
      'damaged',
      'The PDF is damaged and cannot be read. Copy it again from its source, or print it to a new PDF.',
      { cause },
    ),
  pdfCutOff: () =>
    new RenderRefusal(
      'damaged',
      'The PDF is damaged: its end is missing, so pages or lines may be lost. Copy it again from its source.',
    ),
  damagedPage: (cause?: unknown) =>
    new RenderRefusal(
      'damaged',
      'A picture on the page is damaged and cannot be decoded, so the page would show less than was drawn. ' +
        'Copy the file again from its source, or scan the page again.',
      { cause },
    ),
  encrypted: () =>
    new RenderRefusal(
      'encrypted',
      'The PDF needs a password to open. Save a copy without one and upload that.',
    ),
  unclearEncryption: () =>
    new RenderRefusal(
      'encrypted',
      'The PDF is encrypted in a way that no standard describes, so that programs show it differently. Save a copy ' +
        'without encryption and upload that.',
    ),
  unclearPages: (stated: number, found: number) =>
    new RenderRefusal(
      'damaged',
      `The PDF is damaged: its list of pages states ${wholeNumber.format(stated)} pages, but ` +
        `${wholeNumber.format(found)} can be found. Copy it again from its source, or print it to a new PDF.`,
    ),
  noPages: () =>
    new RenderRefusal('no-pages', 'The file holds no page that can be shown. Check it and export it again.'),
  tooManyPages: (count: number, limit: number) =>
    new RenderRefusal(
      'too-many-pages',
      `The file has ${wholeNumber.format(count)} pages; at most ${limit} are taken. Split it and upload the parts.`,
    ),
  tooManyPixels: (widthPx: number, heightPx: number, limit: number) =>
    new RenderRefusal(
      'too-many-pixels',
      `The page is ${wholeNumber.format(widthPx)} × ${wholeNumber.format(heightPx)} pixels, more than the ` +
        `${wholeNumber.format(limit / 1e6)} million that can be shown. Scan it at a lower resolution or in parts.`,
    ),
  pictureTooLarge: () =>
    new RenderRefusal(
      'too-many-pixels',
      'A picture on the page has more pixels than can be shown. Upload the scan itself as TIFF or JPEG, or scan it ' +
        'at a lower resolution.',
    ),
  pageSize: () =>
    new RenderRefusal(
      'page-size',
      'The page has no usable size. Print the drawing to a new PDF and upload that.',
    ),
  outOfMemory: () =>
    new RenderRefusal(
      'out-of-memory',
      'The page needs more memory than a page may use. Scan it at a lower resolution, or upload the scan as TIFF or JPEG.',
    ),
  tooSlow: (seconds: number) =>
    new RenderRefusal(
      'too-slow',
      `The page took longer than ${wholeNumber.format(seconds)} seconds to draw. Print it to a simpler PDF, or upload a scan of it.`,
    ),
  noPicture: () =>
    new RenderRefusal(
      'page-size',
      'These settings leave no picture. Set the corners in order around the drawing, and a crop within it.',
    ),
  flood: () =>
    new RenderRefusal(
      'damaged',
      'Reading the file gave warnings without end. Print the drawing to a new PDF, or upload a scan of it.',
    ),
};
