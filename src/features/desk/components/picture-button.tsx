import { lazy, Suspense, useState } from 'react';
import { createPortal } from 'react-dom';
import { pictureText as text } from '#client/text/picture.ts';
import type { PictureOf } from './picture-dialog.tsx';

/** What makes a picture is loaded when one is wanted. */
const PictureDialog = lazy(() => import('./picture-dialog.tsx'));

/** Opens the dialog that prints or saves the sheet as it is shown. */
export function PictureButton({ of }: { of: PictureOf }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <button
        type="button"
        data-over-sheet
        aria-haspopup="dialog"
        className="touch rounded-sheet border border-rule bg-film px-2.5 py-1 leading-[1.4] hover:bg-hover"
        onClick={() => setOpen(true)}
      >
        {text.open}
      </button>
      {open
        ? // Outside of the sheet, which takes every press on what lies in it.
          createPortal(
            <Suspense fallback={null}>
              <PictureDialog of={of} onClose={() => setOpen(false)} />
            </Suspense>,
            document.body,
          )
        : null}
    </>
  );
}
