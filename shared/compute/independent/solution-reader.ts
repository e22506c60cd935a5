import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { FieldReader } from '#shared/compute/independent/field-at.ts';
import { gradientToSection, toFrame } from '#shared/compute/independent/section-frame.ts';
import type { SectionSolution } from '#shared/compute/independent/section-solution.ts';

/** Reads a solved section at places given by offset and elevation. */
export type SolutionReader = {
  /** Total head, length; null outside the section and above the free surface. */
  readonly headAt: (place: Pair) => number | null;
  /** ∂h/∂offset and ∂h/∂elevation, length per length; null like the head. */
  readonly gradientAt: (place: Pair) => Pair | null;
};

export function solutionReader({ frame, mesh, heads }: SectionSolution): SolutionReader {
  const reader = new FieldReader(mesh);
  return {
    headAt: (place) => reader.valueAt(heads, toFrame(frame, place)),
    gradientAt: (place) => {
      const gradient = reader.gradientAt(heads, toFrame(frame, place));
      return gradient === null ? null : gradientToSection(frame, gradient);
    },
  };
}
