import { groupTitle } from '#client/text/figure-names.ts';
import type { GroupBeside } from '#shared/compute/compare-figures/figures-beside.ts';
import type { CsvCell } from '#shared/text/csv.ts';
import { type FigureUnits, figureLabel } from './figure-unit.ts';

/** Digits of the figures in a file: as many as two runs of one engine agree in. */
const FILE_DIGITS = 12;

interface BesideHeads {
  figure: string;
  one: string;
  other: string;
  difference: string;
}

/** Two readings side by side as the rows of a CSV file, with more digits than the screen shows. */
export function besideRows(
  groups: readonly GroupBeside[],
  units: FigureUnits,
  { figure, one, other, difference }: BesideHeads,
): CsvCell[][] {
  const rows = groups.flatMap((group) =>
    group.figures.map((each): CsvCell[] => [
      groupTitle(group),
      figureLabel(each.what, each.quantity, units),
      inFile(each.one.value),
      inFile(each.one.plusMinus),
      inFile(each.other.value),
      inFile(each.other.plusMinus),
      inFile(each.difference),
    ]),
  );
  return [['', figure, one, '±', other, '±', difference], ...rows];
}

const inFile = (value: number | null) => (value === null ? null : Number(value.toPrecision(FILE_DIGITS)));
