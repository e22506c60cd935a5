import { sheetPx } from '#shared/compute/frames.ts';
import { mapped } from '#shared/compute/linear-map.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';

type Place = readonly [x: number, y: number];

/** One leg that was measured. */
export type RulerLeg = {
  /** Pixels of the sheet. */
  readonly lengthPx: number;
  /** True length in the natural section, section units; null before it is set out. */
  readonly length: number | null;
  /** Change of offset and elevation from the first end to the second, section units; null before it is set out. */
  readonly offset: number | null;
  readonly elevation: number | null;
  /** n of the slope 1:n, horizontal over vertical; null for a level leg, 0 for an upright one. */
  readonly slope: number | null;
  /** Angle to the level, degrees from 0 to 90. */
  readonly angleDeg: number;
  /** Angle at its first end to the leg before, degrees from 0 to 180; null for the first leg. */
  readonly cornerDeg: number | null;
};

export type RulerFigures = {
  readonly legs: readonly RulerLeg[];
  readonly lengthPx: number;
  readonly length: number | null;
  /** Area of the closed shape, square pixels and square section units; null while it is open. */
  readonly areaPx: number | null;
  readonly area: number | null;
};

/**
 * Lengths, slopes, angles and the area of legs drawn on the sheet. `places`: their ends, sheet pixels; `closed`: a last
 * leg leads back to the first place. With `map` all is of the natural section, an exaggeration of the drawing taken out;
 * without one slopes and angles are those of the sheet. The area is that of the ring by the shoelace formula about its
 * first place; of a ring that crosses itself it is no area of ground.
 */
export function rulerFigures(
  places: readonly Place[],
  closed: boolean,
  map: SectionMap | null,
): RulerFigures {
  const ring = closed && places.length >= 3;
  const ends = ring ? [...places, places[0]!] : places;
  const steps = ends.slice(1).map((to, i) => stepOf(ends[i]!, to, map));
  const legs = steps.map((step, i) => legOf(step, i > 0 ? steps[i - 1]! : null, map !== null));
  const lengthPx = legs.reduce((sum, leg) => sum + leg.lengthPx, 0);
  const areaPx = ring ? Math.abs(ringArea(places)) : null;
  const section = map === null ? null : places.map(([x, y]) => map.toSection(sheetPx(x, y)));
  return {
    legs,
    lengthPx,
    length: map === null ? null : legs.reduce((sum, leg) => sum + (leg.length ?? 0), 0),
    areaPx,
    area: ring && section !== null ? Math.abs(ringArea(section)) : null,
  };
}

/** A leg on the sheet, and as a vector in the section, or on the sheet with y up where there is none. */
type Step = { readonly px: number; readonly along: number; readonly up: number };

function stepOf(from: Place, to: Place, map: SectionMap | null): Step {
  const [dx, dy] = [to[0] - from[0], to[1] - from[1]];
  const [along, up] = map === null ? [dx, -dy] : mapped(map.linear, dx, dy);
  return { px: Math.hypot(dx, dy), along, up };
}

function legOf({ px, along, up }: Step, before: Step | null, isSetOut: boolean): RulerLeg {
  const length = Math.hypot(along, up);
  return {
    lengthPx: px,
    length: isSetOut ? length : null,
    offset: isSetOut ? along : null,
    elevation: isSetOut ? up : null,
    slope: Math.abs(up) < 1e-9 * length ? null : Math.abs(along / up),
    angleDeg: degrees(Math.atan2(Math.abs(up), Math.abs(along))),
    cornerDeg: before === null ? null : cornerOf(before, { px, along, up }),
  };
}

/** Angle between the way back along one leg and the next leg. */
function cornerOf(before: Step, leg: Step): number {
  const cross = -before.along * leg.up + before.up * leg.along;
  const dot = -before.along * leg.along - before.up * leg.up;
  return degrees(Math.abs(Math.atan2(cross, dot)));
}

function ringArea(ring: readonly Place[]): number {
  const [x0, y0] = ring[0]!;
  return (
    ring.reduce((sum, [x, y], i) => {
      const [nx, ny] = ring[(i + 1) % ring.length]!;
      return sum + (x - x0) * (ny - y0) - (nx - x0) * (y - y0);
    }, 0) / 2
  );
}

const degrees = (radians: number) => (radians * 180) / Math.PI;
