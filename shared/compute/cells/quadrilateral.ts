import type { Pair } from '#shared/compute/geometry/predicates.ts';

/**
 * The four sides of a cell, working pixels: `before` and `after` along its head lines from left to right, `left` and
 * `right` along the flow from the line before to the line after, so that the corners agree.
 */
export type CellSides = {
  readonly before: readonly Pair[];
  readonly after: readonly Pair[];
  readonly left: readonly Pair[];
  readonly right: readonly Pair[];
};

/** What is measured of a cell, working pixels; angles in degrees. */
export type CellMeasures = {
  /** Length along the flow, L: mean of four lines from head line to head line. */
  readonly length: number;
  /** Width across the flow, B: mean of four lines from rail to rail. */
  readonly width: number;
  /** Angle between the two mid-lines where they cross, 0 to 180, measured from the flow to the right-hand side. */
  readonly midAngleDeg: number;
  /** The two mid-lines, along the flow and across it. */
  readonly along: readonly Pair[];
  readonly across: readonly Pair[];
  readonly middle: Pair;
  readonly area: number;
};

/** Lines by which each mean length is taken, and the pieces of each line. */
const LINES = 4;
const PIECES = 4;
/** Steps of the grid, so that the middles of the parts and the ends of the pieces both lie on it. */
const STEPS = 8;

/**
 * Length, width, mid-lines, middle and area of a four-sided cell with curved sides. The inside is spanned by the sides
 * (transfinite interpolation: Gordon and Hall 1973), each side run through evenly; L and B are the mean lengths of the
 * lines of that span through the middles of four equal parts of the other direction. On a cell between two rays and
 * two arcs L is exactly the arc half-way and B the distance between the arcs.
 */
export function measureCell(sides: CellSides): CellMeasures {
  const span = spanOf(sides);
  const half = STEPS / 2;
  const along = lineOf(span, half, 'along');
  const across = lineOf(span, half, 'across');
  return {
    length: meanLength(span, 'along'),
    width: meanLength(span, 'across'),
    midAngleDeg: angleBetween(ends(along[1]!, along[3]!), ends(across[1]!, across[3]!)),
    along,
    across,
    middle: along[PIECES / 2]!,
    area: Math.abs(areaOf(sides)),
  };
}

/** The four corners and the middles of the four sides, in order round the cell. */
export function outlineOf({ before, after, left, right }: CellSides): Pair[] {
  const halfway = (side: readonly Pair[]) => evenlyAlong(side, 2)[1]!;
  return [
    before[0]!,
    halfway(before),
    before[before.length - 1]!,
    halfway(right),
    after[after.length - 1]!,
    halfway(after),
    after[0]!,
    halfway(left),
  ];
}

/** Length of a run of points, in their unit. */
export function lengthOfPoints(points: readonly Pair[]): number {
  let length = 0;
  for (let i = 1; i < points.length; i += 1) length += distance(points[i - 1]!, points[i]!);
  return length;
}

/** Angle from one direction to another, 0 to 180 degrees; 90 when either has no length. */
export function angleBetween(a: Pair, b: Pair): number {
  const cross = a[0] * b[1] - a[1] * b[0];
  const dot = a[0] * b[0] + a[1] * b[1];
  return cross === 0 && dot === 0 ? 90 : (Math.atan2(Math.abs(cross), dot) * 180) / Math.PI;
}

/**
 * The grid that the sides span, `STEPS` steps each way: x and y flat, index u + v·(STEPS + 1), u from left to right and v
 * from the line before to the line after.
 */
type Span = { readonly x: Float64Array; readonly y: Float64Array };

function spanOf({ before, after, left, right }: CellSides): Span {
  const sides = [before, after, left, right].map((side) => evenlyAlong(side, STEPS)) as Pair[][];
  return { x: spanAxis(sides, 0), y: spanAxis(sides, 1) };
}

function spanAxis([b, a, l, r]: readonly Pair[][], axis: 0 | 1): Float64Array {
  const grid = new Float64Array((STEPS + 1) ** 2);
  const [b0, b1] = [b![0]![axis], b![STEPS]![axis]];
  const [a0, a1] = [a![0]![axis], a![STEPS]![axis]];
  for (let j = 0; j <= STEPS; j += 1) {
    const v = j / STEPS;
    for (let i = 0; i <= STEPS; i += 1) {
      const u = i / STEPS;
      const fromSides = (1 - v) * b![i]![axis] + v * a![i]![axis] + (1 - u) * l![j]![axis] + u * r![j]![axis];
      const fromCorners = (1 - v) * ((1 - u) * b0 + u * b1) + v * ((1 - u) * a0 + u * a1);
      grid[i + j * (STEPS + 1)] = fromSides - fromCorners;
    }
  }
  return grid;
}

/** Index of the k-th point of a line of the grid, every second step along it. */
function indexOf(line: number, k: number, way: 'along' | 'across'): number {
  const step = (k * STEPS) / PIECES;
  return way === 'along' ? line + step * (STEPS + 1) : step + line * (STEPS + 1);
}

function lineOf({ x, y }: Span, line: number, way: 'along' | 'across'): Pair[] {
  return Array.from({ length: PIECES + 1 }, (_, k): Pair => {
    const i = indexOf(line, k, way);
    return [x[i]!, y[i]!];
  });
}

function meanLength({ x, y }: Span, way: 'along' | 'across'): number {
  let sum = 0;
  for (let line = 1; line < STEPS; line += STEPS / LINES) {
    for (let k = 1; k <= PIECES; k += 1) {
      const from = indexOf(line, k - 1, way);
      const to = indexOf(line, k, way);
      sum += Math.sqrt((x[to]! - x[from]!) ** 2 + (y[to]! - y[from]!) ** 2);
    }
  }
  return sum / LINES;
}

/** Points that part a run of points into equal lengths, ends included. */
export function evenlyAlong(points: readonly Pair[], pieces: number): Pair[] {
  const whole = lengthOfPoints(points);
  const found: Pair[] = [points[0]!];
  let passed = 0;
  let i = 1;
  for (let k = 1; k < pieces; k += 1) {
    const wanted = (whole * k) / pieces;
    while (i < points.length - 1 && passed + distance(points[i - 1]!, points[i]!) < wanted) {
      passed += distance(points[i - 1]!, points[i]!);
      i += 1;
    }
    found.push(towards(points[i - 1]!, points[Math.min(i, points.length - 1)]!, wanted - passed));
  }
  found.push(points[points.length - 1]!);
  return found;
}

function towards(from: Pair, to: Pair, by: number): Pair {
  const whole = distance(from, to);
  const part = whole > 0 ? Math.min(1, by / whole) : 0;
  return [from[0] + part * (to[0] - from[0]), from[1] + part * (to[1] - from[1])];
}

/** Signed area between the four sides, each taken from corner to corner; about a corner, to avoid cancellation. */
function areaOf({ before, after, left, right }: CellSides): number {
  const origin = before[0]!;
  return sweptBy(before, origin) + sweptBy(right, origin) - sweptBy(after, origin) - sweptBy(left, origin);
}

/** Area that the ray from a place sweeps along a run of points. */
function sweptBy(points: readonly Pair[], [x0, y0]: Pair): number {
  let twice = 0;
  for (let i = 1; i < points.length; i += 1) {
    const [ax, ay] = points[i - 1]!;
    const [bx, by] = points[i]!;
    twice += (ax - x0) * (by - y0) - (bx - x0) * (ay - y0);
  }
  return twice / 2;
}

function ends(from: Pair, to: Pair): Pair {
  return [to[0] - from[0], to[1] - from[1]];
}

function distance(a: Pair, b: Pair): number {
  const dx = b[0] - a[0];
  const dy = b[1] - a[1];
  return Math.sqrt(dx * dx + dy * dy);
}
