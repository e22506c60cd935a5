import { type Measure, type PicturePage, type SetText, TYPE } from '../model/picture-page.ts';
import { COLOURS } from './line-look.ts';

const FONT = '"Public Sans", "Liberation Sans", Arial, sans-serif';
const SECOND_INK = '#52606b';
/** Screen pixels, of which there are 96 to an inch, for each millimetre and each point. */
export const PX_PER_MM = 96 / 25.4;
const PX_PER_PT = 96 / 72;
const RAISED = { size: 0.7, by: 0.36 } as const;

const fontOf = (sizePt: number, bold: boolean) => `${bold ? 600 : 400} ${sizePt * PX_PER_PT}px ${FONT}`;

/** Measures texts as they will be set; fonts that are not there yet are fetched before. */
export async function createMeasure(document: Document): Promise<Measure> {
  await Promise.all([400, 600, 700].map((weight) => document.fonts.load(`${weight} 12px "Public Sans"`)));
  const context = document.createElement('canvas').getContext('2d');
  return (text, sizePt, bold) => {
    if (context === null) return text.length * sizePt * 0.18;
    context.font = fontOf(sizePt, bold);
    return context.measureText(text).width / PX_PER_MM;
  };
}

/** Sets the words and rules of a page, in a context whose unit is a screen pixel from the page's corner. */
export function paintWords(context: CanvasRenderingContext2D, page: PicturePage): void {
  context.textAlign = 'left';
  context.textBaseline = 'alphabetic';
  context.strokeStyle = COLOURS.ink;
  frame(context, page.drawing, 1.4);
  for (const { box, label, value } of page.cells) {
    frame(context, box, 0.6);
    say(context, label, TYPE.labelPt, false, SECOND_INK);
    for (const line of value) say(context, line, TYPE.valuePt, true);
  }
  for (const { label } of page.legend) say(context, label, TYPE.legendPt, false);
  for (const line of page.caution) say(context, line, TYPE.cautionPt, false, SECOND_INK);
  for (const bar of page.bars) scaleBar(context, bar);
}

function frame(context: CanvasRenderingContext2D, box: PicturePage['drawing'], widthPx: number): void {
  context.lineWidth = widthPx;
  context.strokeRect(...inPx(box));
}

function inPx({ x, y, width, height }: PicturePage['drawing']): [number, number, number, number] {
  return [x * PX_PER_MM, y * PX_PER_MM, width * PX_PER_MM, height * PX_PER_MM];
}

function scaleBar(context: CanvasRenderingContext2D, bar: PicturePage['bars'][number]): void {
  const [x, y, width, height] = inPx(bar);
  context.fillStyle = COLOURS.ink;
  context.fillRect(x, y, width / 2, height);
  context.lineWidth = 0.8;
  context.strokeRect(x, y, width, height);
  const below = bar.y + bar.height + 3.2;
  const put = (text: string, from: number) =>
    say(context, { x: from, y: below, runs: [text] }, TYPE.legendPt, false);
  put('0', bar.x - 0.7);
  put(bar.half, bar.x + bar.width / 2 - 1);
  put(bar.label, bar.x + bar.width - 1.4);
}

function say(
  context: CanvasRenderingContext2D,
  { x, y, runs }: SetText,
  sizePt: number,
  bold: boolean,
  colour: string = COLOURS.ink,
): void {
  context.fillStyle = colour;
  let at = x * PX_PER_MM;
  for (const run of runs) {
    const raised = typeof run !== 'string';
    const size = sizePt * (raised ? RAISED.size : 1);
    const text = raised ? run.sup : run;
    context.font = fontOf(size, bold);
    context.fillText(text, at, y * PX_PER_MM - (raised ? sizePt * PX_PER_PT * RAISED.by : 0));
    at += context.measureText(text).width;
  }
}
