import { mapOfFourPlaces, type ProjectiveMap, planeProduct, SAME_PLACE } from '#shared/compute/plane-map.ts';
import type { RenditionSettings } from '#shared/contract/renditions.ts';

type Place = readonly [x: number, y: number];
export type PictureSize = { readonly widthPx: number; readonly heightPx: number };
/** Size of a rendition, and the map from its pixels to those of the sheet's base raster. */
export type RenditionGeometry = PictureSize & { readonly toBase: ProjectiveMap };

/** A bounding box that is larger than whole pixels by less is not made larger for it: rounding of sines. */
const ROUNDING_PX = 1e-6;

/**
 * What a picture cleaned up by `settings` is: the four corners made a rectangle, that turned, and that cropped. Sizes and
 * places are pixels, origin at the top-left corner, centres at + 0.5. Null when the corners do not go clockwise around a
 * convex figure, or when the crop lies outside the picture.
 */
export function renditionGeometry(
  base: PictureSize,
  { corners, turnDeg, crop }: Pick<RenditionSettings, 'corners' | 'turnDeg' | 'crop'>,
): RenditionGeometry | null {
  const upright = corners === null ? { ...sizeOf(base), toBase: SAME_PLACE } : rectified(corners);
  if (upright === null) return null;
  const turned = turnedBy(upright, turnDeg);
  return crop === null ? turned : croppedTo(turned, crop);
}

const sizeOf = ({ widthPx, heightPx }: PictureSize): PictureSize => ({ widthPx, heightPx });

/** A rectangle as wide and as high as the mean of the opposite sides of the figure. */
function rectified(corners: readonly Place[]): RenditionGeometry | null {
  if (!isConvexClockwise(corners)) return null;
  const [topLeft, topRight, bottomRight, bottomLeft] = corners as [Place, Place, Place, Place];
  const widthPx = meanOf(distance(topLeft, topRight), distance(bottomLeft, bottomRight));
  const heightPx = meanOf(distance(topLeft, bottomLeft), distance(topRight, bottomRight));
  const rectangle: Place[] = [
    [0, 0],
    [widthPx, 0],
    [widthPx, heightPx],
    [0, heightPx],
  ];
  const toBase = mapOfFourPlaces(rectangle, corners);
  return toBase === null ? null : { widthPx, heightPx, toBase };
}

const meanOf = (a: number, b: number) => Math.max(1, Math.round((a + b) / 2));
const distance = (a: Place, b: Place) => Math.hypot(b[0] - a[0], b[1] - a[1]);

/** With y down, a clockwise figure turns right at each corner. */
function isConvexClockwise(corners: readonly Place[]): boolean {
  return corners.every((corner, index) => {
    const next = corners[(index + 1) % corners.length]!;
    const after = corners[(index + 2) % corners.length]!;
    return (next[0] - corner[0]) * (after[1] - next[1]) - (next[1] - corner[1]) * (after[0] - next[0]) > 0;
  });
}

/** Turned clockwise about its middle, in the smallest upright picture that holds it. */
function turnedBy({ widthPx, heightPx, toBase }: RenditionGeometry, turnDeg: number): RenditionGeometry {
  const [cos, sin] = turnOf(turnDeg);
  if (cos === 1) return { widthPx, heightPx, toBase };
  const width = wholePixels(Math.abs(widthPx * cos) + Math.abs(heightPx * sin));
  const height = wholePixels(Math.abs(widthPx * sin) + Math.abs(heightPx * cos));
  const [fromX, fromY] = [width / 2, height / 2];
  const back: ProjectiveMap = [
    cos,
    sin,
    widthPx / 2 - cos * fromX - sin * fromY,
    -sin,
    cos,
    heightPx / 2 + sin * fromX - cos * fromY,
    0,
    0,
    1,
  ];
  return { widthPx: width, heightPx: height, toBase: planeProduct(toBase, back) };
}

const wholePixels = (length: number) => Math.max(1, Math.ceil(length - ROUNDING_PX));

/** Cosine and sine, exact for quarter turns, so that these lose no pixel. */
function turnOf(turnDeg: number): [cos: number, sin: number] {
  const quarters = turnDeg / 90;
  if (Number.isInteger(quarters)) {
    const at = ((quarters % 4) + 4) % 4;
    return [[1, 0, -1, 0][at]!, [0, 1, 0, -1][at]!];
  }
  const angle = (turnDeg * Math.PI) / 180;
  return [Math.cos(angle), Math.sin(angle)];
}

function croppedTo(
  { widthPx, heightPx, toBase }: RenditionGeometry,
  [cropLeft, cropTop, cropWidth, cropHeight]: readonly [number, number, number, number],
): RenditionGeometry | null {
  const left = Math.max(0, Math.round(cropLeft));
  const top = Math.max(0, Math.round(cropTop));
  const width = Math.min(widthPx, Math.round(cropLeft + cropWidth)) - left;
  const height = Math.min(heightPx, Math.round(cropTop + cropHeight)) - top;
  if (width < 1 || height < 1) return null;
  const shift: ProjectiveMap = [1, 0, left, 0, 1, top, 0, 0, 1];
  return { widthPx: width, heightPx: height, toBase: planeProduct(toBase, shift) };
}

/**
 * The clockwise turn in degrees, within (−90, 90], by which the line through two places of a picture becomes level; null
 * when the places coincide. Either order of the places gives the same turn.
 */
export function turnToLevel(a: Place, b: Place): number | null {
  const [dx, dy] = [b[0] - a[0], b[1] - a[1]];
  if (dx === 0 && dy === 0) return null;
  const slope = (Math.atan2(dy, dx) * 180) / Math.PI;
  const turn = -slope;
  if (turn > 90) return turn - 180;
  return turn <= -90 ? turn + 180 : turn;
}
