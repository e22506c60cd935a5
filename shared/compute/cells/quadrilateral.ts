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

/**
 * Length, width, mid-lines, middle and area of a four-sided cell with curved sides. The inside is spanned by the sides
 * (transfinite interpolation: Gordon and Hall 1973), each side run through evenly; L and B are the mean lengths of the
 * lines of that span through the middles of four equal parts of the other direction. On a cell between two rays and
 * two arcs L is exactly the arc half-way and B the distance between the arcs.
 */
export function measureCell(sides: CellSides): CellMeasures {
  const span = spanOf(sides);
  const along = lineOf((t) => span(0.5, t));
  const across = lineOf((t) => span(t, 0.5));
  const parts = Array.from({ length: LINES }, (_, i) => (i + 0.5) / LINES);
  return {
    length: mean(parts.map((u) => lengthOfPoints(lineOf((t) => span(u, t))))),
    width: mean(parts.map((v) => lengthOfPoints(lineOf((t) => span(t, v))))),
    midAngleDeg: angleBetween(ends(span(0.5, 0.25), span(0.5, 0.75)), ends(span(0.25, 0.5), span(0.75, 0.5))),
    along,
    across,
    middle: span(0.5, 0.5),
    area: Math.abs(
      areaOf([...sides.before, ...sides.right, ...[...sides.after].reverse(), ...[...sides.left].reverse()]),
    ),
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

function spanOf({ before, after, left, right }: CellSides): (u: number, v: number) => Pair {
  const pieces = 2 * PIECES;
  const b = evenlyAlong(before, pieces);
  const a = evenlyAlong(after, pieces);
  const l = evenlyAlong(left, pieces);
  const r = evenlyAlong(right, pieces);
  const at = (u: number, v: number, axis: 0 | 1) => {
    const i = Math.round(u * pieces);
    const j = Math.round(v * pieces);
    const sides = (1 - v) * b[i]![axis] + v * a[i]![axis] + (1 - u) * l[j]![axis] + u * r[j]![axis];
    const corners =
      (1 - v) * ((1 - u) * b[0]![axis] + u * b[pieces]![axis]) +
      v * ((1 - u) * a[0]![axis] + u * a[pieces]![axis]);
    return sides - corners;
  };
  return (u, v) => [at(u, v, 0), at(u, v, 1)];
}

function lineOf(at: (t: number) => Pair): Pair[] {
  return Array.from({ length: PIECES + 1 }, (_, i) => at(i / PIECES));
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

function areaOf(points: readonly Pair[]): number {
  const [x0, y0] = points[0]!;
  let twice = 0;
  for (let i = 1; i + 1 < points.length; i += 1) {
    const [ax, ay] = points[i]!;
    const [bx, by] = points[i + 1]!;
    twice += (ax - x0) * (by - y0) - (bx - x0) * (ay - y0);
  }
  return twice / 2;
}

function ends(from: Pair, to: Pair): Pair {
  return [to[0] - from[0], to[1] - from[1]];
}

function distance(a: Pair, b: Pair): number {
  return Math.hypot(b[0] - a[0], b[1] - a[1]);
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}
