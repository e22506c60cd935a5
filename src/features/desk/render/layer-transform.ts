import { isAffine, type PlaneMap, planeProduct, SAME_PLACE } from '#shared/compute/plane-map.ts';
import { rasterMap, type SheetSize, type Viewport } from '../model/viewport.ts';

/**
 * The CSS transform of a layer in which a raster is laid out at a zoom, so that it is seen where the view shows it. Laid
 * out at the view's own zoom and seen as it is, the layer is only moved, by whole device pixels, so that its tiles stay
 * sharp; while the view is being zoomed the layer may still be that of another zoom.
 */
export function layerTransform(
  view: Viewport,
  sheet: SheetSize,
  devicePixelRatio: number,
  laidOutAt = view.zoom,
): string {
  const [x, y] = view.origin.map(
    (place) => Math.round(-place * view.zoom * devicePixelRatio) / devicePixelRatio,
  ) as [number, number];
  const map = rasterMap(view, sheet) ?? SAME_PLACE;
  const scale = view.zoom / laidOutAt;
  const placed = [scale, 0, x, 0, scale, y, 0, 0, 1] as const;
  const [a, b, c, d, e, f, g, h, i] = planeProduct(placed, zoomed(map, laidOutAt));
  // CSS writes a matrix column by column.
  if (isAffine(map)) return `matrix(${a / i}, ${d / i}, ${b / i}, ${e / i}, ${c / i}, ${f / i})`;
  return `matrix3d(${[a, d, 0, g, b, e, 0, h, 0, 0, 1, 0, c, f, 0, i].join(', ')})`;
}

/** A map of places as one of the same places at `zoom` times their coordinates. */
function zoomed(map: PlaneMap, zoom: number): PlaneMap {
  if (map.length === 4) return map;
  const [a, b, c, d, e, f, g, h, i] = map;
  return [a, b, c * zoom, d, e, f * zoom, g / zoom, h / zoom, i];
}
