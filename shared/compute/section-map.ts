import { type SectionPt, type SheetPx, sectionPt, sheetPx } from '#shared/compute/frames.ts';
import {
  type Similarity,
  similarityBackward,
  similarityForward,
  similarityScale,
} from '#shared/compute/similarity.ts';

/** Both ways between the sheet and the section, with the scale of the section. */
export type SectionMap = {
  toSection(place: SheetPx): SectionPt;
  toSheet(place: SectionPt): SheetPx;
  /** Section units per pixel. */
  readonly unitsPerPx: number;
  /** Direction of the section's up on the sheet, a unit vector in base-raster pixels (y down). */
  readonly up: readonly [x: number, y: number];
};

/** The map that belongs to a fitted similarity. The similarity's scale must not be zero. */
export function sectionMapOf(similarity: Similarity): SectionMap {
  const unitsPerPx = similarityScale(similarity);
  return {
    toSection: (place) => sectionPt(...similarityForward(similarity, place[0], place[1])),
    toSheet: (place) => sheetPx(...similarityBackward(similarity, place[0], place[1])),
    unitsPerPx,
    up: [similarity.im / unitsPerPx, -similarity.re / unitsPerPx],
  };
}
