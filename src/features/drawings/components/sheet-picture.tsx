import type { PointerEventHandler, ReactNode } from 'react';
import { apiUrl } from '#client/lib/http.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';

/** Pixels across the picture needs to look sharp on a wide screen with two pixels to the point. */
const WANTED_WIDTH_PX = 1600;

/** The lowest level that is wide enough; the finest there is when none is. */
export function levelFor(sheet: SheetDto, wantedPx = WANTED_WIDTH_PX): number {
  const { maxZoom, readyZoom = maxZoom } = sheet.tiles;
  const missing = Math.floor(Math.log2(Math.max(1, sheet.widthPx / wantedPx)));
  return Math.min(readyZoom, Math.max(0, maxZoom - missing));
}

interface Tile {
  key: string;
  src: string;
  style: { left: string; top: string; width: string; height: string };
}

/** The tiles of one level, placed in percent of the sheet, so that the picture may have any size. */
export function tilesOf(sheet: SheetDto): Tile[] {
  const level = levelFor(sheet);
  const scale = 2 ** (sheet.tiles.maxZoom - level);
  const span = sheet.tiles.tileSizePx * scale;
  const tiles: Tile[] = [];
  for (let y = 0; y * span < sheet.heightPx; y += 1)
    for (let x = 0; x * span < sheet.widthPx; x += 1) tiles.push(tileAt(sheet, level, span, x, y));
  return tiles;
}

/** Part of a length in percent, for CSS. */
export const percent = (part: number, whole: number) => `${(100 * part) / whole}%`;

function tileAt(sheet: SheetDto, level: number, span: number, x: number, y: number): Tile {
  const { widthPx, heightPx, tiles } = sheet;
  return {
    key: `${level}/${x}_${y}`,
    src: apiUrl(`/sheets/${sheet.id}/tiles/${tiles.rendition}/${level}/${x}_${y}`),
    style: {
      left: percent(x * span, widthPx),
      top: percent(y * span, heightPx),
      width: percent(Math.min(span, widthPx - x * span), widthPx),
      height: percent(Math.min(span, heightPx - y * span), heightPx),
    },
  };
}

interface SheetPictureProps {
  sheet: SheetDto;
  label: string;
  /** Drawn over the sheet in its own pixels. */
  children?: ReactNode;
  /** Placed over the sheet in percent of its size. */
  labels?: ReactNode;
  framing?: boolean;
  onPointerDown?: PointerEventHandler<SVGSVGElement>;
  onPointerMove?: PointerEventHandler<SVGSVGElement>;
  onPointerUp?: PointerEventHandler<SVGSVGElement>;
}

/** The whole sheet, made of the tiles of one level, with an overlay in sheet pixels. */
export function SheetPicture({
  sheet,
  label,
  children,
  labels,
  framing = false,
  ...pointer
}: SheetPictureProps) {
  const { widthPx, heightPx } = sheet;
  return (
    <div
      className="relative mx-auto w-full bg-sheet"
      style={{ aspectRatio: `${widthPx} / ${heightPx}`, maxWidth: `calc(78vh * ${widthPx / heightPx})` }}
    >
      <div role="img" aria-label={label} className="absolute inset-0 overflow-hidden">
        {tilesOf(sheet).map((tile) => (
          <img
            key={tile.key}
            src={tile.src}
            alt=""
            draggable={false}
            decoding="async"
            className="absolute max-w-none"
            style={tile.style}
          />
        ))}
      </div>
      <svg
        viewBox={`0 0 ${widthPx} ${heightPx}`}
        className={`absolute inset-0 size-full ${framing ? 'cursor-crosshair touch-none' : ''}`}
        aria-hidden="true"
        {...pointer}
      >
        {children}
      </svg>
      {labels}
    </div>
  );
}
