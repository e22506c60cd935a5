import { type ReactNode, useEffect, useId, useState } from 'react';
import { classNames } from '#client/components/class-names.ts';
import { sheetAidsText as text } from '#client/text/tracing-aids.ts';
import type { DeskStore } from '../model/desk-state.ts';

type SheetMoreProps = {
  store: DeskStore;
  /** What is seen of the sheet, which only some sheets let choose: a row of its own. */
  views: ReactNode;
  children: ReactNode;
};

/** The lesser buttons over the sheet: side by side where the sheet is wide, behind one button where they would cover it. */
export function SheetMore({ store, views, children }: SheetMoreProps) {
  const [open, setOpen] = useState(false);
  const id = useId();
  // A key opens one of the panels too, which has to be seen then.
  useEffect(() => store.onIntent((intent) => intent.type === 'showLines' && setOpen(true)), [store]);
  return (
    <>
      <button
        type="button"
        data-over-sheet
        aria-expanded={open}
        aria-controls={id}
        className={classNames(
          'touch rounded-sheet border border-rule px-2.5 py-1 leading-[1.4] hover:bg-hover @2xl:hidden',
          open ? 'bg-chosen font-semibold' : 'bg-film',
        )}
        onClick={() => setOpen((now) => !now)}
      >
        {text.more}
      </button>
      <div
        id={id}
        className={classNames(
          'flex-wrap items-start justify-end gap-2 @2xl:order-none @2xl:flex @2xl:basis-auto',
          open ? 'order-last flex basis-full' : 'hidden',
        )}
      >
        {children}
      </div>
      <div
        className={classNames(
          'order-last flex-wrap justify-end gap-2 basis-full empty:hidden @2xl:flex',
          open ? 'flex' : 'hidden',
        )}
      >
        {views}
      </div>
    </>
  );
}
