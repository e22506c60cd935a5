import type { SectionSolution } from '#shared/compute/independent/section-solution.ts';
import { solutionReader } from '#shared/compute/independent/solution-reader.ts';
import type { NetReading } from '#shared/contract/reading.ts';

/**
 * A figure of the traced net beside that of the independent solution; `difference` is traced minus independent, and
 * `part` the difference over the whole head lost (heads) or over the independent figure (seepage). Null where one of
 * the two has no figure.
 */
export type ComparedFigure = {
  readonly traced: number | null;
  readonly independent: number | null;
  readonly difference: number | null;
  readonly part: number | null;
};

export type IndependentComparison = {
  readonly points: ReadonlyArray<{ readonly id: string; readonly name: string } & ComparedFigure>;
  /** Of all the water; null figures where no permeability is given. */
  readonly seepage: ComparedFigure;
  /** By outlet, the first member of which gives the id. */
  readonly outlets: ReadonlyArray<{ readonly id: string; readonly label: string } & ComparedFigure>;
};

/**
 * Holds a traced net against the independent solution of its section: total heads at the reading points, seepage of
 * all and of each outlet. Heads in the document's length unit, seepage in m³/s per metre (SI) or ft³/s per foot (US).
 * The difference says how far the net is from Laplace's equation between the boundaries drawn; it is no variance of
 * the reading and is never added to its ±. `hasPermeability` as `sectionOfDocument` gives it.
 */
export function compareWithIndependent(
  reading: NetReading,
  solution: SectionSolution,
  hasPermeability: boolean,
): IndependentComparison {
  const { headAt } = solutionReader(solution);
  const lost = solution.greatestHead - solution.leastHead;
  const flowOut = (members: readonly string[]) =>
    hasPermeability
      ? -solution.flow.filter(({ id }) => members.includes(id)).reduce((sum, { inflow }) => sum + inflow, 0)
      : null;
  return {
    points: reading.points.map(({ id, name, offset, elevation, totalHead }) => ({
      id,
      name,
      ...compared(
        totalHead,
        offset === null || elevation === null ? null : headAt([offset, elevation]),
        lost,
      ),
    })),
    seepage: compared(
      reading.quantities.seepage,
      hasPermeability ? solution.outflow : null,
      hasPermeability ? solution.outflow : 0,
    ),
    outlets: reading.quantities.outlets.map(({ id, members, label, seepage }) => {
      const independent = flowOut(members);
      return { id, label, ...compared(seepage, independent, Math.abs(independent ?? 0)) };
    }),
  };
}

function compared(traced: number | null, independent: number | null, scale: number): ComparedFigure {
  const difference = traced === null || independent === null ? null : traced - independent;
  return {
    traced,
    independent,
    difference,
    part: difference === null || scale === 0 ? null : difference / scale,
  };
}
