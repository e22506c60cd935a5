import { asProjective, isAffine, type ProjectiveMap, throughPlane } from '#shared/compute/plane-map.ts';
import type { SheetRaster } from '../model/sheet-raster.ts';
import { rasterMap, seenOfRaster, type Viewport } from '../model/viewport.ts';
import type { LoadedTile } from './load-tile.ts';
import { levelFor, levelScale, type Tile, tileFrame, tilesIn } from './tile-grid.ts';

/** Pieces that lie askew are drawn so much larger than they are, device pixels, that no seam shows between them. */
const OVERLAP_PX = 0.7;
/** Pieces along each side of a tile: small enough that a slanting one differs from an upright one by no pixel. */
const PIECES = 16;

/** Paints a view of a raster that is seen through a map; every tile that the view wants must be there. */
export function paintTilesThrough(
  context: CanvasRenderingContext2D,
  raster: SheetRaster,
  store: { get(tile: Tile): LoadedTile | null },
  view: Viewport,
  ratio: number,
): void {
  const map = rasterMap(view, raster) ?? [1, 0, 0, 1];
  const toDevice = onDevice(asProjective(map), view, view.zoom * ratio);
  const z = levelFor(raster, view.zoom * ratio);
  const perPx = 1 / levelScale(raster, z);
  const pieces = isAffine(map) ? 1 : PIECES;
  for (const tile of tilesIn(raster, z, seenOfRaster(view, raster))) {
    const picture = store.get(tile);
    if (picture === null) continue;
    const [left, top] = tileFrame(raster, tile);
    paintPieces(context, picture, { left, top, perPx, pieces }, toDevice);
  }
  context.setTransform(1, 0, 0, 1, 0, 0);
}

function onDevice(map: ProjectiveMap, { origin }: Viewport, scale: number) {
  return (x: number, y: number): [number, number] => {
    const [px, py] = throughPlane(map, x, y);
    return [(px - origin[0]) * scale, (py - origin[1]) * scale];
  };
}

type Place = { left: number; top: number; perPx: number; pieces: number };

/** Paints a tile in pieces, each through the linear map that puts three of its corners where they belong. */
function paintPieces(
  context: CanvasRenderingContext2D,
  picture: LoadedTile,
  { left, top, perPx, pieces }: Place,
  toDevice: (x: number, y: number) => [number, number],
): void {
  const width = picture.width / pieces;
  const height = picture.height / pieces;
  for (let row = 0; row < pieces; row += 1) {
    for (let column = 0; column < pieces; column += 1) {
      const [x, y] = [left + column * width * perPx, top + row * height * perPx];
      const [ox, oy] = toDevice(x, y);
      const [ax, ay] = toDevice(x + width * perPx, y);
      const [bx, by] = toDevice(x, y + height * perPx);
      const across = Math.hypot(ax - ox, ay - oy) / width;
      const down = Math.hypot(bx - ox, by - oy) / height;
      const transform = [
        (ax - ox) / width,
        (ay - oy) / width,
        (bx - ox) / height,
        (by - oy) / height,
      ] as const;
      context.setTransform(...transform, ox, oy);
      const from = [column * width, row * height, width, height] as const;
      context.drawImage(
        picture.image,
        ...from,
        0,
        0,
        width + OVERLAP_PX / across,
        height + OVERLAP_PX / down,
      );
    }
  }
}
