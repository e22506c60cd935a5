import {
  LABEL_HEIGHT_PX,
  LABEL_OFFSETS,
  labelWidthPx,
  type Placeable,
  placeApart,
  type Rect,
  rectAbout,
} from './label-layout.ts';
import type { SceneItem, SceneMark } from './scene.ts';

const POINT_SIZE_PX = 16;
const NAME_HEIGHT_PX = 15;
const NAME_CHARACTER_PX = 8;
const BALLOON_SIZE_PX = 22;
const BALLOON_REACH_PX = 28;

/** Directions a balloon may stand in from its place, the best first. */
const BALLOON_OFFSETS = [215, 325, 180, 0, 145, 35, 270, 90].map((degrees) => {
  const angle = (degrees * Math.PI) / 180;
  return [
    Math.round(BALLOON_REACH_PX * Math.cos(angle)),
    Math.round(BALLOON_REACH_PX * Math.sin(angle)),
  ] as const;
});

/**
 * Gives the words of a scene places in which they do not cover one another or a point: names of points first, then
 * notes, then what explains a place, then the heads at the lines' ends, which can give way farthest. `zoom`: screen pixels per sheet pixel.
 */
export function placeWords(items: readonly SceneItem[], zoom: number): SceneItem[] {
  const marks = items.filter((item): item is SceneMark => item.shape !== 'line' && item.shape !== 'area');
  const points = marks.filter((mark) => mark.shape === 'knownPoint' || mark.shape === 'readingPoint');
  const taken: Rect[] = points.map(({ at }) =>
    rectAbout(at[0] * zoom, at[1] * zoom, POINT_SIZE_PX, POINT_SIZE_PX),
  );
  taken.push(...ofShape(marks, 'doubt').map((mark) => doubtRect(mark, zoom)));
  const offsets = new Map<string, readonly [number, number]>();
  for (const group of [
    points,
    ofShape(marks, 'balloon'),
    ofShape(marks, 'callout'),
    ofShape(marks, 'label'),
  ]) {
    const placed = placeApart(
      group.map((mark) => placeable(mark, zoom)),
      taken,
    );
    for (const [id, offset] of placed) offsets.set(id, offset);
  }
  return items.map((item) => {
    const offsetPx = offsets.get(item.id);
    return offsetPx === undefined || item.shape === 'line' || item.shape === 'area'
      ? item
      : { ...item, offsetPx };
  });
}

function ofShape(marks: readonly SceneMark[], shape: SceneMark['shape']): SceneMark[] {
  return marks.filter((mark) => mark.shape === shape);
}

function placeable(mark: SceneMark, zoom: number): Placeable {
  const at = { id: mark.id, x: mark.at[0] * zoom, y: mark.at[1] * zoom };
  if (mark.shape === 'balloon') {
    return { ...at, widthPx: BALLOON_SIZE_PX, heightPx: BALLOON_SIZE_PX, offsets: BALLOON_OFFSETS };
  }
  if (mark.shape === 'callout') {
    const widthPx = labelWidthPx(mark.text);
    return { ...at, widthPx, heightPx: LABEL_HEIGHT_PX, offsets: calloutOffsets(widthPx) };
  }
  if (mark.shape === 'label') {
    return { ...at, widthPx: labelWidthPx(mark.text), heightPx: LABEL_HEIGHT_PX, offsets: LABEL_OFFSETS };
  }
  const widthPx = mark.text.length * NAME_CHARACTER_PX;
  const offsets = mark.shape === 'knownPoint' ? belowFirst(widthPx) : besideFirst(widthPx);
  return { ...at, widthPx, heightPx: NAME_HEIGHT_PX, offsets };
}

function belowFirst(width: number): ReadonlyArray<readonly [number, number]> {
  const side = width / 2 + 12;
  return [
    [0, 19],
    [0, -19],
    [side, 0],
    [-side, 0],
  ];
}

function besideFirst(width: number): ReadonlyArray<readonly [number, number]> {
  const side = width / 2 + 11;
  return [
    [side, -11],
    [-side, -11],
    [side, 11],
    [-side, 11],
    [0, -19],
    [0, 19],
  ];
}

const DOUBT_SIZE_PX = 20;
/** The question mark stands over the ring. */
const DOUBT_HEIGHT_PX = 34;

function doubtRect({ at }: SceneMark, zoom: number): Rect {
  const middle = at[1] * zoom - (DOUBT_HEIGHT_PX - DOUBT_SIZE_PX) / 2;
  return rectAbout(at[0] * zoom, middle, DOUBT_SIZE_PX, DOUBT_HEIGHT_PX);
}

const CALLOUT_RINGS_PX = [18, 34, 52, 72];

/** Close about the place that it explains, above it first; farther rings where there is no room. */
function calloutOffsets(width: number): ReadonlyArray<readonly [number, number]> {
  return CALLOUT_RINGS_PX.flatMap((reach) => {
    const side = width / 2 + reach - 8;
    return [
      [0, -reach],
      [side, -reach / 2],
      [-side, -reach / 2],
      [0, reach],
      [side, reach / 2],
      [-side, reach / 2],
    ] as const;
  });
}
