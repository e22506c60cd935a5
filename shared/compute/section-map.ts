import { type SectionPt, type SheetPx, sectionPt, sheetPx } from '#shared/compute/frames.ts';
import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import { determinantOf, inverted, type LinearMap, mapped } from '#shared/compute/linear-map.ts';
import {
  type Similarity,
  similarityBackward,
  similarityForward,
  similarityScale,
} from '#shared/compute/similarity.ts';

/**
 * Both ways between pixels and the natural section, with the scales of the section. The pixels are the sheet's, or the
 * working pixels of `working-frame.ts`.
 */
export type SectionMap = {
  toSection(place: SheetPx): SectionPt;
  toSheet(place: SectionPt): SheetPx;
  /** Section units per pixel; the geometric mean where lengths differ with the direction. */
  readonly unitsPerPx: number;
  /**
   * Elevation that a pixel of the sheet is worth, across the level lines: by it an accuracy in pixels becomes one in
   * elevation. The same for the sheet's pixels and for working pixels made of them.
   */
  readonly elevationPerPx: number;
  /** Direction of the section's up, along which the offset does not change: a unit vector in pixels (y down). */
  readonly up: readonly [x: number, y: number];
  /** Change of offset and elevation with a step in pixels. */
  readonly linear: LinearMap;
  /** Where lengths differ from place to place, as on a photograph taken aslant: the pixels in which a net is read. */
  readonly flattened?: FlattenedMap;
  /** Natural length of a step of one pixel in the direction (dx, dy), which need not be a unit vector. */
  lengthPerPxAlong(dx: number, dy: number): number;
};

/** Pixels of a picture whose section has one scale and no perspective. */
export type FlattenedMap = {
  /** From these pixels to the natural section. */
  readonly map: SectionMap;
  /** The same figures for the same pixels. */
  readonly key: readonly number[];
  toFlat(place: SheetPx): SheetPx;
  toSheet(place: SheetPx): SheetPx;
};

/** The map that belongs to a fitted similarity. The similarity's scale must not be zero. */
export function sectionMapOf(similarity: Similarity): SectionMap {
  const unitsPerPx = similarityScale(similarity);
  const { re, im, mirrored } = similarity;
  const side = mirrored ? -1 : 1;
  return {
    toSection: (place) => sectionPt(...similarityForward(similarity, place[0], place[1])),
    toSheet: (place) => sheetPx(...similarityBackward(similarity, place[0], place[1])),
    unitsPerPx,
    elevationPerPx: unitsPerPx,
    up: [im / unitsPerPx, -re / unitsPerPx],
    linear: [side * re, side * im, im, -re],
    lengthPerPxAlong: () => unitsPerPx,
  };
}

/** A linear map between pixels and section about two places that belong together. */
export type SectionFit = {
  readonly linear: LinearMap;
  readonly sheetOrigin: readonly [x: number, y: number];
  readonly sectionOrigin: readonly [offset: number, elevation: number];
};

/**
 * The map of a section whose lengths differ with the direction. `elevationPerPx`: what a pixel of the sheet is worth in
 * elevation, when the pixels are not the sheet's own. The linear part must not flatten the plane.
 */
export function sectionMapOfFit(fit: SectionFit, elevationPerPx: number | null = null): SectionMap {
  const { linear, sheetOrigin, sectionOrigin } = fit;
  const back = inverted(linear);
  const [upX, upY] = mapped(back, 0, 1);
  const upLength = lengthOfVector(upX, upY);
  return {
    toSection: ([x, y]) => {
      const [offset, elevation] = mapped(linear, x - sheetOrigin[0], y - sheetOrigin[1]);
      return sectionPt(sectionOrigin[0] + offset, sectionOrigin[1] + elevation);
    },
    toSheet: ([offset, elevation]) => {
      const [x, y] = mapped(back, offset - sectionOrigin[0], elevation - sectionOrigin[1]);
      return sheetPx(sheetOrigin[0] + x, sheetOrigin[1] + y);
    },
    unitsPerPx: Math.sqrt(Math.abs(determinantOf(linear))),
    elevationPerPx: elevationPerPx ?? lengthOfVector(linear[2], linear[3]),
    up: [upX / upLength, upY / upLength],
    linear,
    lengthPerPxAlong: (dx, dy) => lengthOfVector(...mapped(linear, dx, dy)) / lengthOfVector(dx, dy),
  };
}
