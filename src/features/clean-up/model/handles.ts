import {
  type PictureSize,
  renditionGeometry,
  turnToLevel,
} from '#shared/compute/renditions/rendition-geometry.ts';
import type { RenditionSettings } from '#shared/contract/renditions.ts';

export type Place = readonly [x: number, y: number];
/** What is set by handles on the picture: a line that should be level, the corners of a rectangle, a crop. */
export type Setting = 'level' | 'corners' | 'crop';

/** Handles that were never moved stand so far from the picture's edges, as parts of its size. */
const INSET = 0.06;
/** A crop of fewer pixels was a slip. */
const SMALLEST_CROP_PX = 8;

/** What is shown while handles are set: what the handles change is left out, so that they can be set anywhere. */
export function shownWhile(settings: RenditionSettings, setting: Setting | null): RenditionSettings {
  if (setting === 'corners') return { ...settings, corners: null, turnDeg: 0, crop: null };
  return setting === 'crop' ? { ...settings, crop: null } : settings;
}

/** Where the handles stand at first, in pixels of the picture that is shown meanwhile. */
export function firstHandles(setting: Setting, settings: RenditionSettings, size: PictureSize): Place[] {
  const { widthPx: w, heightPx: h } = size;
  const [left, top, right, bottom] = [INSET * w, INSET * h, (1 - INSET) * w, (1 - INSET) * h];
  if (setting === 'level')
    return [
      [left, h / 2],
      [right, h / 2],
    ];
  if (setting === 'corners')
    return (
      settings.corners?.map(([x, y]): Place => [x, y]) ?? [
        [left, top],
        [right, top],
        [right, bottom],
        [left, bottom],
      ]
    );
  if (settings.crop === null)
    return [
      [left, top],
      [right, bottom],
    ];
  const [x, y, width, height] = settings.crop;
  return [
    [x, y],
    [x + width, y + height],
  ];
}

/** The settings that the handles say; null where they say nothing that can be done. */
export function withHandles(
  settings: RenditionSettings,
  setting: Setting,
  handles: readonly Place[],
  base: PictureSize,
): RenditionSettings | null {
  const changed = changedBy(settings, setting, handles);
  return changed !== null && renditionGeometry(base, changed) !== null ? changed : null;
}

function changedBy(
  settings: RenditionSettings,
  setting: Setting,
  handles: readonly Place[],
): RenditionSettings | null {
  const [a, b, c, d] = handles.map(([x, y]): [number, number] => [x, y]);
  if (a === undefined || b === undefined) return null;
  if (setting === 'level') {
    const turn = turnToLevel(a, b);
    return turn === null ? null : turnedBy(settings, turn);
  }
  if (setting === 'corners') return c && d ? { ...settings, corners: [a, b, c, d], crop: null } : null;
  const [left, top] = [Math.round(Math.min(a[0], b[0])), Math.round(Math.min(a[1], b[1]))];
  const [width, height] = [Math.round(Math.max(a[0], b[0])) - left, Math.round(Math.max(a[1], b[1])) - top];
  if (width < SMALLEST_CROP_PX || height < SMALLEST_CROP_PX) return null;
  return { ...settings, crop: [left, top, width, height] };
}

/** Turned clockwise by so many degrees more. A crop is of the turned picture, so it has to be set anew. */
export function turnedBy(settings: RenditionSettings, byDeg: number): RenditionSettings {
  return turnedTo(settings, settings.turnDeg + byDeg);
}

/** Turned to an angle, brought within (−180, 180]. */
export function turnedTo(settings: RenditionSettings, toDeg: number): RenditionSettings {
  const turnDeg = toDeg - 360 * Math.ceil((toDeg - 180) / 360);
  return { ...settings, turnDeg, crop: turnDeg === settings.turnDeg ? settings.crop : null };
}
