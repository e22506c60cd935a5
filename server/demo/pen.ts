import { seededRandom } from './seeded-random.ts';
import { type SheetFrame, toSheet } from './sheet-frame.ts';
import { lettering } from './stroke-letters.ts';

type Point = readonly [number, number];

export interface InkOptions {
  /** Stroke width in pixels. */
  width?: number;
  dash?: readonly number[];
}

/** Points along a polyline no further apart than `step`, so that the wobble has something to bend. */
function densify(points: readonly Point[], step: number): Point[] {
  const dense: Point[] = [];
  points.forEach((point, index) => {
    const before = points[index - 1];
    if (before) {
      const pieces = Math.max(1, Math.ceil(Math.hypot(point[0] - before[0], point[1] - before[1]) / step));
      for (let piece = 1; piece < pieces; piece += 1)
        dense.push([
          before[0] + ((point[0] - before[0]) * piece) / pieces,
          before[1] + ((point[1] - before[1]) * piece) / pieces,
        ]);
    }
    dense.push(point);
  });
  return dense;
}

/** A pen that draws in section coordinates as a steady hand does: nearly straight, never quite. */
export class Pen {
  private readonly paths: string[] = [];
  private readonly random: () => number;

  constructor(
    private readonly frame: SheetFrame,
    seed: number,
  ) {
    this.random = seededRandom(seed);
  }

  /** A polyline through points of the section (offset, elevation), metres. */
  line(points: readonly Point[], ink: InkOptions = {}): void {
    this.ink(
      points.map(([offset, elevation]) => toSheet(this.frame, offset, elevation)),
      ink,
    );
  }

  /** Text whose lower left corner is at a point of the section; `height` in metres at the drawing's scale. */
  text(text: string, at: Point, height: number, ink: InkOptions = {}): void {
    for (const stroke of lettering(text))
      this.line(
        stroke.map(([x, y]) => [at[0] + x * height, at[1] + y * height]),
        { width: 2.4, ...ink },
      );
  }

  /** Hatching at 45° below a line of ground, as impervious ground is drawn. */
  hatch(from: number, to: number, elevation: number, depth: number, spacing: number): void {
    for (let offset = from; offset < to; offset += spacing)
      this.line(
        [
          [offset, elevation],
          [offset - depth, elevation - depth],
        ],
        { width: 1.6 },
      );
  }

  svg(): string {
    const { widthPx, heightPx } = this.frame;
    return `<svg xmlns="http://www.w3.org/2000/svg" width="${widthPx}" height="${heightPx}">
      <g fill="none" stroke="#3b352b" stroke-linecap="round" stroke-linejoin="round">${this.paths.join('')}</g></svg>`;
  }

  private ink(points: readonly Point[], { width = 3, dash }: InkOptions): void {
    let drift: Point = [0, 0];
    const wobble = () => (this.random() - 0.5) * 0.9;
    const drawn = densify(points, 40).map(([x, y]) => {
      // A slow drift that always returns: the hand corrects itself within a pixel.
      drift = [drift[0] * 0.8 + wobble(), drift[1] * 0.8 + wobble()];
      return `${(x + drift[0]).toFixed(1)} ${(y + drift[1]).toFixed(1)}`;
    });
    const dashes = dash ? ` stroke-dasharray="${dash.join(' ')}"` : '';
    this.paths.push(`<path d="M${drawn.join('L')}" stroke-width="${width}"${dashes}/>`);
  }
}
