import type { SheetPoint } from '#shared/contract/document.ts';

/** How a guide looks; the picture gives each tone its colour, dash and strength. */
export type GuideTone =
  | 'strip'
  | 'way'
  | 'poorCell'
  | 'chosenCell'
  | 'channelLess'
  | 'channelMore'
  | 'poorAngle'
  | 'computedEquipotential'
  | 'computedFlowLine'
  | 'computedSurface'
  | 'above1'
  | 'above2'
  | 'above3'
  | 'below1'
  | 'below2'
  | 'below3'
  | 'otherHand'
  | 'before';

/** Ground tinted in one tone: closed outlines in base-raster pixels. */
export type GuideArea = {
  readonly id: string;
  readonly tone: GuideTone;
  readonly outlines: readonly (readonly SheetPoint[])[];
};

export type GuideLine = {
  readonly id: string;
  readonly tone: GuideTone;
  readonly points: readonly SheetPoint[];
};

/** Words at a place of the sheet. */
export type GuideMark = {
  readonly id: string;
  readonly tone: GuideTone;
  readonly at: SheetPoint;
  readonly text: string;
};

/** What is shown over the sheet besides the net itself: it explains or compares, and cannot be taken hold of. */
export type Guides = {
  readonly areas: readonly GuideArea[];
  readonly lines: readonly GuideLine[];
  readonly marks: readonly GuideMark[];
};

/** Whose guides they are; each shows and takes away its own. */
export const GUIDE_OWNERS = [
  'explanation',
  'netCheck',
  'computedNet',
  'differences',
  'presence',
  'carried',
  'revisionBefore',
  'compared',
] as const;
export type GuideOwner = (typeof GUIDE_OWNERS)[number];

export type GuidesByOwner = Readonly<Partial<Record<GuideOwner, Guides>>>;

/** The guides of all owners with those of one put in, or taken out with null. */
export function withGuides(all: GuidesByOwner, owner: GuideOwner, guides: Guides | null): GuidesByOwner {
  if (guides === null && all[owner] === undefined) return all;
  const { [owner]: _, ...others } = all;
  return guides === null ? others : { ...others, [owner]: guides };
}
