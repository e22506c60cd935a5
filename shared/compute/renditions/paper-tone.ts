import type { PixelRows } from './tones.ts';

/**
 * The tone of the bare paper over a sheet: for each cell of a coarse grid and each colour, 1 to 255. Cells are counted
 * row by row.
 */
export type PaperTone = {
  readonly columns: number;
  readonly rows: number;
  readonly colours: 1 | 3;
  readonly tones: Float32Array;
};

/** Cells along the longer side: folds and the shade of a lamp are wider than one, letters and hatching are narrower. */
const CELLS = 48;
/** The paper is what this part of a cell is darker than: ink covers less, dust and glare are lighter. */
const PAPER_PART = 0.8;
/** Darker paper than this part of the sheet's usual one is ground that is inked all over, or no paper at all. */
const DARKEST_PART = 0.45;

/**
 * Reads the paper's tone off a picture of the whole sheet, which may be reduced: about four pixels to a cell and more
 * each way. The grid is blurred over its neighbours, so that what is divided by it keeps its lines.
 */
export function paperToneOf(picture: PixelRows): PaperTone {
  const { widthPx, heightPx, channels } = picture;
  const side = Math.max(widthPx, heightPx) / CELLS;
  const columns = Math.max(1, Math.ceil(widthPx / side));
  const rows = Math.max(1, Math.ceil(heightPx / side));
  const colours = channels === 1 ? 1 : 3;
  const tones = new Float32Array(columns * rows * colours);
  for (let row = 0; row < rows; row += 1)
    for (let column = 0; column < columns; column += 1)
      for (let colour = 0; colour < colours; colour += 1)
        tones[(row * columns + column) * colours + colour] = cellTone(
          picture,
          [column / columns, row / rows, (column + 1) / columns, (row + 1) / rows],
          colour,
        );
  const held = { columns, rows, colours, tones } as const;
  return blurred(blurred(withoutInkedCells(held)));
}

function cellTone(
  { data, widthPx, heightPx, channels }: PixelRows,
  [left, top, right, bottom]: readonly [number, number, number, number],
  colour: number,
): number {
  const counts = new Uint32Array(256);
  let all = 0;
  const toRow = Math.max(Math.floor(top * heightPx) + 1, Math.floor(bottom * heightPx));
  const toColumn = Math.max(Math.floor(left * widthPx) + 1, Math.floor(right * widthPx));
  for (let y = Math.floor(top * heightPx); y < Math.min(toRow, heightPx); y += 1)
    for (let x = Math.floor(left * widthPx); x < Math.min(toColumn, widthPx); x += 1) {
      counts[data[(y * widthPx + x) * channels + colour]!]! += 1;
      all += 1;
    }
  let below = 0;
  for (let tone = 0; tone < 256; tone += 1) {
    below += counts[tone]!;
    if (below > PAPER_PART * all) return Math.max(1, tone);
  }
  return 255;
}

/** Cells that show no paper take the usual tone of the sheet. */
function withoutInkedCells({ columns, rows, colours, tones }: PaperTone): PaperTone {
  const kept = Float32Array.from(tones);
  for (let colour = 0; colour < colours; colour += 1) {
    const sorted = tones.filter((_, index) => index % colours === colour).sort();
    const usual = sorted[sorted.length >> 1]!;
    for (let at = colour; at < kept.length; at += colours)
      if (kept[at]! < DARKEST_PART * usual) kept[at] = usual;
  }
  return { columns, rows, colours, tones: kept };
}

/** Each cell made the mean of itself and its neighbours. */
function blurred({ columns, rows, colours, tones }: PaperTone): PaperTone {
  const means = tones.map((_, index) => {
    const colour = index % colours;
    const cell = (index - colour) / colours;
    const [column, row] = [cell % columns, Math.floor(cell / columns)];
    let sum = 0;
    let count = 0;
    for (let y = Math.max(0, row - 1); y <= Math.min(rows - 1, row + 1); y += 1)
      for (let x = Math.max(0, column - 1); x <= Math.min(columns - 1, column + 1); x += 1) {
        sum += tones[(y * columns + x) * colours + colour]!;
        count += 1;
      }
    return sum / count;
  });
  return { columns, rows, colours, tones: means };
}

/**
 * Divides a part of the sheet by the paper's tone about each pixel, in place, so that bare paper becomes white. `place`:
 * where the part lies, its left, top and the size of the whole sheet, in pixels of the part.
 */
export function whitenPaper(
  part: PixelRows,
  paper: PaperTone,
  place: { left: number; top: number; widthPx: number; heightPx: number },
): void {
  const { data, widthPx, heightPx, channels } = part;
  const colours = channels === 4 ? 3 : channels;
  const rowTones = new Float32Array(paper.columns * paper.colours);
  for (let y = 0; y < heightPx; y += 1) {
    tonesOfRow(paper, ((place.top + y + 0.5) / place.heightPx) * paper.rows - 0.5, rowTones);
    for (let x = 0; x < widthPx; x += 1) {
      const across = ((place.left + x + 0.5) / place.widthPx) * paper.columns - 0.5;
      const cell = Math.min(paper.columns - 1, Math.max(0, across));
      const first = Math.floor(cell);
      const next = Math.min(paper.columns - 1, first + 1);
      const part = cell - first;
      for (let colour = 0; colour < colours; colour += 1) {
        const own = Math.min(colour, paper.colours - 1);
        const tone =
          rowTones[first * paper.colours + own]! * (1 - part) + rowTones[next * paper.colours + own]! * part;
        const at = (y * widthPx + x) * channels + colour;
        data[at] = Math.min(255, Math.round((255 * data[at]!) / tone));
      }
    }
  }
}

function tonesOfRow({ columns, rows, colours, tones }: PaperTone, down: number, into: Float32Array): void {
  const cell = Math.min(rows - 1, Math.max(0, down));
  const first = Math.floor(cell);
  const next = Math.min(rows - 1, first + 1);
  const part = cell - first;
  const length = columns * colours;
  for (let at = 0; at < length; at += 1)
    into[at] = tones[first * length + at]! * (1 - part) + tones[next * length + at]! * part;
}
