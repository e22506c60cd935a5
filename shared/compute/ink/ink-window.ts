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
  const sums = integralOf(smooth, width, height);
  const shortfall = new Uint8Array(width * height);
  const tally = new Uint32Array(256);
  for (let y = 0; y < height; y += 1) {
    const y0 = Math.max(0, y - PAPER_RADIUS);
    const y1 = Math.min(height, y + PAPER_RADIUS + 1);
    for (let x = 0; x < width; x += 1) {
      const x0 = Math.max(0, x - PAPER_RADIUS);
      const x1 = Math.min(width, x + PAPER_RADIUS + 1);
      const row = width + 1;
      const sum = sums[y1 * row + x1]! - sums[y0 * row + x1]! - sums[y1 * row + x0]! + sums[y0 * row + x0]!;
      const paper = sum / ((x1 - x0) * (y1 - y0));
      const value = Math.max(0, Math.min(255, Math.round(paper - smooth[y * width + x]!)));
      shortfall[y * width + x] = value;
      tally[value]! += 1;
    }
  }
  return { width, height, ink: scaled(shortfall, fullStroke(tally, width * height)) };
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

/** Sums of all values above and left of each corner, (width + 1) × (height + 1). */
function integralOf(values: Uint8Array, width: number, height: number): Float64Array {
  const sums = new Float64Array((width + 1) * (height + 1));
  for (let y = 0; y < height; y += 1) {
    let row = 0;
    for (let x = 0; x < width; x += 1) {
      row += values[y * width + x]!;
      sums[(y + 1) * (width + 1) + x + 1] = sums[y * (width + 1) + x + 1]! + row;
    }
  }
  return sums;
}
