import type { LineKind, TracedLine } from '#shared/contract/document.ts';
import type { LineWeight } from '../model/view-aids.ts';

export const COLOURS = {
  ink: '#1c2733',
  film: '#fafcfb',
  equipotential: '#0f6b66',
  flowLine: '#a8472b',
  phreatic: '#2b5ea8',
  boundary: '#5b5346',
  point: '#6d2a78',
  attention: '#9a6100',
} as const;

/**
 * Everything drawn over the scan lies on a halo of film, so that its own colour is told from dark ground too: at this
 * strength three to one even over black (WCAG 2.2, 1.4.11).
 */
export const HALO = { colour: COLOURS.film, alpha: 0.85, widthPx: 3 } as const;

export type EndMark = 'none' | 'bar' | 'dot' | 'ring' | 'level' | 'square';

/** How a kind of line looks, in screen pixels: kinds differ by dash and end mark as well as by colour. */
export type LineLook = {
  readonly colour: string;
  readonly widthPx: number;
  readonly dashPx: readonly number[];
  readonly end: EndMark;
  /** Distance between hatch ticks on the side away from the flow; 0 = none. */
  readonly hatchPx: number;
};

const LOOKS: Record<LineKind, LineLook> = {
  equipotential: { colour: COLOURS.equipotential, widthPx: 2, dashPx: [], end: 'bar', hatchPx: 0 },
  flowLine: { colour: COLOURS.flowLine, widthPx: 2, dashPx: [22, 3], end: 'dot', hatchPx: 0 },
  phreaticLine: { colour: COLOURS.phreatic, widthPx: 2.4, dashPx: [9, 5], end: 'level', hatchPx: 0 },
  submergedFace: { colour: COLOURS.equipotential, widthPx: 3.4, dashPx: [], end: 'level', hatchPx: 0 },
  outflowFace: { colour: COLOURS.equipotential, widthPx: 3.4, dashPx: [3, 4], end: 'dot', hatchPx: 0 },
  drain: { colour: COLOURS.boundary, widthPx: 2.6, dashPx: [7, 3], end: 'ring', hatchPx: 0 },
  impervious: { colour: COLOURS.boundary, widthPx: 2.2, dashPx: [], end: 'none', hatchPx: 9 },
  ground: { colour: COLOURS.boundary, widthPx: 1.6, dashPx: [], end: 'none', hatchPx: 26 },
  soilBoundary: { colour: COLOURS.boundary, widthPx: 1.6, dashPx: [10, 3, 2, 3], end: 'none', hatchPx: 0 },
};

export function lookOf(kind: LineKind): LineLook {
  return LOOKS[kind];
}

/** A line by its origin: what is only guessed is drawn of single dots, open at its ends; what was adopted ends in squares. */
export function tracedLook(kind: LineKind, origin: TracedLine['origin']): LineLook {
  if (origin === 'guessed') return { ...LOOKS[kind], dashPx: [2, 7], end: 'ring' };
  return origin === 'adopted' ? { ...LOOKS[kind], end: 'square' } : LOOKS[kind];
}

/** A line that is still being drawn: of its kind's colour, finely dashed and open at its ends. */
export function unfinishedLook(kind: LineKind): LineLook {
  return { ...LOOKS[kind], dashPx: [4, 3], end: 'ring', hatchPx: 0 };
}

const WEIGHTS: Readonly<Record<LineWeight, number>> = { thin: 0.5, normal: 1, heavy: 1.7 };

/** A look with its strokes as thin or heavy as the person at the screen wants them; dashes and marks stay. */
export function weighted(look: LineLook, weight: LineWeight): LineLook {
  return weight === 'normal' ? look : { ...look, widthPx: look.widthPx * WEIGHTS[weight] };
}
