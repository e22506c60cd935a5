import { figureWords as words } from '#client/text/figure-names.ts';
import type { FigureName, Quantity } from '#shared/compute/compare-figures/figure-types.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { elevationUnit, unitNames } from '#shared/text/unit-text.ts';

export type FigureUnits = Pick<FlowNetDocument, 'unitSystem' | 'datum'>;

/** The unit in which a quantity is shown; empty for a plain number. */
export function figureUnit(quantity: Quantity, { unitSystem, datum }: FigureUnits): string {
  const { length, pressure, unitWeight, seepage } = unitNames(unitSystem);
  switch (quantity) {
    case 'offset':
    case 'length':
      return length;
    case 'elevation':
    case 'totalHead':
      return elevationUnit(unitSystem, datum);
    case 'pressure':
      return pressure;
    case 'unitWeight':
      return unitWeight;
    case 'seepage':
      return seepage;
    case 'permeability':
      return words.permeability[unitSystem];
    case 'force':
      return words.force[unitSystem];
    case 'scale':
      return words.perPixel(length);
    default:
      return '';
  }
}

/** A figure's name with its unit: "Total head, m LD". */
export function figureLabel(what: FigureName, quantity: Quantity, units: FigureUnits): string {
  const unit = figureUnit(quantity, units);
  return unit === '' ? words.figures[what] : `${words.figures[what]}, ${unit}`;
}
