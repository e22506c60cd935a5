import type { HideableKind } from '#client/features/desk/model/desk-state.ts';
import type { SnapKind } from '#client/features/desk/model/tool-overlay.ts';
import type { LineWeight } from '#client/features/desk/model/view-aids.ts';
import { fixedText, plainText } from '#client/lib/figures.ts';
import type { LineKind } from '#shared/contract/document.ts';
import { deskToolText } from './desk-tools.ts';
import { inLanguage } from './language.ts';

const KINDS: Record<HideableKind, string> = {
  equipotential: 'Equipotentials',
  flowLine: 'Flow lines',
  phreaticLine: 'Phreatic lines',
  submergedFace: 'Submerged faces',
  outflowFace: 'Outflow faces',
  drain: 'Drains',
  impervious: 'Impervious boundaries',
  ground: 'Ground lines',
  soilBoundary: 'Soil boundaries',
  readingPoint: 'Reading points',
  profile: 'Profiles',
  knownPoint: 'Known points',
  note: 'Notes',
};

/** Less than this off a right angle is one: no hand draws, and no figure shows, more. */
const RIGHT_WITHIN_DEG = 0.5;

/** What is told beside the pointer while a line is drawn. */
const enLiveHelpText = {
  snaps: {
    end: 'End of a line',
    crossing: 'Crossing',
    vertex: 'Point of a line',
    rightAngle: 'Right angle',
    boundary: 'On a boundary',
    line: 'On a line',
    extension: 'Straight on from an end',
  } satisfies Record<SnapKind, string>,
  angle: (deg: number, kind: LineKind, wantsRight: boolean) => {
    const off = 90 - deg;
    const words = `${fixedText(deg, 0)}° at ${deskToolText.lineKind(kind)}`;
    if (!wantsRight) return words;
    return off < RIGHT_WITHIN_DEG ? `${words}, a right angle` : `${words}, ${fixedText(off, 0)}° off 90°`;
  },
  cells: (ratios: readonly string[], wanted: number | null) =>
    `Cell B/L ${ratios.join(', ')}${wanted === null ? '' : `; ${plainText(wanted)} wanted`}`,
  cellSide: (ratio: number, side: 'left' | 'right' | null) => {
    const figure = fixedText(ratio, 2);
    if (side === null) return figure;
    return side === 'left' ? `${figure} on its left` : `${figure} on its right`;
  },
  head: (head: number, unit: string) => `Head ${fixedText(head, 2)} ${unit}`,
  between: (before: number | null, after: number | null, isNow: boolean) => {
    const net = isNow ? 'net as read last' : 'net of before the last change';
    return before === null || after === null
      ? net
      : `between ${plainText(before, 6)} and ${plainText(after, 6)}, ${net}`;
  },
  headAwaited: 'Head …',
  noHead: 'No head here by the net read last',
  nothing: 'Nothing under the pointer',
} as const;
export const liveHelpText = inLanguage({ en: enLiveHelpText });

/** The lists and switches over the sheet. */
const enSheetAidsText = {
  title: 'Lines, snapping and view',
  lines: 'Lines',
  snap: 'Snap to',
  view: 'View',
  more: 'More',
  close: 'Close',
  kinds: KINDS,
  linesTitle: 'On the sheet',
  kindHead: 'Kind',
  countHead: 'Count',
  shownHead: 'Shown',
  lockedHead: 'Locked',
  show: (kind: HideableKind) => `Show ${KINDS[kind].toLowerCase()}`,
  lock: (kind: HideableKind) => `Lock ${KINDS[kind].toLowerCase()}`,
  linesHint: 'Locked ones are shown and snapped to, but not picked or changed.',
  showAll: 'Show all',
  unlockAll: 'Unlock all',
  nothingYet: 'Nothing is traced yet.',
  hidden: (kinds: readonly HideableKind[]) =>
    `Hidden: ${kinds.map((kind) => KINDS[kind].toLowerCase()).join(', ')}`,
  snapTitle: 'Snap to',
  snapKinds: {
    end: 'Ends of lines',
    crossing: 'Crossings of two lines',
    vertex: 'Points of lines',
    rightAngle: 'Right angle from the last point',
    boundary: 'Boundaries',
    line: 'Equipotentials, flow and phreatic lines',
    extension: 'Straight on beyond ends',
  } satisfies Record<SnapKind, string>,
  snapHint: 'Alt or Ctrl held down stops snapping.',
  viewTitle: 'View',
  weight: 'Line weight',
  weights: { thin: 'Thin', normal: 'Normal', heavy: 'Heavy' } satisfies Record<LineWeight, string>,
  fade: 'Fade the scan',
  fadeShown: (pct: number) => `${fixedText(pct, 0)} %`,
  invert: 'Invert the scan',
  liveHelp: 'Figures beside the pointer',
  liveHelpHint: 'Elevation, head, angles and cells while a line is drawn. Q reads them out.',
  viewHint: 'On this screen, and in pictures printed or saved from it; not kept with the net.',
} as const;
export const sheetAidsText = inLanguage({ en: enSheetAidsText });
