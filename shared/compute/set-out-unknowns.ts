import type { EntityOf } from '#shared/contract/document.ts';

type Scales = EntityOf<'setOut'>['scales'];

/** Two shifts, a turn and a scale; then a scale more, a shear, and the two figures of a horizon. */
const UNKNOWNS: Readonly<Record<Scales, number>> = {
  equal: 4,
  plottingExaggeration: 5,
  transformedSection: 5,
  stretchedPaper: 6,
  perspective: 8,
};

/**
 * Typed offsets and elevations that a fit by points uses up, a count: one fewer where the turn is that of the sheet. Of a
 * picture that has lost its shape the turn is always fitted.
 */
export function unknownsOf(scales: Scales, turnFromSheet = false): number {
  const isTurnFitted = scales === 'stretchedPaper' || scales === 'perspective' || !turnFromSheet;
  return UNKNOWNS[scales] - (isTurnFitted ? 0 : 1);
}
