import type { NetCell } from '#shared/compute/cells/cells.ts';
import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';

/** What is known of a net besides its lines, where cells are compared with one another. */
export type CellFacts = {
  /** Drops from one head line to the next as far as typed or counted; 1 where nobody has said. */
  readonly dropsBetween: (before: string, after: string) => number;
  /** Permeability at a place (working pixels) over that of the soil in which the channels are counted; null when unknown. */
  readonly relativeK: (at: Pair) => number | null;
};

/** One drop between all lines, one soil. */
export const PLAIN_FACTS: CellFacts = { dropsBetween: () => 1, relativeK: () => 1 };

/** Within this factor the measured ratio of the cells is taken for the entered one. */
const SAME_RATIO = 1.2;

/** Permeabilities that differ by less than this part are those of one soil. */
const SAME_SOIL = 1e-6;

/**
 * Permeability of a cell over that of the counted soil, dimensionless; `unknown` where the soil or its permeability is
 * not known, `several` where the cell lies in more than one soil, asked half-way from its middle to its sides.
 */
export function soilOfCell({ measures }: NetCell, facts: CellFacts): number | 'unknown' | 'several' {
  const { middle, along, across } = measures;
  const k = facts.relativeK(middle);
  if (k === null || !(k > 0)) return 'unknown';
  const others = [along[1]!, along[3]!, across[1]!, across[3]!].map((place) => facts.relativeK(place));
  return others.every((other) => other !== null && Math.abs(other / k - 1) <= SAME_SOIL) ? k : 'several';
}

/** Places at which the soil is asked for on each piece of a line. */
const ASKED = 4;

/**
 * Permeability along a line through soils one after another, over that of the counted soil: ℓ/∫ds/k, the harmonic mean
 * by length (Darcy 1856, in series). `path` in working pixels; null where a soil or its permeability is not known.
 */
export function seriesK(path: readonly Pair[], facts: CellFacts): number | null {
  let length = 0;
  let resistance = 0;
  for (let i = 1; i < path.length; i += 1) {
    const [[fromX, fromY], [toX, toY]] = [path[i - 1]!, path[i]!];
    const part = lengthOfVector(toX - fromX, toY - fromY) / ASKED;
    for (let j = 0; j < ASKED; j += 1) {
      const t = (j + 0.5) / ASKED;
      const k = facts.relativeK([fromX + t * (toX - fromX), fromY + t * (toY - fromY)]);
      if (k === null || !(k > 0)) return null;
      length += part;
      resistance += part / k;
    }
  }
  return resistance > 0 ? length / resistance : null;
}

/**
 * Flow through a cell for each drop of head and unit permeability of the counted soil: (k/kc)·ΔNd·B/L, dimensionless.
 * In a net of equal channels it is one number for all cells, squares or not, part drops and other soils included (flow
 * between two flow lines is the same all along: Forchheimer; Casagrande 1937). Null for cells that are not judged, and
 * where the permeability is unknown or more than one.
 */
export function cellFlow(cell: NetCell, facts: CellFacts): number | null {
  if (cell.notJudged !== null) return null;
  const k = soilOfCell(cell, facts);
  if (k === 'unknown' || k === 'several') return null;
  const flow = k * facts.dropsBetween(cell.before, cell.after) * cell.ratio;
  return Number.isFinite(flow) && flow > 0 ? flow : null;
}

/**
 * Middle value of positive numbers; of the two middle ones of an even count the one nearer to `expected`, in
 * proportion. Null of none.
 */
export function middleValue(values: readonly number[], expected: number): number | null {
  const sorted = [...values].sort((a, b) => a - b);
  const low = sorted[(sorted.length - 1) >> 1];
  const high = sorted[sorted.length >> 1];
  if (low === undefined || high === undefined) return null;
  return Math.abs(Math.log(low / expected)) <= Math.abs(Math.log(high / expected)) ? low : high;
}

/**
 * Standard deviation of ln(B/L) that the tracing accuracy σ gives a cell: σ·√(1/L² + 1/B²), as if each mean length were
 * off by σ. Both its ends are, which makes √2·σ of one line, and the mean over the side takes about as much off again.
 * `accuracyPx`: σ in working pixels; dimensionless.
 */
export function tremorOf({ measures }: NetCell, accuracyPx: number): number {
  return accuracyPx * lengthOfVector(1 / measures.length, 1 / measures.width);
}

/** The ratio by which cells are judged, and the middle one measured, B/L; `measured` null while there is no cell. */
export type CommonRatio = {
  readonly judgedBy: number;
  readonly measured: number | null;
  readonly agrees: boolean;
};

/**
 * The B/L that the cells of a net have in common: the entered one where the cells measure about that, else the middle
 * of the measured ones, since heads hang on cells being alike and not on the figure entered. Without channels the entered
 * one says nothing of them.
 */
export function commonRatioOf(
  cells: readonly NetCell[],
  entered: number,
  facts: CellFacts,
  hasChannels = true,
): CommonRatio {
  const flows = cells.map((cell) => cellFlow(cell, facts)).filter((flow) => flow !== null);
  const measured = middleValue(flows, entered);
  const agrees =
    measured === null || (hasChannels && Math.abs(Math.log(measured / entered)) <= Math.log(SAME_RATIO));
  return { judgedBy: agrees ? entered : measured, measured, agrees };
}
