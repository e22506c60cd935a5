import { seenOfRaster, type Viewport } from '../model/viewport.ts';
import type { LoadedTile } from './load-tile.ts';
import {
  levelFor,
  levelScale,
  type Tile,
  type TiledSheet,
  tileAbove,
  tileFrame,
  tilesIn,
} from './tile-grid.ts';
import { SQUARES_FROM_ZOOM } from './tile-layer.ts';
import type { TileStore } from './tile-store.ts';

const DESK_COLOUR = '#cfd6d5';
const EMPTY_SHEET_COLOUR = '#f1eee4';

/** What a view of a sheet wants: its own level from the middle outwards, after the one tile that shows it all. */
export function wantedTiles(
  sheet: TiledSheet,
  view: Viewport,
  devicePixelRatio: number,
  ring: number,
): Tile[] {
  const z = levelFor(sheet, view.zoom * devicePixelRatio);
  const frame = seenOfRaster(view, sheet);
  const inSight = tilesIn(sheet, z, frame);
  const seen = new Set(inSight.map((tile) => `${tile.x}_${tile.y}`));
  const around =
    ring === 0 ? [] : tilesIn(sheet, z, frame, ring).filter((tile) => !seen.has(`${tile.x}_${tile.y}`));
  return [{ z: 0, x: 0, y: 0 }, ...inSight, ...around];
}

/**
 * Paints a small part of the raster into a canvas, for the magnified view, as far as its tiles are there; where one is
 * missing, the next coarser one stands in. The view must show the raster as it is.
 */
export function paintTiles(
  context: CanvasRenderingContext2D,
  sheet: TiledSheet,
  store: Pick<TileStore<LoadedTile>, 'get'>,
  view: Viewport,
  devicePixelRatio: number,
): void {
  context.setTransform(1, 0, 0, 1, 0, 0);
  context.fillStyle = DESK_COLOUR;
  context.fillRect(0, 0, context.canvas.width, context.canvas.height);
  const [left, top] = onDevice(view, 0, 0, devicePixelRatio);
  const [right, bottom] = onDevice(view, sheet.widthPx, sheet.heightPx, devicePixelRatio);
  context.fillStyle = EMPTY_SHEET_COLOUR;
  context.fillRect(left, top, right - left, bottom - top);
  context.imageSmoothingEnabled = view.zoom * devicePixelRatio < SQUARES_FROM_ZOOM;
  const z = levelFor(sheet, view.zoom * devicePixelRatio);
  for (const tile of tilesIn(sheet, z, seenOfRaster(view, sheet)))
    paintTile(context, sheet, store, view, devicePixelRatio, tile);
}

function paintTile(
  context: CanvasRenderingContext2D,
  sheet: TiledSheet,
  store: Pick<TileStore<LoadedTile>, 'get'>,
  view: Viewport,
  ratio: number,
  tile: Tile,
): void {
  for (let z = tile.z; z >= 0; z -= 1) {
    const source = tileAbove(tile, z);
    const picture = store.get(source);
    if (picture === null) continue;
    paintPart(context, sheet, view, ratio, tile, source, picture);
    return;
  }
}

/** Paints the part of a picture that one tile shows; edges on whole device pixels, so that no seam shows through. */
function paintPart(
  context: CanvasRenderingContext2D,
  sheet: TiledSheet,
  view: Viewport,
  ratio: number,
  tile: Tile,
  source: Tile,
  picture: LoadedTile,
): void {
  const scale = levelScale(sheet, source.z);
  const [tileLeft, tileTop, side] = tileFrame(sheet, tile);
  const [sourceLeft, sourceTop] = tileFrame(sheet, source);
  const fromX = (tileLeft - sourceLeft) * scale;
  const fromY = (tileTop - sourceTop) * scale;
  // The last tiles of a row or column are cut at the sheet's edge.
  const width = Math.min(side * scale, picture.width - fromX);
  const height = Math.min(side * scale, picture.height - fromY);
  if (width <= 0 || height <= 0) return;
  const [left, top] = onDevice(view, tileLeft, tileTop, ratio);
  const [right, bottom] = onDevice(view, tileLeft + width / scale, tileTop + height / scale, ratio);
  context.drawImage(picture.image, fromX, fromY, width, height, left, top, right - left, bottom - top);
}

function onDevice(view: Viewport, x: number, y: number, ratio: number): [number, number] {
  const scale = view.zoom * ratio;
  return [Math.round((x - view.origin[0]) * scale), Math.round((y - view.origin[1]) * scale)];
}
