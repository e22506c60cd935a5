import { type ComponentProps, useMemo, useState } from 'react';
import { classNames } from '#client/components/class-names.ts';
import { deskPictureText as text } from '#client/text/clean-up.ts';
import { rasterOf } from '../model/sheet-raster.ts';
import { SheetView } from './sheet-view.tsx';

type ShownSheetProps = Omit<ComponentProps<typeof SheetView>, 'raster' | 'pictureSwitch'>;

/**
 * The sheet by its cleaned-up picture where it has one, and as it was scanned at a press, for this person and visit only.
 * The traces lie in the sheet's own pixels and stay on their lines in both.
 */
export function ShownSheet({ sheet, ...props }: ShownSheetProps) {
  const [asScanned, setAsScanned] = useState(false);
  // The tiles of a sheet that is being prepared become finer, but the raster stays the same.
  const key = asScanned ? 'scan' : (sheet.shown?.id ?? 'scan');
  // biome-ignore lint/correctness/useExhaustiveDependencies: as above
  const raster = useMemo(() => rasterOf(sheet, asScanned), [key]);
  const pictures = [false, true] as const;
  return (
    <SheetView
      {...props}
      key={key}
      sheet={sheet}
      raster={raster}
      pictureSwitch={
        sheet.shown === undefined ? null : (
          <fieldset data-over-sheet className="m-0 flex rounded-sheet border border-rule bg-film p-0">
            <legend className="sr-only">{text.picture}</legend>
            {pictures.map((original) => (
              <button
                key={String(original)}
                type="button"
                aria-pressed={original === asScanned}
                title={original ? text.originalTitle : text.cleanedTitle}
                className={classNames(
                  'touch border-0 px-2.5 py-1 leading-[1.4] hover:bg-hover',
                  original === asScanned ? 'bg-chosen font-semibold' : 'bg-transparent',
                )}
                onClick={() => setAsScanned(original)}
              >
                {original ? text.original : text.cleaned}
              </button>
            ))}
          </fieldset>
        )
      }
    />
  );
}
