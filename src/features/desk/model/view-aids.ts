import { SNAP_KINDS, type SnapKind } from './tool-overlay.ts';

export const LINE_WEIGHTS = ['thin', 'normal', 'heavy'] as const;
export type LineWeight = (typeof LINE_WEIGHTS)[number];

/** The scan is never faded farther: what is traced has to stay in sight. */
export const MOST_FADE_PCT = 80;
export const FADE_STEP_PCT = 10;

/** What helps in tracing, and how the sheet looks on this screen. */
export type ViewAids = {
  readonly snapKinds: readonly SnapKind[];
  /** Figures beside the pointer while a line is drawn or a vertex dragged. */
  readonly liveHelp: boolean;
  readonly lineWeight: LineWeight;
  /** How far the scan is faded towards the paper, in per cent. */
  readonly fadePct: number;
  readonly inverted: boolean;
};

/** Straight on beyond ends is asked for seldom, and gets in the way where many lines end. */
export const FIRST_AIDS: ViewAids = {
  snapKinds: SNAP_KINDS.filter((kind) => kind !== 'extension'),
  liveHelp: true,
  lineWeight: 'normal',
  fadePct: 0,
  inverted: false,
};
