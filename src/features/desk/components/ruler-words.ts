import { fixedText } from '#client/lib/figures.ts';
import { rulerText as text } from '#client/text/set-out.ts';
import type { RulerFigures, RulerLeg } from '#shared/compute/ruler.ts';

/** Figures of a length of which a pixel of the scan is worth so much: no finer than that. */
export function lengthDecimals(unitsPerPx: number | null): number {
  if (unitsPerPx === null) return 1;
  return Math.min(3, Math.max(0, Math.ceil(-Math.log10(unitsPerPx))));
}

/** The cells of one leg: length, pixels, slope, angle, corner. */
export function legCells(leg: RulerLeg, decimals: number): string[] {
  return [
    ...(leg.length === null ? [] : [fixedText(leg.length, decimals)]),
    fixedText(leg.lengthPx, 1),
    text.slopeOf(leg.slope),
    fixedText(leg.angleDeg, 1),
    leg.cornerDeg === null ? '' : fixedText(leg.cornerDeg, 1),
  ];
}

export function rulerHeads(figures: RulerFigures, unit: string): string[] {
  const lengths = figures.length === null ? [] : [text.length(unit)];
  return [text.leg, ...lengths, text.lengthPx, text.slope, text.angle, text.corner];
}

export function wholeCells(figures: RulerFigures, decimals: number): string[] {
  return [
    ...(figures.length === null ? [] : [fixedText(figures.length, decimals)]),
    fixedText(figures.lengthPx, 1),
  ];
}

/** The area of a closed shape; null while it is open. */
export function areaWords(figures: RulerFigures, decimals: number, unit: string): string | null {
  if (figures.area !== null) return text.area(fixedText(figures.area, decimals), unit);
  return figures.areaPx === null ? null : text.area(fixedText(figures.areaPx, 0), text.lengthPx);
}

/** All that was measured as lines of cells parted by tabs, to be pasted into a table. */
export function rulerCopy(figures: RulerFigures, decimals: number, unit: string): string {
  const rows = figures.legs.map((leg, i) => [text.legNumber(i + 1), ...legCells(leg, decimals)]);
  const area = areaWords(figures, decimals, unit);
  return [
    rulerHeads(figures, unit),
    ...rows,
    [text.whole, ...wholeCells(figures, decimals)],
    ...(area === null ? [] : [[area]]),
  ]
    .map((cells) => cells.join('\t'))
    .join('\n');
}
