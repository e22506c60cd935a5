import { type SectionPt, sectionPt, sheetPx } from '#shared/compute/frames.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { EntityOf } from '#shared/contract/document.ts';

/** A place at which a profile is read; `distance` along it in the natural section, null in a grid. */
export type ProfilePlace = { readonly at: SectionPt; readonly distance: number | null };

/** The places of a profile; `coarser` when its spacing would have made more than are read. */
export type ProfilePlaces = { readonly places: readonly ProfilePlace[]; readonly coarser: boolean };

/** More places than this a profile is not read at. */
export const MOST_PLACES = 2000;
/** A grid without a spacing has this many steps along its longer side. */
const GRID_STEPS = 20;

/**
 * The places at which a profile is read, in the natural section. A line is read at its ends, its vertices, and evenly in
 * between at no more than the spacing; without one at its vertices only. A grid is read row by row from its lowest
 * offsets and elevations. `map` belongs to the pixels in which the profile's own sheet points are.
 */
export function placesOf(profile: EntityOf<'profile'>, map: SectionMap): ProfilePlaces {
  const { place, spacing } = profile;
  if (place.on === 'grid') return gridOf(place.corners, spacing);
  const vertices =
    place.on === 'sheet'
      ? place.points.map((point) => map.toSection(sheetPx(...point)))
      : place.points.map((point) => sectionPt(...point));
  return alongLine(vertices.filter(isFinitePlace), spacing);
}

function alongLine(vertices: readonly SectionPt[], spacing: number | null): ProfilePlaces {
  const first = vertices[0];
  if (first === undefined) return { places: [], coarser: false };
  const lengths = vertices.slice(1).map((to, i) => distance(vertices[i]!, to));
  const whole = lengths.reduce((sum, length) => sum + length, 0);
  const least = whole / Math.max(1, MOST_PLACES - vertices.length);
  const step = spacing === null ? Number.POSITIVE_INFINITY : Math.max(spacing, least);
  const places: ProfilePlace[] = [{ at: first, distance: 0 }];
  let passed = 0;
  for (const [i, length] of lengths.entries()) {
    const [from, to] = [vertices[i]!, vertices[i + 1]!];
    // Rounding must not add a place: 10 lengths of 0.1 are 10 steps, not 11.
    const pieces = Math.max(1, Math.ceil(length / step - 1e-9));
    for (let k = 1; k <= pieces; k += 1) {
      const part = k / pieces;
      places.push({ at: between(from, to, part), distance: passed + part * length });
    }
    passed += length;
  }
  return { places, coarser: spacing !== null && step > spacing };
}

function gridOf(
  [a, b]: readonly [readonly [number, number], readonly [number, number]],
  spacing: number | null,
): ProfilePlaces {
  const low = [Math.min(a[0], b[0]), Math.min(a[1], b[1])] as const;
  const [width, height] = [Math.abs(b[0] - a[0]), Math.abs(b[1] - a[1])];
  const wanted = spacing ?? Math.max(width, height) / GRID_STEPS;
  let step = wanted;
  const count = (side: number) => (step > 0 ? Math.floor(side / step + 1e-9) + 1 : 1);
  const across = Math.max(width, height);
  if (count(width) * count(height) > MOST_PLACES) {
    // With s = √(A/n) + (w + h)/n no more than n nodes fit, however long and narrow the grid.
    step = Math.max(wanted, Math.sqrt((width * height) / MOST_PLACES) * 1.1, (1.1 * across) / MOST_PLACES);
    while (count(width) * count(height) > MOST_PLACES) step *= 1.1;
  }
  const places = Array.from({ length: count(height) }, (_, row) =>
    Array.from({ length: count(width) }, (_, column) => ({
      at: sectionPt(low[0] + column * step, low[1] + row * step),
      distance: null,
    })),
  ).flat();
  return { places, coarser: step > wanted };
}

function between(from: SectionPt, to: SectionPt, part: number): SectionPt {
  return part === 1 ? to : sectionPt(from[0] + part * (to[0] - from[0]), from[1] + part * (to[1] - from[1]));
}

function distance(from: SectionPt, to: SectionPt): number {
  return Math.hypot(to[0] - from[0], to[1] - from[1]);
}

function isFinitePlace(place: SectionPt): boolean {
  return Number.isFinite(place[0]) && Number.isFinite(place[1]);
}
