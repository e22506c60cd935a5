/** Where a section lies on a demo sheet: a similarity with the skew of a sheet that lay crooked on the scanner. */
export interface SheetFrame {
  widthPx: number;
  heightPx: number;
  /** Pixels per metre. */
  pxPerMetre: number;
  /** Skew in degrees, clockwise positive on the sheet. */
  skewDeg: number;
  /** Sheet pixel of the section's point (offset 0, elevation `datumElevation`). */
  origin: readonly [number, number];
  datumElevation: number;
}

/** Sheet pixel of a point given by offset (growing to the right) and elevation, metres. */
export function toSheet(frame: SheetFrame, offset: number, elevation: number): [number, number] {
  const angle = (frame.skewDeg * Math.PI) / 180;
  const right = offset * frame.pxPerMetre;
  const down = (frame.datumElevation - elevation) * frame.pxPerMetre;
  return [
    frame.origin[0] + right * Math.cos(angle) - down * Math.sin(angle),
    frame.origin[1] + right * Math.sin(angle) + down * Math.cos(angle),
  ];
}

/** Pixels per metre of a drawing at scale 1:n scanned at `dpi`. */
export const pxPerMetreAt = (scale: number, dpi: number) => dpi / 0.0254 / scale;
