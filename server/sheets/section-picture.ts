import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { createCanvas, GlobalFonts, type SKRSContext2D } from '@napi-rs/canvas';
import sharp from 'sharp';
import type { SheetPoint } from '#shared/contract/document.ts';
import { placeFigureLabels } from '#shared/text/calculation-sheet/figure-labels.ts';
import type { SectionFigure } from '#shared/text/calculation-sheet/section-figure.ts';
import { LINE_LOOKS, labelColour, POINT_COLOUR } from './line-looks.ts';
import type { GreyRaster } from './scan-picture.ts';

/** At most this large where it is shown, in CSS pixels; the file is twice as fine. */
const SHOWN_PX = { width: 600, height: 520 };
const FINER = 2;
/** Stays below what mail servers and readers on the telephone mind. */
export const MOST_BYTES = 150_000;
/** Tried in this order until the file is small enough: how fine it is, and the JPEG's quality. */
const TRIES = [
  { finer: FINER, quality: 70 },
  { finer: FINER, quality: 50 },
  { finer: 1.4, quality: 50 },
  { finer: 1, quality: 40 },
];
/** Points on paper to CSS pixels, a little bolder than in print: the picture is small. */
const PX_PER_PT = 1.5;
const LABEL_PX = 12;
const FONT = 'Tracehead label';

/** Size of the picture of a part of the sheet, in CSS pixels. */
export function pictureSize([, , width, height]: SectionFigure['crop']): { width: number; height: number } {
  const scale = Math.min(SHOWN_PX.width / width, SHOWN_PX.height / height);
  return { width: Math.max(1, Math.round(width * scale)), height: Math.max(1, Math.round(height * scale)) };
}

/** Pixels across which the scan below the picture is worth having. */
export const scanWidth = (crop: SectionFigure['crop']): number => pictureSize(crop).width * FINER;

/**
 * The section with its traces over the scan as a small JPEG, the lines as on the calculation sheet. The same input gives
 * the same bytes.
 */
export async function sectionPicture(
  figure: SectionFigure,
  scan: GreyRaster,
): Promise<{ jpeg: Buffer; widthPx: number }> {
  const size = pictureSize(figure.crop);
  let jpeg: Buffer = Buffer.alloc(0);
  for (const { finer, quality } of TRIES) {
    jpeg = await compose(figure, scan, { size, finer, quality });
    if (jpeg.length <= MOST_BYTES) break;
  }
  return { jpeg, widthPx: size.width };
}

interface Fineness {
  size: { width: number; height: number };
  finer: number;
  quality: number;
}

function compose(
  figure: SectionFigure,
  { data, width, height }: GreyRaster,
  { size, finer, quality }: Fineness,
): Promise<Buffer> {
  const pixels = { width: Math.round(size.width * finer), height: Math.round(size.height * finer) };
  const traces = drawTraces(figure, pixels, finer);
  return (
    sharp(data, { raw: { width, height, channels: 1 } })
      .resize({ ...pixels, fit: 'fill' })
      // A little paler than the paper, so that the traces stand out.
      .linear(0.8, 51)
      .toColourspace('srgb')
      .composite([{ input: traces }])
      .jpeg({ quality })
      .toBuffer()
  );
}

function drawTraces(figure: SectionFigure, pixels: { width: number; height: number }, finer: number): Buffer {
  const canvas = createCanvas(pixels.width, pixels.height);
  const context = canvas.getContext('2d');
  const [left, top, width] = figure.crop;
  const scale = pixels.width / width / finer;
  // From here on in CSS pixels.
  context.scale(finer, finer);
  const on = ([x, y]: SheetPoint): Place => [(x - left) * scale, (y - top) * scale];
  context.lineJoin = 'round';
  for (const { kind, points } of figure.lines) {
    const { colour, widthPt, dashPt } = LINE_LOOKS[kind];
    context.setLineDash(dashPt.map((length) => length * PX_PER_PT));
    stroke(context, points.map(on), colour, widthPt * PX_PER_PT);
  }
  context.setLineDash([]);
  for (const profile of figure.profiles) stroke(context, profile.map(on), POINT_COLOUR, PX_PER_PT);
  for (const { at } of figure.points) drawPoint(context, on(at));
  drawLabels(context, figure, scale);
  return canvas.toBuffer('image/png');
}

type Place = readonly [number, number];

function stroke(context: SKRSContext2D, places: readonly Place[], colour: string, width: number): void {
  context.beginPath();
  places.forEach(([x, y], i) => {
    if (i === 0) context.moveTo(x, y);
    else context.lineTo(x, y);
  });
  context.lineWidth = width;
  context.strokeStyle = colour;
  context.stroke();
}

function drawPoint(context: SKRSContext2D, [x, y]: Place): void {
  context.beginPath();
  context.arc(x, y, 4, 0, 2 * Math.PI);
  context.fillStyle = '#ffffff';
  context.fill();
  context.lineWidth = 2;
  context.strokeStyle = POINT_COLOUR;
  context.stroke();
}

function drawLabels(context: SKRSContext2D, figure: SectionFigure, scale: number): void {
  registerFont();
  context.font = `${LABEL_PX}px "${FONT}"`;
  context.textAlign = 'center';
  const widthOf = (text: string) => context.measureText(text).width;
  const labels = placeFigureLabels(withoutKnownPoints(figure), { scale, letters: LABEL_PX, widthOf });
  for (const { text, of, left, top, width, height, baseLine } of labels) {
    context.fillStyle = 'rgba(255, 255, 255, 0.8)';
    context.fillRect(left, top, width, height);
    context.fillStyle = labelColour(of);
    context.fillText(text, left + width / 2, baseLine);
  }
}

/** They are not drawn: by the picture a mail is known, and nothing is measured in it. */
const withoutKnownPoints = (figure: SectionFigure): SectionFigure => ({ ...figure, knownPoints: [] });

/** The product's own fonts, so that labels do not depend on what the machine has. */
function registerFont(): void {
  if (GlobalFonts.has(FONT)) return;
  const file = '@fontsource/public-sans/files/public-sans-latin-600-normal.woff';
  GlobalFonts.register(readFileSync(fileURLToPath(import.meta.resolve(file))), FONT);
}
