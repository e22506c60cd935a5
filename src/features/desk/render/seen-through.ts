import { type PlaneMap, throughPlane } from '#shared/compute/plane-map.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import type { SceneItem } from './scene.ts';

/** Points already mapped: a line that has not changed is the same line in the next picture too. */
const kept = new WeakMap<readonly SheetPoint[], { map: PlaneMap; points: readonly SheetPoint[] }>();
const keptOutlines = new WeakMap<
  readonly (readonly SheetPoint[])[],
  { map: PlaneMap; outlines: readonly (readonly SheetPoint[])[] }
>();

/**
 * Items of the picture where a map puts them. Only places are mapped: lines keep their width, their dashes and
 * hatching, and words stay upright.
 */
export function itemsThrough(items: readonly SceneItem[], map: PlaneMap | null): readonly SceneItem[] {
  if (map === null) return items;
  return items.map((item): SceneItem => {
    if (item.shape === 'line') return { ...item, points: pointsThrough(item.points, map) };
    if (item.shape === 'area') return { ...item, outlines: outlinesThrough(item.outlines, map) };
    return { ...item, at: throughPlane(map, ...item.at) };
  });
}

function pointsThrough(points: readonly SheetPoint[], map: PlaneMap): readonly SheetPoint[] {
  const held = kept.get(points);
  if (held?.map === map) return held.points;
  const moved = points.map(([x, y]): SheetPoint => throughPlane(map, x, y));
  kept.set(points, { map, points: moved });
  return moved;
}

function outlinesThrough(
  outlines: readonly (readonly SheetPoint[])[],
  map: PlaneMap,
): readonly (readonly SheetPoint[])[] {
  const held = keptOutlines.get(outlines);
  if (held?.map === map) return held.outlines;
  const moved = outlines.map((outline) => pointsThrough(outline, map));
  keptOutlines.set(outlines, { map, outlines: moved });
  return moved;
}
