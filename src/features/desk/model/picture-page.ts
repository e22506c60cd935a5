import type { SheetFrame } from './viewport.ts';

/** Lying sheets, width and height in millimetres. */
export const PAPERS = { A4: [297, 210], A3: [420, 297] } as const;
export type Paper = keyof typeof PAPERS;

/** A piece of a figure: plain text, or a power to be raised. */
export type PictureRun = string | { readonly sup: string };
export type PictureCell = { readonly label: string; readonly value: readonly PictureRun[] };
/** A length of the section: how many units, and what stands at the end and in the middle of its bar. */
export type PictureBar = {
  readonly units: number;
  readonly mmPerUnit: number;
  readonly label: string;
  readonly half: string;
};

/** Width of a text in millimetres, with the type that the picture is set in. */
export type Measure = (text: string, sizePt: number, bold: boolean) => number;

export type Box = { readonly x: number; readonly y: number; readonly width: number; readonly height: number };
export type SetText = { readonly x: number; readonly y: number; readonly runs: readonly PictureRun[] };

export const TYPE = { labelPt: 6.5, valuePt: 8, legendPt: 7.5, cautionPt: 6.5 } as const;

/** A page laid out, all in millimetres from its top left corner; texts by their baseline. */
export type PicturePage = {
  readonly widthMm: number;
  /** No more than the paper's: what is not needed is left away. */
  readonly heightMm: number;
  readonly drawing: Box;
  readonly bars: ReadonlyArray<Box & { readonly label: string; readonly half: string }>;
  readonly legend: ReadonlyArray<{ readonly sample: Box; readonly label: SetText; readonly index: number }>;
  readonly cells: ReadonlyArray<{
    readonly box: Box;
    readonly label: SetText;
    readonly value: readonly SetText[];
  }>;
  readonly caution: readonly SetText[];
};

export type PageContent = {
  readonly cells: readonly PictureCell[];
  readonly legend: readonly string[];
  readonly caution: string;
};

const MARGIN = 8;
const GAP = 3;
const LINE_MM = 0.4;
const CELL_WIDTH = 46;
const CELL_PAD = 1.4;
const LEGEND_WIDTH = 43;
const LEGEND_ROW = 5.4;
const SAMPLE_WIDTH = 12;
export const BAR_MOST_MM = 56;
const BARS_WIDTH = 72;
const BAR_HEIGHT = 1.6;
const BAR_ROW = 9;
const MM_PER_PT = 25.4 / 72;

/** The room left for the drawing, width and height, when everything else has its place. */
export function drawingRoom(
  paper: Paper,
  content: PageContent,
  barCount: number,
  measure: Measure,
): readonly [width: number, height: number] {
  const [width, height] = PAPERS[paper];
  return [width - 2 * MARGIN, height - 2 * MARGIN - footHeight(width, content, barCount, measure)];
}

/** Millimetres for each pixel of the picture at which a frame of it fills the room. */
export function fittingScale(frame: SheetFrame, [width, height]: readonly [number, number]): number {
  return Math.min(width / frame[2], height / frame[3]);
}

/** Lays a page out: the drawing on top, below it scale bars and legend, the title block, and the caution. */
export function layPage(
  paper: Paper,
  frame: SheetFrame,
  mmPerPx: number,
  content: PageContent,
  bars: readonly PictureBar[],
  measure: Measure,
): PicturePage {
  const widthMm = PAPERS[paper][0];
  const inner = widthMm - 2 * MARGIN;
  const [width, height] = [frame[2] * mmPerPx, frame[3] * mmPerPx];
  const drawing = { x: MARGIN + (inner - width) / 2, y: MARGIN, width, height };
  let y = MARGIN + height + GAP;
  const keyed = legendAndBars(content, bars, inner, y);
  y += keyHeight(inner, content.legend.length, bars.length) + GAP;
  const cells = titleCells(content.cells, inner, y, measure);
  y += cells.height + GAP;
  const caution = cautionLines(content.caution, inner, measure).map((text, i) => ({
    x: MARGIN,
    y: y + baseline(TYPE.cautionPt) + i * lineHeight(TYPE.cautionPt),
    runs: [text],
  }));
  y += caution.length * lineHeight(TYPE.cautionPt);
  return { widthMm, heightMm: y + MARGIN, drawing, ...keyed, cells: cells.set, caution };
}

function footHeight(widthMm: number, content: PageContent, barCount: number, measure: Measure): number {
  const inner = widthMm - 2 * MARGIN;
  const caution = cautionLines(content.caution, inner, measure).length * lineHeight(TYPE.cautionPt);
  const key = keyHeight(inner, content.legend.length, barCount);
  return 3 * GAP + key + titleCells(content.cells, inner, 0, measure).height + caution;
}

const lineHeight = (sizePt: number) => sizePt * MM_PER_PT * 1.35;
const baseline = (sizePt: number) => sizePt * MM_PER_PT;

function cautionLines(caution: string, inner: number, measure: Measure): string[] {
  return wrapped(caution, inner, (text) => measure(text, TYPE.cautionPt, false));
}

const legendColumns = (inner: number, barCount: number) =>
  Math.max(1, Math.floor((inner - (barCount > 0 ? BARS_WIDTH : 0)) / LEGEND_WIDTH));

function keyHeight(inner: number, entries: number, barCount: number): number {
  const rows = Math.ceil(entries / legendColumns(inner, barCount));
  return Math.max(rows * LEGEND_ROW, barCount * BAR_ROW);
}

function legendAndBars(
  { legend }: PageContent,
  bars: readonly PictureBar[],
  inner: number,
  top: number,
): Pick<PicturePage, 'bars' | 'legend'> {
  const columns = legendColumns(inner, bars.length);
  const left = MARGIN + (bars.length > 0 ? BARS_WIDTH : 0);
  return {
    bars: bars.map(({ units, mmPerUnit, label, half }, i) => ({
      x: MARGIN,
      y: top + i * BAR_ROW + 1,
      width: units * mmPerUnit,
      height: BAR_HEIGHT,
      label,
      half,
    })),
    legend: legend.map((label, index) => {
      const x = left + (index % columns) * LEGEND_WIDTH;
      const y = top + Math.floor(index / columns) * LEGEND_ROW;
      return {
        index,
        sample: { x, y, width: SAMPLE_WIDTH, height: LEGEND_ROW },
        label: {
          x: x + SAMPLE_WIDTH + 2,
          y: y + LEGEND_ROW / 2 + baseline(TYPE.legendPt) * 0.36,
          runs: [label],
        },
      };
    }),
  };
}

function titleCells(
  cells: readonly PictureCell[],
  inner: number,
  top: number,
  measure: Measure,
): { set: PicturePage['cells']; height: number } {
  const rows = Math.ceil(cells.length / Math.max(1, Math.round(inner / CELL_WIDTH)));
  // Spread evenly, so that no row is left with a cell or two.
  const columns = Math.max(1, Math.ceil(cells.length / Math.max(1, rows)));
  const width = inner / columns;
  const set: Array<PicturePage['cells'][number]> = [];
  let y = top;
  for (let first = 0; first < cells.length; first += columns) {
    const row = cells.slice(first, first + columns).map((cell) => ({
      cell,
      lines: wrappedRuns(cell.value, width - 2 * CELL_PAD, measure),
    }));
    const most = Math.max(...row.map(({ lines }) => lines.length));
    const height = 2 * CELL_PAD + lineHeight(TYPE.labelPt) + most * lineHeight(TYPE.valuePt);
    row.forEach(({ cell, lines }, i) => {
      // The last row's cells share its whole width, so that the block has no hole.
      const own = inner / row.length;
      const x = MARGIN + i * own;
      const from = y + CELL_PAD + lineHeight(TYPE.labelPt) + baseline(TYPE.valuePt);
      set.push({
        box: { x, y, width: own, height },
        label: { x: x + CELL_PAD, y: y + CELL_PAD + baseline(TYPE.labelPt), runs: [cell.label] },
        value: lines.map((runs, line) => ({
          x: x + CELL_PAD,
          y: from + line * lineHeight(TYPE.valuePt),
          runs,
        })),
      });
    });
    y += height;
  }
  return { set, height: y - top + LINE_MM };
}

/** Runs broken into lines at blanks of the plain text; a power stays with what it is of. */
function wrappedRuns(runs: readonly PictureRun[], width: number, measure: Measure): PictureRun[][] {
  const lines: PictureRun[][] = [[]];
  let used = 0;
  const add = (run: PictureRun, runWidth: number) => {
    lines.at(-1)!.push(run);
    used += runWidth;
  };
  for (const run of runs) {
    if (typeof run !== 'string') {
      add(run, measure(run.sup, TYPE.valuePt * 0.7, true));
      continue;
    }
    for (const word of run.split(/(?<= )/)) {
      const wide = measure(word.trimEnd(), TYPE.valuePt, true);
      if (used > 0 && used + wide > width) {
        lines.push([]);
        used = 0;
      }
      add(word, measure(word, TYPE.valuePt, true));
    }
  }
  return lines;
}

function wrapped(text: string, width: number, measure: (text: string) => number): string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(' ')) {
    const longer = line === '' ? word : `${line} ${word}`;
    if (line !== '' && measure(longer) > width) {
      lines.push(line);
      line = word;
    } else line = longer;
  }
  return line === '' ? lines : [...lines, line];
}
