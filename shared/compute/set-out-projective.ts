import { sectionPt, sheetPx } from '#shared/compute/frames.ts';
import { centroidOf, type KnownPlace } from '#shared/compute/known-places.ts';
import { leastSquares } from '#shared/compute/least-squares.ts';
import { determinantOf, greatestStretch, mapped } from '#shared/compute/linear-map.ts';
import {
  linearAt,
  type ProjectiveMap,
  planeProduct,
  projectiveInverse,
  throughPlane,
} from '#shared/compute/plane-map.ts';
import { type SectionMap, sectionMapOfFit } from '#shared/compute/section-map.ts';
import { sectionOfLinear } from '#shared/compute/set-out-affine.ts';
import type { FittedSection } from '#shared/compute/set-out-fit.ts';

/** The weights settle in two or three rounds. */
const ROUNDS = 8;
/** A place so near to the horizon, as a part of the scale in the middle, cannot be read. */
const HORIZON_PART = 0.05;

/**
 * Least-squares projective map from a photographed sheet to the section. With u, v and the section's coordinates about
 * their middles and divided by their reach, X = (a·u + b·v + c)/w, Z = (d·u + e·v + f)/w, w = g·u + h·v + 1; each known
 * figure is one linear equation, solved again with the weights 1/w of the round before, so that what is least are the
 * misses in the section. Pixels and section units. Null when the figures do not determine it, or when the horizon runs
 * between the places. Source: direct linear transformation (Hartley and Zisserman 2004, Multiple View Geometry, ch. 4).
 */
export function fitProjective(places: readonly KnownPlace[]): FittedSection | null {
  const centred = centredPlaces(places);
  const normal = centred && solved(centred.places);
  if (!centred || !normal) return null;
  const toSection = planeProduct(centred.toSection, planeProduct(normal, centred.fromSheet));
  const middle = centroidOf(places.map(({ sheet }) => sheet));
  const here = sectionOfLinear(linearAt(toSection, middle[0], middle[1]));
  if (here === null || !sidesAgree(toSection, places, middle)) return null;
  return { map: projectiveSectionMap(toSection, places, middle), ...here };
}

function centredPlaces(places: readonly KnownPlace[]) {
  const middle = centroidOf(places.map(({ sheet }) => sheet));
  const reach = Math.max(
    ...places.map(({ sheet }) => Math.hypot(sheet[0] - middle[0], sheet[1] - middle[1])),
  );
  const middles = [0, 1].map((axis) => {
    const known = places.flatMap(({ section }) => section[axis] ?? []);
    return known.length === 0 ? null : centroidOf(known.map((value) => [value, 0]))[0];
  });
  const [X, Z] = middles;
  if (X == null || Z == null || !(reach > 0)) return null;
  const range = Math.max(
    ...places.flatMap(({ section }) => [
      section[0] === null ? 0 : Math.abs(section[0] - X),
      section[1] === null ? 0 : Math.abs(section[1] - Z),
    ]),
  );
  if (!(range > 0)) return null;
  const fromSheet: ProjectiveMap = [
    1 / reach,
    0,
    -middle[0] / reach,
    0,
    1 / reach,
    -middle[1] / reach,
    0,
    0,
    1,
  ];
  const toSection: ProjectiveMap = [range, 0, X, 0, range, Z, 0, 0, 1];
  return {
    fromSheet,
    toSection,
    places: places.map(({ sheet, section }) => ({
      at: throughPlane(fromSheet, sheet[0], sheet[1]),
      known: [
        section[0] === null ? null : (section[0] - X) / range,
        section[1] === null ? null : (section[1] - Z) / range,
      ] as const,
    })),
  };
}

type CentredPlace = {
  readonly at: readonly [number, number];
  readonly known: readonly [number | null, number | null];
};

function solved(places: readonly CentredPlace[]): ProjectiveMap | null {
  let [g, h] = [0, 0];
  let map: ProjectiveMap | null = null;
  for (let round = 0; round < ROUNDS; round += 1) {
    const rows: number[][] = [];
    const values: number[] = [];
    for (const { at, known } of places) {
      const [u, v] = at;
      const weight = 1 / (g * u + h * v + 1);
      for (const axis of [0, 1] as const) {
        const value = known[axis];
        if (value === null) continue;
        const own = [u, v, 1];
        const none = [0, 0, 0];
        const row = [...(axis === 0 ? own : none), ...(axis === 0 ? none : own), -u * value, -v * value];
        rows.push(row.map((each) => each * weight));
        values.push(value * weight);
      }
    }
    const x = leastSquares(rows, values);
    if (x === null) return null;
    map = [...x, 1] as unknown as ProjectiveMap;
    [g, h] = [x[6]!, x[7]!];
  }
  return map;
}

/** True when no place lies on the horizon or beyond it, as seen from the middle of all. */
function sidesAgree(
  map: ProjectiveMap,
  places: readonly KnownPlace[],
  middle: readonly [number, number],
): boolean {
  const w = (x: number, y: number) => map[6] * x + map[7] * y + map[8];
  const here = w(middle[0], middle[1]);
  return places.every(({ sheet }) => w(sheet[0], sheet[1]) / here > HORIZON_PART);
}

/**
 * The map of a photographed section. Its linear part, scales and directions are those in the middle of the known points;
 * nets are read in `flattened` pixels, in which the section has one scale everywhere: that of the known point where a
 * pixel of the sheet is worth most, so that no accuracy in pixels is too small there.
 */
function projectiveSectionMap(
  toSection: ProjectiveMap,
  places: readonly KnownPlace[],
  middle: readonly [number, number],
): SectionMap {
  const back = projectiveInverse(toSection);
  const linear = linearAt(toSection, middle[0], middle[1]);
  const unitsPerPx = Math.max(
    ...places.map(({ sheet }) => greatestStretch(linearAt(toSection, sheet[0], sheet[1]))),
  );
  const middleSection = throughPlane(toSection, middle[0], middle[1]);
  const flat = flatMap(linear, unitsPerPx, middleSection, middle);
  const local = sectionMapOfFit({ linear, sheetOrigin: middle, sectionOrigin: middleSection }, unitsPerPx);
  const toSectionAt = (x: number, y: number) => sectionPt(...throughPlane(toSection, x, y));
  return {
    ...local,
    toSection: ([x, y]) => toSectionAt(x, y),
    toSheet: ([offset, elevation]) => sheetPx(...throughPlane(back, offset, elevation)),
    flattened: {
      map: flat,
      key: [...toSection, unitsPerPx],
      toFlat: ([x, y]) => flat.toSheet(toSectionAt(x, y)),
      toSheet: (place) => {
        const [offset, elevation] = flat.toSection(place);
        return sheetPx(...throughPlane(back, offset, elevation));
      },
    },
  };
}

/** Flattened pixels: the section at one scale, turned and mirrored as it is seen on the sheet. */
function flatMap(
  linear: ReturnType<typeof linearAt>,
  unitsPerPx: number,
  sectionOrigin: readonly [number, number],
  sheetOrigin: readonly [number, number],
): SectionMap {
  const [ux, uy] = mapped([linear[3], -linear[1], -linear[2], linear[0]], 0, 1);
  const det = determinantOf(linear);
  const length = Math.hypot(ux, uy) * Math.sign(det);
  const up: [number, number] = [ux / length, uy / length];
  // Level is square to up, on the side to which offsets grow.
  const side = det < 0 ? 1 : -1;
  const level: [number, number] = [-up[1] * side, up[0] * side];
  return sectionMapOfFit({
    linear: [level[0] * unitsPerPx, level[1] * unitsPerPx, up[0] * unitsPerPx, up[1] * unitsPerPx],
    sheetOrigin,
    sectionOrigin,
  });
}
