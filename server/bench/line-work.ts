export interface SheetSize {
  width: number;
  height: number;
  dpi: number;
}

/** A1 at 300 dpi, landscape. */
export const A1: SheetSize = { width: 9933, height: 7016, dpi: 300 };
/** An E-size sheet (44 × 34 in) as a plan scanner delivers it at 600 dpi. */
export const E_600: SheetSize = { width: 28_000, height: 20_000, dpi: 600 };
/** A0 at 400 dpi, landscape. */
export const A0_400: SheetSize = { width: 18_724, height: 13_244, dpi: 400 };

export type Place = readonly [number, number];
/** Straight from place to place, or one cubic curve with its two handles. */
export interface Stroke {
  kind: 'straight' | 'curve';
  places: readonly Place[];
}

/** Strokes the size of lettering on an A1 sheet; a larger one has as many to its area. */
const STROKES_OF_A1 = 3000;
const AREA_OF_A1 = (A1.width * A1.height) / A1.dpi ** 2;

/**
 * A sheet of line work as a drawing office made it, in its pixels from the top left: frame, contours, lettering-sized
 * strokes. Spread without chance, so that each run has the same sheet.
 */
export function strokesOf(size: SheetSize): Stroke[] {
  return [frame(size), ...contours(size), ...letters(size)];
}

/** 0.25 mm, a common pen. */
export const penPx = ({ dpi }: SheetSize) => dpi / 100;

function frame({ width, height, dpi }: SheetSize): Stroke {
  const edge = 0.4 * dpi;
  const [right, bottom] = [width - edge, height - edge];
  const places: Place[] = [
    [edge, edge],
    [right, edge],
    [right, bottom],
    [edge, bottom],
    [edge, edge],
  ];
  return { kind: 'straight', places };
}

function contours({ width, height }: SheetSize): Stroke[] {
  return Array.from({ length: 60 }, (_, index) => {
    const middle = (0.057 + index * 0.0135) * height;
    const at = (share: number, part: number): Place => [
      width * share,
      middle + 0.025 * height * Math.sin(index / 7 + part),
    ];
    return { kind: 'curve', places: [at(0.03, 0), at(0.33, 1), at(0.66, 2), at(0.97, 3)] };
  });
}

function letters({ width, height, dpi }: SheetSize): Stroke[] {
  const unit = dpi / 300;
  const count = Math.round((STROKES_OF_A1 * width * height) / dpi ** 2 / AREA_OF_A1);
  return Array.from({ length: count }, (_, index) => {
    const x = ((index * 7919) % (width - 2 * dpi)) + dpi;
    const y = ((index * 104_729) % (height - 2 * dpi)) + dpi;
    const [right, down] = [x + (8 + (index % 9)) * unit, y + 22 * unit];
    const end: Place = [right - 14 * unit, down + (9 - (index % 5)) * unit];
    return { kind: 'straight', places: [[x, y], [right, down], end] };
  });
}
