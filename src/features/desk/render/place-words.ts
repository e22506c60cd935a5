import { type Placeable, type Placed, placeApart, rectAbout } from '#shared/compute/geometry/place-apart.ts';
import { type PlacesAlong, placesAlong } from '#shared/compute/geometry/places-along.ts';
import { createTakenSpace, type Rect } from '#shared/compute/geometry/taken-space.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import { LABEL_HEIGHT_PX, LABEL_OFFSETS, labelWidthPx } from './label-layout.ts';
import type { SceneItem, SceneLine, SceneMark } from './scene.ts';

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

/** Ids of labels in the scene are those of their lines with this before them. */
export const LABEL_PREFIX = 'label ';

/** Where each mark with words went, and from which place of its own; null for one that found no room. */
export type WordPlaces = ReadonlyMap<string, { readonly own: SheetPoint; readonly placed: Placed | null }>;

/** A scene with its words in their places, and the labels for which there is no room. */
export type PlacedScene = {
  readonly items: SceneItem[];
  readonly crowded: SceneMark[];
  readonly places: WordPlaces;
};

/**
 * Gives the words of a scene places in which they do not cover one another or a point: names of points first, then
 * notes, then what explains a place, then the heads at the lines' ends, which can move along their lines. A head that
 * finds no room is left out, unless its line is chosen. `zoom`: screen pixels per pixel of the picture. With `kept` words
 * stay where they were, so that nothing jumps, and nothing is searched, while something is dragged.
 */
export function placeWords(
  items: readonly SceneItem[],
  zoom: number,
  kept: WordPlaces | null = null,
): PlacedScene {
  const marks = items.filter((item): item is SceneMark => item.shape !== 'line' && item.shape !== 'area');
  const places = kept === null ? placesFor(items, marks, zoom) : placesLike(kept, marks, zoom);
  const placedItems: SceneItem[] = [];
  const crowded: SceneMark[] = [];
  for (const item of items) {
    const place = places.get(item.id)?.placed;
    if (place === undefined || item.shape === 'line' || item.shape === 'area') placedItems.push(item);
    else if (place !== null) placedItems.push(movedTo(item, place, zoom));
    else {
      const shown = { ...item, offsetPx: LABEL_OFFSETS[0]! };
      if (item.strong) placedItems.push(shown);
      else crowded.push(shown);
    }
  }
  return { items: placedItems, crowded, places };
}

function placesFor(items: readonly SceneItem[], marks: readonly SceneMark[], zoom: number): WordPlaces {
  const points = marks.filter((mark) => mark.shape === 'knownPoint' || mark.shape === 'readingPoint');
  const taken = createTakenSpace([
    ...points.map(({ at }) => rectAbout(at[0] * zoom, at[1] * zoom, POINT_SIZE_PX, POINT_SIZE_PX)),
    ...ofShape(marks, 'doubt').map((mark) => doubtRect(mark, zoom)),
  ]);
  const lines = () => items.filter((item): item is SceneLine => item.shape === 'line');
  const along = placesAlong(lines, zoom);
  const places = new Map<string, { own: SheetPoint; placed: Placed | null }>();
  for (const group of [
    points,
    ofShape(marks, 'balloon'),
    ofShape(marks, 'callout'),
    ofShape(marks, 'label'),
  ]) {
    const placed = placeApart(
      group.map((mark) => placeable(mark, zoom, along)),
      taken,
    );
    for (const { id, at } of group) places.set(id, { own: at, placed: placed.get(id) ?? null });
  }
  return places;
}

/** The places of before; what has moved keeps its distance from its own place, and what is new stays at it. */
function placesLike(kept: WordPlaces, marks: readonly SceneMark[], zoom: number): WordPlaces {
  const places = new Map<string, { own: SheetPoint; placed: Placed | null }>();
  for (const { id, at } of marks) {
    const before = kept.get(id);
    if (before === undefined) continue;
    const stays = before.own[0] === at[0] && before.own[1] === at[1];
    const { placed } = before;
    const moved = placed && { at: [at[0] * zoom, at[1] * zoom] as const, offset: placed.offset };
    places.set(id, { own: at, placed: stays ? placed : moved });
  }
  return places;
}

/** What keeps its place keeps it to the last bit, so that nothing is drawn again for rounding. */
function movedTo(mark: SceneMark, { at, offset }: Placed, zoom: number): SceneMark {
  const stays = at[0] === mark.at[0] * zoom && at[1] === mark.at[1] * zoom;
  return { ...mark, at: stays ? mark.at : [at[0] / zoom, at[1] / zoom], offsetPx: offset };
}

function ofShape(marks: readonly SceneMark[], shape: SceneMark['shape']): SceneMark[] {
  return marks.filter((mark) => mark.shape === shape);
}

function placeable(mark: SceneMark, zoom: number, along: PlacesAlong): Placeable {
  const at = { id: mark.id, x: mark.at[0] * zoom, y: mark.at[1] * zoom };
  if (mark.shape === 'balloon') {
    return { ...at, widthPx: BALLOON_SIZE_PX, heightPx: BALLOON_SIZE_PX, offsets: BALLOON_OFFSETS };
  }
  if (mark.shape === 'callout') {
    const widthPx = labelWidthPx(mark.text);
    return { ...at, widthPx, heightPx: LABEL_HEIGHT_PX, offsets: calloutOffsets(widthPx) };
  }
  if (mark.shape === 'label') {
    const size = { widthPx: labelWidthPx(mark.text), heightPx: LABEL_HEIGHT_PX };
    if (!mark.id.startsWith(LABEL_PREFIX)) return { ...at, ...size, offsets: LABEL_OFFSETS };
    const lineId = mark.id.slice(LABEL_PREFIX.length);
    const elsewhere = () => along.of(lineId, mark.at, size);
    return { ...at, ...size, offsets: LABEL_OFFSETS, elsewhere, mayGo: true };
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
