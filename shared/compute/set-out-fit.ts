import { sheetPx } from '#shared/compute/frames.ts';
import type { KnownPlace } from '#shared/compute/known-places.ts';
import { type SectionMap, sectionMapOf, sectionMapOfFit } from '#shared/compute/section-map.ts';
import { type Similarity, similarityRotation, similarityScale } from '#shared/compute/similarity.ts';
import { sectionFitOf, type TwoScales } from '#shared/compute/two-scales.ts';
import type { Finding } from '#shared/contract/reading.ts';

/** A section that is set out, by one scale or by two. */
export type FittedSection = {
  readonly map: SectionMap;
  /** Length units per pixel along the level of the section and upwards. */
  readonly along: number;
  readonly up: number;
  /** Clockwise turn of the section's level on the sheet, radians. */
  readonly rotation: number;
  readonly mirrored: boolean;
};

/** How a fit was come by. */
export type FitGrounds = {
  /** Typed offsets and elevations that the fit had beyond what it needs; 0 where it meets them all exactly. */
  readonly redundant: number;
  /** True when the sheet's own horizontal was taken for level because the points do not tell the turn. */
  readonly turnFromSheet: boolean;
};

/** Sum of the squares by which a fit misses what is known, along and across the section's level, pixels². */
export function squaresOfMiss({ map, along, up }: FittedSection, places: readonly KnownPlace[]): number {
  return places.reduce((sum, { sheet, section }) => {
    const [offset, elevation] = map.toSection(sheetPx(...sheet));
    const across = (offset - (section[0] ?? offset)) / along;
    const upwards = (elevation - (section[1] ?? elevation)) / up;
    return sum + across * across + upwards * upwards;
  }, 0);
}

/** What a way of setting out comes to: a fit, or the reason why there is none yet. */
export type SetOutFit =
  | { state: 'fitted'; fit: FittedSection; grounds: FitGrounds }
  | { state: 'incomplete' | 'ambiguous' | 'refused'; finding: Finding };

/** The answer of a way of setting out that fits a similarity. */
export function fittedBy(similarity: Similarity, grounds: FitGrounds): SetOutFit {
  const scale = similarityScale(similarity);
  return {
    state: 'fitted',
    fit: {
      map: sectionMapOf(similarity),
      along: scale,
      up: scale,
      rotation: similarityRotation(similarity),
      mirrored: similarity.mirrored,
    },
    grounds,
  };
}

/** The answer of a way of setting out that fits two scales. */
export function fittedByScales(scales: TwoScales, grounds: FitGrounds): SetOutFit {
  const { along, up, rotation, mirrored } = scales;
  return {
    state: 'fitted',
    fit: { map: sectionMapOfFit(sectionFitOf(scales)), along, up, rotation, mirrored },
    grounds,
  };
}
