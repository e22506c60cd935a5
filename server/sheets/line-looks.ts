import type { LineKind } from '#shared/contract/document.ts';
import type { FigureLabel } from '#shared/text/calculation-sheet/figure-labels.ts';
import { INK } from './print-colours.ts';

/** How a kind of line is printed: colour as on the screen, and a dash of its own, so that a grey print tells them apart. */
export const LINE_LOOKS: Record<LineKind, { colour: string; widthPt: number; dashPt: readonly number[] }> = {
  equipotential: { colour: '#0f6b66', widthPt: 0.9, dashPt: [] },
  flowLine: { colour: '#a8472b', widthPt: 0.9, dashPt: [9, 1.6] },
  phreaticLine: { colour: '#2b5ea8', widthPt: 1.1, dashPt: [4, 2.4] },
  submergedFace: { colour: '#0f6b66', widthPt: 1.6, dashPt: [] },
  outflowFace: { colour: '#0f6b66', widthPt: 1.6, dashPt: [1.5, 2] },
  drain: { colour: '#5b5346', widthPt: 1.3, dashPt: [3, 1.4] },
  impervious: { colour: '#5b5346', widthPt: 1.1, dashPt: [] },
  ground: { colour: '#5b5346', widthPt: 0.8, dashPt: [] },
  soilBoundary: { colour: '#5b5346', widthPt: 0.8, dashPt: [5, 1.4, 1, 1.4] },
};
/** Reading points and profiles. */
export const POINT_COLOUR = '#6d2a78';

/** A label has the colour of what it belongs to. */
export function labelColour(of: FigureLabel['of']): string {
  if (of === 'point') return POINT_COLOUR;
  return of === 'knownPoint' ? INK : LINE_LOOKS[of].colour;
}
