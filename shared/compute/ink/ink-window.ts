/**
 * A window of a scan as grey values, 0 black to 255 white, by rows; the middle of pixel (i, j) lies at (i + 0.5,
 * j + 0.5) of the window's frame, in base-raster pixels from its corner.
 */
export type InkWindow = { readonly width: number; readonly height: number; readonly grey: Uint8Array };

/** How much each pixel is ink, 0 paper to 255 full stroke, in the layout of the window. */
export type InkMap = { readonly width: number; readonly height: number; readonly ink: Uint8Array };

/** Half the side of the square over which the paper's tone is taken: wider than strokes and letters, narrower than stains. */
const PAPER_RADIUS = 24;
/** Contrast below which a window holds no stroke, in grey steps. */
const LEAST_CONTRAST = 12;
/** The part of the darkest pixels that count as full stroke. */
const FULL_PART = 0.005;

/** So much farther from the middle tone on the light side, and the strokes are light on dark. */
const INVERTED = 1.5;

/**
 * How much of each pixel is ink, whatever the paper's tone, dark strokes on light as light ones on dark: the shortfall against the mean of its surroundings, after a
 * light smoothing against speckle, scaled so that the darkest strokes are full. All paper where nothing stands out.
 */
export function inkMapOf({ width, height, grey }: InkWindow): InkMap {
  const smooth = smoothed(darkOnLight(grey), width, height);
  const shortfall = new Uint8Array(width * height);
  const tally = new Uint32Array(256);
  // Sums of the columns over the rows about the one in hand; the square's sum slides along them.
  const columns = new Int32Array(width);
  let [from, to] = [0, 0];
  for (let y = 0; y < height; y += 1) {
    for (; to < Math.min(height, y + PAPER_RADIUS + 1); to += 1) addRow(columns, smooth, to * width, 1);
    for (; from < y - PAPER_RADIUS; from += 1) addRow(columns, smooth, from * width, -1);
    let sum = 0;
    for (let x = 0; x < Math.min(width, PAPER_RADIUS); x += 1) sum += columns[x]!;
    for (let x = 0; x < width; x += 1) {
      if (x + PAPER_RADIUS < width) sum += columns[x + PAPER_RADIUS]!;
      if (x > PAPER_RADIUS) sum -= columns[x - PAPER_RADIUS - 1]!;
      const across = Math.min(width, x + PAPER_RADIUS + 1) - Math.max(0, x - PAPER_RADIUS);
      const at = y * width + x;
      const value = Math.max(0, Math.round(sum / (across * (to - from)) - smooth[at]!));
      shortfall[at] = value;
      tally[value]! += 1;
    }
  }
  return { width, height, ink: scaled(shortfall, fullStroke(tally, width * height)) };
}

function addRow(columns: Int32Array, values: Uint8Array, start: number, times: 1 | -1): void {
  for (let x = 0; x < columns.length; x += 1) columns[x]! += times * values[start + x]!;
}

/** The window with its strokes dark: a blueprint or an inverted scan, most of it dark, is turned over. */
function darkOnLight(grey: Uint8Array): Uint8Array {
  const tally = new Uint32Array(256);
  for (const value of grey) tally[value]! += 1;
  const [low, middle, high] = [FULL_PART, 0.5, 1 - FULL_PART].map((part) =>
    toneAt(tally, part * grey.length),
  );
  return high! - middle! > INVERTED * (middle! - low!) ? grey.map((value) => 255 - value) : grey;
}

function toneAt(tally: Uint32Array, count: number): number {
  let seen = 0;
  for (let value = 0; value < 256; value += 1) {
    seen += tally[value]!;
    if (seen > count) return value;
  }
  return 255;
}

/** The shortfall that the darkest pixels reach. */
function fullStroke(tally: Uint32Array, pixels: number): number {
  let left = Math.max(1, FULL_PART * pixels);
  for (let value = 255; value > 0; value -= 1) {
    left -= tally[value]!;
    if (left <= 0) return value;
  }
  return 0;
}

function scaled(shortfall: Uint8Array, full: number): Uint8Array {
  if (full < LEAST_CONTRAST) return new Uint8Array(shortfall.length);
  const table = Uint8Array.from({ length: 256 }, (_, value) =>
    Math.min(255, Math.round((255 * value) / full)),
  );
  return shortfall.map((value) => table[value]!);
}

/** Mean over 1-2-1 in both directions. */
function smoothed(grey: Uint8Array, width: number, height: number): Uint8Array {
  const across = new Uint16Array(width * height);
  for (let y = 0; y < height; y += 1) {
    const row = y * width;
    for (let x = 0; x < width; x += 1) {
      const left = grey[row + Math.max(0, x - 1)]!;
      const right = grey[row + Math.min(width - 1, x + 1)]!;
      across[row + x] = left + 2 * grey[row + x]! + right;
    }
  }
  const both = new Uint8Array(width * height);
  for (let y = 0; y < height; y += 1) {
    const above = Math.max(0, y - 1) * width;
    const below = Math.min(height - 1, y + 1) * width;
    const row = y * width;
    for (let x = 0; x < width; x += 1) {
      both[row + x] = (across[above + x]! + 2 * across[row + x]! + across[below + x]!) >> 4;
    }
  }
  return both;
}
