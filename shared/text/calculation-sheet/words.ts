import type { LineKind } from '#shared/contract/document.ts';
import type { DoubtSource } from '#shared/contract/reading-doubt.ts';

/** Names of the kinds of lines on the sheet. */
export const LINE_NAMES: Record<LineKind, string> = {
  equipotential: 'equipotential',
  flowLine: 'flow line',
  phreaticLine: 'phreatic line',
  impervious: 'impervious boundary',
  soilBoundary: 'soil boundary',
  ground: 'ground line',
  submergedFace: 'face under water',
  outflowFace: 'face of free outflow',
  drain: 'drain',
};

/** Names of the sources of doubt. */
export const DOUBT_NAMES: Record<DoubtSource, string> = {
  knownPoints: 'known points',
  tracing: 'tracing',
  place: 'place of the point',
  waterLevels: 'water levels',
  datum: 'datum',
  tip: 'nearness of a tip',
  gammaW: 'unit weight of water',
  permeability: 'permeability',
};

/** A moment as it is printed, the same wherever the sheet is made: "2026-12-01 17:19 UTC". */
export const momentText = (iso: string) => `${iso.slice(0, 10)} ${iso.slice(11, 16)} UTC`;

/** Stands where somebody has said nothing. */
export const NOT_STATED = 'not stated';
export const orNotStated = (text: string) => (text.trim() === '' ? NOT_STATED : text.trim());
