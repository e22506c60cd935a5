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

/** What a way of setting out comes to: a fit, or the reason why there is none yet. */
export type SetOutFit =
  | { state: 'fitted'; fit: FittedSection; fitPoints: number }
  | { state: 'incomplete' | 'ambiguous' | 'refused'; finding: Finding };

/** The answer of a way of setting out that fits a similarity to so many points. */
export function fittedBy(similarity: Similarity, fitPoints: number): SetOutFit {
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
    fitPoints,
  };
}

/** The answer of a way of setting out that fits two scales to so many points. */
export function fittedByScales(scales: TwoScales, fitPoints: number): SetOutFit {
  const { along, up, rotation, mirrored } = scales;
  return {
    state: 'fitted',
    fit: { map: sectionMapOfFit(sectionFitOf(scales)), along, up, rotation, mirrored },
    fitPoints,
  };
}
