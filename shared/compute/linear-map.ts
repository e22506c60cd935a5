import { lengthOfVector } from '#shared/compute/geometry/length.ts';
/** A linear map of the plane, row by row: (x, y) ↦ (a·x + b·y, c·x + d·y). */
export type LinearMap = readonly [a: number, b: number, c: number, d: number];

export const IDENTITY: LinearMap = [1, 0, 0, 1];

/** What a linear map makes of a vector. */
export function mapped([a, b, c, d]: LinearMap, x: number, y: number): [x: number, y: number] {
  return [a * x + b * y, c * x + d * y];
}

/** The map that does `first` and then `second`. */
export function composed(second: LinearMap, first: LinearMap): LinearMap {
  const [x1, y1] = mapped(second, first[0], first[2]);
  const [x2, y2] = mapped(second, first[1], first[3]);
  return [x1, x2, y1, y2];
}

/** Area by which a map multiplies; negative where it mirrors. */
export function determinantOf([a, b, c, d]: LinearMap): number {
  return a * d - b * c;
}

/** The map backwards; not finite where the map flattens the plane. */
export function inverted(map: LinearMap): LinearMap {
  const [a, b, c, d] = map;
  const det = determinantOf(map);
  return [d / det, -b / det, -c / det, a / det];
}

/** The map with every length multiplied by `factor`. */
export function scaledBy([a, b, c, d]: LinearMap, factor: number): LinearMap {
  return [a * factor, b * factor, c * factor, d * factor];
}

/**
 * Greatest length that a map makes of a unit vector, its greater singular value: (r + s)/2 with r = |(a + d, c − b)|,
 * s = |(a − d, c + b)|. Source: closed form of the 2 × 2 singular values (Blinn 1996, Consider the lowly 2×2 matrix).
 */
export function greatestStretch([a, b, c, d]: LinearMap): number {
  return (lengthOfVector(a + d, c - b) + lengthOfVector(a - d, c + b)) / 2;
}

/** True when no entry of two maps differs by more than `tolerance`. */
export function nearlySame(first: LinearMap, second: LinearMap, tolerance: number): boolean {
  return first.every((entry, i) => Math.abs(entry - second[i]!) <= tolerance);
}
