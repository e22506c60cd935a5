import type { InkWindow } from '#shared/compute/ink/ink-window.ts';

type Place = readonly [x: number, y: number];

/** A scan drawn in code, with the line that is to be followed and where its middle truly runs. */
export type InkScan = {
  readonly window: InkWindow;
  readonly from: Place;
  readonly to: Place;
  readonly middle: readonly Place[];
};

export type InkScanLook = {
  readonly seed: number;
  /** Grey of the paper at the two sides of the sheet, and of the ink. */
  readonly paper: readonly [left: number, right: number];
  readonly ink: number;
  /** Specks to a thousand pixels, and the part of the stroke that has faded away. */
  readonly specks: number;
  readonly gaps: number;
  /** True for a scan in black and white. */
  readonly bilevel: boolean;
};

const SIDE = 700;
const STROKE_PX = 2;

/**
 * A window of a net drawn by hand with 2 px strokes: a bent line to be followed, lines that cross it, gaps, speckle and
 * toned paper. The same seed gives the same scan.
 */
export function inkScan(look: InkScanLook): InkScan {
  const random = randomOf(look.seed);
  const middle = bentLine(random, 40, 660);
  const crossing = Array.from({ length: 4 }, (_, i) => crossLine(random, 130 + 140 * i));
  const coverage = new Float32Array(SIDE * SIDE);
  stroke(coverage, middle, gapsOf(random, middle, look.gaps));
  for (const line of crossing) stroke(coverage, line, []);
  const grey = new Uint8Array(SIDE * SIDE);
  for (let y = 0; y < SIDE; y += 1) {
    for (let x = 0; x < SIDE; x += 1) {
      const tone = look.paper[0] + ((look.paper[1] - look.paper[0]) * x) / SIDE + 8 * (random() - 0.5);
      const speck = random() < look.specks / 1000 ? 1 : 0;
      const value = tone + (look.ink - tone) * Math.max(coverage[y * SIDE + x]!, speck);
      grey[y * SIDE + x] = look.bilevel ? (value < (tone + look.ink) / 2 ? 0 : 255) : value;
    }
  }
  return {
    window: { width: SIDE, height: SIDE, grey },
    from: middle[0]!,
    to: middle[middle.length - 1]!,
    middle,
  };
}

function randomOf(seed: number): () => number {
  let state = seed * 2654435761 + 1;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 4294967296;
  };
}

function bentLine(random: () => number, from: number, to: number): Place[] {
  const [a, b] = [60 + 80 * random(), 20 + 20 * random()];
  const [p, q] = [random() * 6, random() * 6];
  const heights = (x: number) => 350 + a * Math.sin(x / 210 + p) + b * Math.sin(x / 60 + q);
  return Array.from({ length: 2 * (to - from) + 1 }, (_, i): Place => [from + i / 2, heights(from + i / 2)]);
}

function crossLine(random: () => number, at: number): Place[] {
  const lean = 80 * (random() - 0.5);
  return Array.from({ length: 2 * SIDE }, (_, i): Place => [at + (lean * i) / SIDE, i / 2]);
}

/** Pieces of the line, by index, that have faded. */
function gapsOf(
  random: () => number,
  line: readonly Place[],
  part: number,
): Array<readonly [number, number]> {
  const gaps: Array<readonly [number, number]> = [];
  for (let lost = 0; lost < part * line.length; ) {
    const length = 10 + Math.floor(random() * 30);
    const start = 20 + Math.floor(random() * (line.length - length - 40));
    gaps.push([start, start + length]);
    lost += length;
  }
  return gaps;
}

/** Adds a stroke to the coverage of the pixels, 0 to 1, softened over half a pixel at its edges. */
function stroke(
  coverage: Float32Array,
  line: readonly Place[],
  gaps: ReadonlyArray<readonly [number, number]>,
): void {
  line.forEach(([x, y], i) => {
    if (gaps.some(([from, to]) => i >= from && i < to)) return;
    for (let v = Math.floor(y) - 3; v <= Math.floor(y) + 3; v += 1) {
      for (let u = Math.floor(x) - 3; u <= Math.floor(x) + 3; u += 1) {
        if (u < 0 || v < 0 || u >= SIDE || v >= SIDE) continue;
        const distance = Math.hypot(u + 0.5 - x, v + 0.5 - y);
        const covered = Math.min(1, Math.max(0, STROKE_PX / 2 + 0.5 - distance));
        const at = v * SIDE + u;
        if (covered > coverage[at]!) coverage[at] = covered;
      }
    }
  });
}

/** Looks of scans from good to bad, by name. */
export const INK_LOOKS: Readonly<Record<string, Omit<InkScanLook, 'seed'>>> = {
  clean: { paper: [250, 250], ink: 20, specks: 0, gaps: 0, bilevel: false },
  toned: { paper: [225, 170], ink: 70, specks: 2, gaps: 0.08, bilevel: false },
  faded: { paper: [215, 195], ink: 140, specks: 4, gaps: 0.12, bilevel: false },
  fax: { paper: [250, 250], ink: 10, specks: 5, gaps: 0.1, bilevel: true },
};
