import { inverted, type LinearMap, mapped } from '#shared/compute/linear-map.ts';

/**
 * A projective map of the plane, row by row: (x, y) ↦ ((a·x + b·y + c)/w, (d·x + e·y + f)/w), w = g·x + h·y + i. It keeps
 * straight lines straight. Pixels in, pixels out; not finite on the line w = 0, the horizon.
 */
export type ProjectiveMap = readonly [
  a: number,
  b: number,
  c: number,
  d: number,
  e: number,
  f: number,
  g: number,
  h: number,
  i: number,
];
/** What a picture may be seen through: a linear map about the origin, or a projective one. */
export type PlaneMap = LinearMap | ProjectiveMap;
type Place = readonly [x: number, y: number];

export const SAME_PLACE: ProjectiveMap = [1, 0, 0, 0, 1, 0, 0, 0, 1];

/** A plane map as a projective one. */
export function asProjective(map: PlaneMap): ProjectiveMap {
  if (map.length === 9) return map;
  const [a, b, c, d] = map;
  return [a, b, 0, c, d, 0, 0, 0, 1];
}

/** Where a plane map puts a place. */
export function throughPlane(map: PlaneMap, x: number, y: number): [x: number, y: number] {
  if (map.length === 4) return mapped(map, x, y);
  const [a, b, c, d, e, f, g, h, i] = map;
  const w = g * x + h * y + i;
  return [(a * x + b * y + c) / w, (d * x + e * y + f) / w];
}

/** The map that does `first` and then `second`. */
export function planeProduct(second: PlaneMap, first: PlaneMap): ProjectiveMap {
  const [a, b, c, d, e, f, g, h, i] = asProjective(second);
  const [j, k, l, m, n, o, p, q, r] = asProjective(first);
  return [
    a * j + b * m + c * p,
    a * k + b * n + c * q,
    a * l + b * o + c * r,
    d * j + e * m + f * p,
    d * k + e * n + f * q,
    d * l + e * o + f * r,
    g * j + h * m + i * p,
    g * k + h * n + i * q,
    g * l + h * o + i * r,
  ];
}

/** The map backwards; not finite where the map flattens the plane. */
export function planeInverse(map: PlaneMap): PlaneMap {
  return map.length === 4 ? inverted(map) : projectiveInverse(map);
}

/** Inverse by cofactors, scaled so that the last entry is 1 where it is not 0. */
export function projectiveInverse([a, b, c, d, e, f, g, h, i]: ProjectiveMap): ProjectiveMap {
  const A = e * i - f * h;
  const B = f * g - d * i;
  const C = d * h - e * g;
  const det = a * A + b * B + c * C;
  const cofactors = [
    A,
    c * h - b * i,
    b * f - c * e,
    B,
    a * i - c * g,
    c * d - a * f,
    C,
    b * g - a * h,
    a * e - b * d,
  ];
  const last = cofactors[8]!;
  const scale = last === 0 ? det : last;
  return cofactors.map((entry) => entry / scale) as unknown as ProjectiveMap;
}

/** Area by which a plane map multiplies about a place; negative where it mirrors. */
export function areaScaleAt(map: PlaneMap, x: number, y: number): number {
  const [a, b, c, d] = linearAt(map, x, y);
  return a * d - b * c;
}

/** What a plane map does to small steps from a place. */
export function linearAt(map: PlaneMap, x: number, y: number): LinearMap {
  if (map.length === 4) return map;
  const [a, b, , d, e, , g, h, i] = map;
  const w = g * x + h * y + i;
  const [X, Y] = throughPlane(map, x, y);
  return [(a - g * X) / w, (b - h * X) / w, (d - g * Y) / w, (e - h * Y) / w];
}

/** True when a plane map keeps parallels parallel. */
export function isAffine(map: PlaneMap): boolean {
  return map.length === 4 || (map[6] === 0 && map[7] === 0);
}

/**
 * The projective map that takes four places to four others, in the same order; null when three of either lie on one line
 * or nearly so. By way of the unit square. Source: Heckbert (1989), Fundamentals of Texture Mapping and Image Warping,
 * section 2.2.3.
 */
export function mapOfFourPlaces(from: readonly Place[], to: readonly Place[]): ProjectiveMap | null {
  const first = squareTo(from);
  const second = squareTo(to);
  if (first === null || second === null) return null;
  return planeProduct(second, projectiveInverse(first));
}

/** Cross products below this part of the longest side squared count as places on one line. */
const FLAT_PART = 1e-6;

function squareTo(places: readonly Place[]): ProjectiveMap | null {
  const [p, q, r, s] = places;
  if (!p || !q || !r || !s || hasThreeOnALine([p, q, r, s])) return null;
  const [dx1, dx2, dx3] = [q[0] - r[0], s[0] - r[0], p[0] - q[0] + r[0] - s[0]];
  const [dy1, dy2, dy3] = [q[1] - r[1], s[1] - r[1], p[1] - q[1] + r[1] - s[1]];
  const det = dx1 * dy2 - dx2 * dy1;
  const g = (dx3 * dy2 - dx2 * dy3) / det;
  const h = (dx1 * dy3 - dx3 * dy1) / det;
  return [
    q[0] - p[0] + g * q[0],
    s[0] - p[0] + h * s[0],
    p[0],
    q[1] - p[1] + g * q[1],
    s[1] - p[1] + h * s[1],
    p[1],
    g,
    h,
    1,
  ];
}

function hasThreeOnALine(places: readonly Place[]): boolean {
  const longest = Math.max(...places.flatMap((a) => places.map((b) => Math.hypot(a[0] - b[0], a[1] - b[1]))));
  return places.some((_, skipped) => {
    const [a, b, c] = places.filter((_, index) => index !== skipped) as [Place, Place, Place];
    const cross = (b[0] - a[0]) * (c[1] - a[1]) - (b[1] - a[1]) * (c[0] - a[0]);
    return !(Math.abs(cross) > FLAT_PART * longest * longest);
  });
}
