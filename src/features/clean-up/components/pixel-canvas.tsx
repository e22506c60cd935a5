import { useEffect, useRef } from 'react';
import type { PixelRows } from '#shared/compute/renditions/tones.ts';

/** Pixels with opacity, shown as wide as there is room. */
export function PixelCanvas({
  rows,
  label,
  className,
}: {
  rows: PixelRows;
  label: string;
  className?: string;
}) {
  const canvas = useRef<HTMLCanvasElement>(null);
  useEffect(() => {
    const element = canvas.current;
    if (element === null) return;
    element.width = rows.widthPx;
    element.height = rows.heightPx;
    const image = new ImageData(rows.widthPx, rows.heightPx);
    image.data.set(rows.data);
    element.getContext('2d')?.putImageData(image, 0, 0);
  }, [rows]);
  return <canvas ref={canvas} role="img" aria-label={label} className={className} />;
}
