import { brightness, type PixelRows } from './tones.ts';

/**
 * Takes dark specks of at most `mostPx` connected pixels (by sides and corners) out of a picture, in place: they become
 * what lies lightest beside them. A pixel is dark when its brightness is below `tone`. A speck that reaches the picture's
 * top or bottom row may go on beyond it and is left, so that a picture can be worked on in bands that overlap by `mostPx`
 * rows. Fine lines stay, however thin, because they are long.
 */
export function removeSpecks(picture: PixelRows, mostPx: number, tone: number): void {
  const { widthPx, heightPx } = picture;
  const dark = darkOf(picture, tone);
  const found = new Int32Array(mostPx + 1);
  for (let start = 0; start < dark.length; start += 1) {
    if (dark[start] !== DARK) continue;
    const size = spread(dark, widthPx, heightPx, start, found);
    if (size > mostPx || touchesEdge(found, size, widthPx, heightPx)) continue;
    fill(picture, dark, found, size);
  }
}

const DARK = 1;
const SEEN = 2;

function darkOf({ data, widthPx, heightPx, channels }: PixelRows, tone: number): Uint8Array {
  const dark = new Uint8Array(widthPx * heightPx);
  for (let at = 0; at < dark.length; at += 1) {
    const from = at * channels;
    const light = channels === 1 ? data[from]! : brightness(data[from]!, data[from + 1]!, data[from + 2]!);
    if (light < tone) dark[at] = DARK;
  }
  return dark;
}

/**
 * Marks the dark figure about a place as seen and counts its pixels; the first ones are left in `found`. The whole figure
 * is followed to its end, so that each pixel is looked at once, however large it is.
 */
function spread(dark: Uint8Array, width: number, height: number, start: number, found: Int32Array): number {
  const open = [start];
  dark[start] = SEEN;
  let size = 0;
  while (open.length > 0) {
    const at = open.pop()!;
    if (size < found.length) found[size] = at;
    size += 1;
    const x = at % width;
    const y = (at - x) / width;
    for (let row = Math.max(0, y - 1); row <= Math.min(height - 1, y + 1); row += 1)
      for (let column = Math.max(0, x - 1); column <= Math.min(width - 1, x + 1); column += 1) {
        const next = row * width + column;
        if (dark[next] !== DARK) continue;
        dark[next] = SEEN;
        open.push(next);
      }
  }
  return size;
}

function touchesEdge(found: Int32Array, size: number, width: number, height: number): boolean {
  for (let index = 0; index < size; index += 1) {
    const row = Math.floor(found[index]! / width);
    if (row === 0 || row === height - 1) return true;
  }
  return false;
}

/** Gives a speck the lightest colour that lies beside it. */
function fill(
  { data, widthPx, heightPx, channels }: PixelRows,
  dark: Uint8Array,
  found: Int32Array,
  size: number,
): void {
  let lightest = -1;
  let from = -1;
  for (let index = 0; index < size; index += 1) {
    const x = found[index]! % widthPx;
    const y = (found[index]! - x) / widthPx;
    for (let row = Math.max(0, y - 1); row <= Math.min(heightPx - 1, y + 1); row += 1)
      for (let column = Math.max(0, x - 1); column <= Math.min(widthPx - 1, x + 1); column += 1) {
        const beside = row * widthPx + column;
        if (dark[beside] !== 0) continue;
        const at = beside * channels;
        const light = channels === 1 ? data[at]! : brightness(data[at]!, data[at + 1]!, data[at + 2]!);
        if (light > lightest) [lightest, from] = [light, at];
      }
  }
  if (from < 0) return;
  const colours = channels === 4 ? 3 : channels;
  for (let index = 0; index < size; index += 1)
    for (let colour = 0; colour < colours; colour += 1)
      data[found[index]! * channels + colour] = data[from + colour]!;
}
