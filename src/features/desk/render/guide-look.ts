import type { GuideTone } from '../model/guides.ts';
import { COLOURS, type LineLook } from './line-look.ts';

const WRONG = '#a3261d';
/** Let through by half, so that the scan under it is still read. */
const OTHER_HAND = 'rgba(91, 83, 70, 0.34)';

/** Colours of the tones. Above and below are told apart by a sign in words too, at the greatest of each. */
const TONE_COLOURS: Record<GuideTone, string> = {
  strip: COLOURS.point,
  way: COLOURS.point,
  poorCell: COLOURS.attention,
  chosenCell: WRONG,
  channelLess: COLOURS.phreatic,
  channelMore: COLOURS.flowLine,
  poorAngle: COLOURS.attention,
  computedEquipotential: COLOURS.equipotential,
  computedFlowLine: COLOURS.flowLine,
  computedSurface: COLOURS.phreatic,
  above1: COLOURS.flowLine,
  above2: COLOURS.flowLine,
  above3: COLOURS.flowLine,
  below1: COLOURS.phreatic,
  below2: COLOURS.phreatic,
  below3: COLOURS.phreatic,
  otherHand: COLOURS.boundary,
  before: COLOURS.attention,
};

const AREA_ALPHAS: Partial<Record<GuideTone, number>> = {
  strip: 0.14,
  poorCell: 0.26,
  chosenCell: 0.34,
  channelLess: 0.14,
  channelMore: 0.14,
  above1: 0.14,
  above2: 0.3,
  above3: 0.5,
  below1: 0.14,
  below2: 0.3,
  below3: 0.5,
};

/** Areas with an outline of their own, so that they are seen on any tone of paper. */
const EDGED: readonly GuideTone[] = ['strip', 'poorCell', 'chosenCell'];

export type AreaLook = { readonly colour: string; readonly alpha: number; readonly edged: boolean };

export function areaLook(tone: GuideTone): AreaLook {
  return { colour: TONE_COLOURS[tone], alpha: AREA_ALPHAS[tone] ?? 0.2, edged: EDGED.includes(tone) };
}

export function toneColour(tone: GuideTone): string {
  return TONE_COLOURS[tone];
}

/** A computed line is thin and of long dashes, a way of hand's rule a solid stroke from point to line. */
export function guideLineLook(tone: GuideTone): LineLook {
  const colour = TONE_COLOURS[tone];
  if (tone === 'way') return { colour, widthPx: 2.2, dashPx: [], end: 'dot', hatchPx: 0 };
  // A broad soft band under the line that somebody else has in hand.
  if (tone === 'otherHand') return { colour: OTHER_HAND, widthPx: 9, dashPx: [], end: 'none', hatchPx: 0 };
  return { colour, widthPx: 1.1, dashPx: [5, 4], end: 'none', hatchPx: 0 };
}
