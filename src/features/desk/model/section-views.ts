import { IDENTITY, type LinearMap, nearlySame } from '#shared/compute/linear-map.ts';
import type { FrameReading } from '#shared/contract/reading-frame.ts';

export type SectionView = 'sheet' | 'natural' | 'transformed';

/** Maps that differ from the drawing by less show nothing else. */
const SEEN = 1e-4;

/**
 * The ways in which a section can be seen besides as it is drawn, each with its map from the sheet: as the natural
 * section where the drawing is stretched or itself transformed, and as the transformed section where the soils share
 * one and the drawing is not it.
 */
export function sectionViews(frame: FrameReading | null): ReadonlyMap<SectionView, LinearMap | null> {
  const views = new Map<SectionView, LinearMap | null>([['sheet', null]]);
  if (frame === null) return views;
  if (!nearlySame(frame.naturalMatrix, IDENTITY, SEEN)) views.set('natural', frame.naturalMatrix);
  if (frame.kind === 'transformed' && !nearlySame(frame.matrix, IDENTITY, SEEN)) {
    views.set('transformed', frame.matrix);
  }
  return views;
}
