/** A pair of places that belong together: base-raster pixels and section coordinates. */
export type ControlPair = {
  readonly sheet: readonly [x: number, y: number];
  readonly section: readonly [offset: number, elevation: number];
};

/**
 * A place on the sheet of which offset, elevation or both are known, as a station along the foot of a long profile or an
 * elevation at its side. Each that is known is one equation of a fit.
 */
export type KnownPlace = {
  readonly sheet: readonly [x: number, y: number];
  readonly section: readonly [offset: number | null, elevation: number | null];
};

/** Sums over the places of which one coordinate is known, about their centroid: u to the right, v up the sheet, pixels. */
export type CoordinateSums = {
  readonly count: number;
  readonly sheetOrigin: readonly [x: number, y: number];
  /** Mean of the known values, from which their departures are taken. */
  readonly origin: number;
  readonly uu: number;
  readonly uv: number;
  readonly vv: number;
  readonly uValue: number;
  readonly vValue: number;
  readonly values: number;
};

/** Places parted by what is known of them. */
export type CentredKnown = {
  readonly sheetOrigin: readonly [x: number, y: number];
  readonly offsets: CoordinateSums;
  readonly elevations: CoordinateSums;
};

/** Sums of the equations of a fit; null when no offset or no elevation is known. */
export function centredKnown(places: readonly KnownPlace[]): CentredKnown | null {
  const offsets = sumsOf(places, 0);
  const elevations = sumsOf(places, 1);
  if (offsets.count === 0 || elevations.count === 0) return null;
  return { sheetOrigin: centroidOf(places.map(({ sheet }) => sheet)), offsets, elevations };
}

function sumsOf(places: readonly KnownPlace[], axis: 0 | 1): CoordinateSums {
  const known = places.filter(({ section }) => section[axis] !== null);
  const sheetOrigin = centroidOf(known.map(({ sheet }) => sheet));
  const [origin] = centroidOf(known.map(({ section }) => [section[axis] ?? 0, 0]));
  const sums = { uu: 0, uv: 0, vv: 0, uValue: 0, vValue: 0, values: 0 };
  for (const { sheet, section } of known) {
    const [u, v] = [sheet[0] - sheetOrigin[0], sheetOrigin[1] - sheet[1]];
    const value = (section[axis] ?? 0) - origin;
    sums.uu += u * u;
    sums.uv += u * v;
    sums.vv += v * v;
    sums.uValue += u * value;
    sums.vValue += v * value;
    sums.values += value * value;
  }
  return { count: known.length, sheetOrigin, origin, ...sums };
}

/** How many coordinates are known of all places: the equations of a fit. */
export function knownFigures(places: readonly KnownPlace[]): number {
  return places.reduce((sum, { section }) => sum + section.filter((value) => value !== null).length, 0);
}

/** Greatest difference among the known values of one coordinate, section units; 0 with fewer than two. */
export function rangeOfKnown(places: readonly KnownPlace[], axis: 0 | 1): number {
  const values = places.map(({ section }) => section[axis]).filter((value) => value !== null);
  return values.length < 2 ? 0 : Math.max(...values) - Math.min(...values);
}

/** Mean of places; the first is taken off before the sum, so that large coordinates lose no figures. */
export function centroidOf(points: ReadonlyArray<readonly [number, number]>): [number, number] {
  const first = points[0] ?? [0, 0];
  let x = 0;
  let y = 0;
  for (const point of points) {
    x += point[0] - first[0];
    y += point[1] - first[1];
  }
  return [first[0] + x / points.length, first[1] + y / points.length];
}
