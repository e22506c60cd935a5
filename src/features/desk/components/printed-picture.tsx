import { useEffect, useState } from 'react';
import { createPortal } from 'react-dom';
import type { Paper, PicturePage } from '../model/picture-page.ts';

type PrintedPictureProps = {
  png: Blob;
  paper: Paper;
  page: Pick<PicturePage, 'widthMm' | 'heightMm'>;
  label: string;
  onDone(): void;
};

/**
 * A picture on a page of its own, at its size in millimetres, so that its scale is true on paper; opens the browser's
 * printing. On the screen nothing of it is seen. `src/styles/app.css` has the pages.
 */
export function PrintedPicture({ png, paper, page, label, onDone }: PrintedPictureProps) {
  const [url, setUrl] = useState<string | null>(null);
  useEffect(() => {
    const made = URL.createObjectURL(png);
    setUrl(made);
    return () => URL.revokeObjectURL(made);
  }, [png]);
  useEffect(() => {
    window.addEventListener('afterprint', onDone);
    return () => window.removeEventListener('afterprint', onDone);
  }, [onDone]);
  if (url === null) return null;
  return createPortal(
    <div className={`printed-picture printed-picture-${paper.toLowerCase()}`}>
      <img
        src={url}
        alt={label}
        style={{ width: `${page.widthMm}mm`, height: `${page.heightMm}mm` }}
        onLoad={() => window.print()}
      />
    </div>,
    document.body,
  );
}
