import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { SectionProblem, SectionSoil } from '#shared/compute/independent/section-problem.ts';
import type { SectionSolution } from '#shared/compute/independent/section-solution.ts';
import { solveSection } from '#shared/compute/independent/solve-section.ts';

export const UNIT_SOIL: SectionSoil = { id: 'soil', kh: 1, kv: 1, dipDeg: 0, places: [] };

export type Weir = {
  /** Depth of the pile at offset 0; 0 for none. */
  readonly pile: number;
  readonly layer: number;
  /** Floor upstream and downstream of offset 0. */
  readonly floor: readonly [number, number];
  /** Half of the width of ground modelled. */
  readonly reach: number;
  readonly lost: number;
  readonly soil?: SectionSoil;
  /** Applied to every place of the section, in (offset, elevation). */
  readonly place?: (x: number, z: number) => Pair;
  readonly tailwater?: number;
};

/** A floor with a pile on a layer of level ground at elevation 0. */
export function weirSection({
  pile,
  layer,
  floor: [b1, b2],
  reach,
  lost,
  soil = UNIT_SOIL,
  place = (x, z) => [x, z],
  tailwater = 0,
}: Weir): SectionProblem {
  const at = (points: readonly Pair[]) => points.map(([x, z]) => place(x, z));
  const line = (points: readonly Pair[], condition: SectionProblem['boundary'][number]['condition']) => ({
    points: at(points),
    condition,
  });
  return {
    boundary: [
      line(
        [
          [-reach, 0],
          [-b1, 0],
        ],
        { kind: 'head', id: 'headwater', head: tailwater + lost },
      ),
      line(
        [
          [b2, 0],
          [reach, 0],
        ],
        { kind: 'head', id: 'tailwater', head: tailwater },
      ),
      line(
        [
          [reach, 0],
          [reach, -layer],
          [-reach, -layer],
          [-reach, 0],
        ],
        { kind: 'closed', id: 'base' },
      ),
      line(
        [
          [-b1, 0],
          [b2, 0],
        ],
        { kind: 'closed', id: 'floor' },
      ),
    ],
    inner:
      pile > 0
        ? [
            line(
              [
                [0, 0],
                [0, -pile],
              ],
              { kind: 'closed', id: 'pile' },
            ),
          ]
        : [],
    soilBoundaries: [],
    soils: [soil],
    unconfined: false,
  };
}

/** The solution of a section that must have one. */
export function solved(problem: SectionProblem, options = {}): SectionSolution {
  const solution = solveSection(problem, options);
  if (!solution.ok) throw new Error(solution.text);
  return solution;
}

export function inflowOf(solution: SectionSolution, id: string): number {
  const piece = solution.flow.find((each) => each.id === id);
  if (piece === undefined) throw new Error(`There is no piece ${id}.`);
  return piece.inflow;
}
