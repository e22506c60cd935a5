import { useEffect, useMemo, useState } from 'react';
import { cleanUpText as text } from '#client/text/clean-up.ts';
import { whitenPaper } from '#shared/compute/renditions/paper-tone.ts';
import { removeSpecks } from '#shared/compute/renditions/specks.ts';
import {
  applyTable,
  endTable,
  levelTable,
  makeGrey,
  type PixelRows,
  speckTone,
} from '#shared/compute/renditions/tones.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';
import type { RenditionSettings } from '#shared/contract/renditions.ts';
import type { Place } from '../model/handles.ts';
import { loadFull } from '../model/load-pixels.ts';
import type { SmallSheet } from '../model/preview.ts';
import { PixelCanvas } from './pixel-canvas.tsx';

const WIDTH_PX = 320;
const HEIGHT_PX = 220;

type CloseUpProps = {
  sheet: SheetDto;
  small: SmallSheet;
  settings: RenditionSettings;
  /** The place of the sheet in its middle. */
  at: Place;
};

/** Pixels of the sheet about a place, with the tones of the settings, specks included; not turned. */
export function CloseUp({ sheet, small, settings, at }: CloseUpProps) {
  const left = Math.round(at[0] - WIDTH_PX / 2);
  const top = Math.round(at[1] - HEIGHT_PX / 2);
  const scanned = useFullPixels(sheet, left, top);
  const rows = useMemo(
    () => (scanned === null ? null : toned(scanned, small, settings, left, top)),
    [scanned, small, settings, left, top],
  );
  return (
    <figure className="m-0 flex flex-col gap-1">
      <figcaption className="text-sm font-semibold">{text.closeUp}</figcaption>
      <div
        className="relative border border-rule bg-sheet"
        style={{ aspectRatio: `${WIDTH_PX} / ${HEIGHT_PX}` }}
      >
        {rows ? (
          <PixelCanvas
            rows={rows}
            label={text.closeUp}
            className="absolute inset-0 size-full [image-rendering:pixelated]"
          />
        ) : null}
        <span className="absolute top-1/2 left-1/2 h-px w-5 -translate-x-1/2 bg-equipotential" />
        <span className="absolute top-1/2 left-1/2 h-5 w-px -translate-y-1/2 bg-equipotential" />
      </div>
      <p className="m-0 text-sm text-ink-2">{text.closeUpHint}</p>
    </figure>
  );
}

/** What was loaded last stays until the next is there. */
function useFullPixels(sheet: SheetDto, left: number, top: number): PixelRows | null {
  const [rows, setRows] = useState<PixelRows | null>(null);
  useEffect(() => {
    const gone = new AbortController();
    const part = { left, top, widthPx: WIDTH_PX, heightPx: HEIGHT_PX };
    loadFull(sheet, part, gone.signal).then(
      (loaded) => !gone.signal.aborted && setRows(loaded),
      () => undefined,
    );
    return () => gone.abort();
  }, [sheet, left, top]);
  return rows;
}

function toned(
  scanned: PixelRows,
  { paper, base }: SmallSheet,
  settings: RenditionSettings,
  left: number,
  top: number,
): PixelRows {
  const rows = { ...scanned, data: scanned.data.slice() };
  if (settings.whitenPaper) whitenPaper(rows, paper, { left, top, ...base });
  if (settings.threshold !== null) makeGrey(rows);
  applyTable(rows, levelTable(settings));
  if (settings.specksPx > 0) removeSpecks(rows, settings.specksPx, speckTone(settings));
  applyTable(rows, endTable(settings));
  return rows;
}
