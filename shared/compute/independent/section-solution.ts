import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { Tensor } from '#shared/compute/independent/conductivity.ts';
import type { QuadraticMesh } from '#shared/compute/independent/quadratic-mesh.ts';
import type { SectionFrame } from '#shared/compute/independent/section-frame.ts';

/** What passes through all pieces of one id, flow per unit of thickness (length² per time of k), positive into the section. */
export type PieceFlow = { readonly id: string; readonly inflow: number };

/**
 * Gradient at a place where water comes out, positive outwards (upwards on level ground), length per length; null and
 * `singular` at the edge of a floor or a re-entrant corner, where it has no bound.
 */
export type ExitGradient = {
  readonly id: string;
  readonly at: Pair;
  readonly gradient: number | null;
  readonly singular: boolean;
};

/**
 * A solved section: plain data, which may be handed from a worker. Heads and elevations in the problem's length unit
 * and datum; read it with `solutionReader`, draw it with `computedNet`.
 */
export type SectionSolution = {
  readonly ok: true;
  readonly frame: SectionFrame;
  readonly mesh: QuadraticMesh;
  /** Head at each node of the mesh; the least and the greatest of them. */
  readonly heads: Float64Array;
  readonly leastHead: number;
  readonly greatestHead: number;
  /** Stream function ψ at the nodes of a mesh of its own with the same elements; null where it has no single value. */
  readonly stream: { readonly mesh: QuadraticMesh; readonly values: Float64Array } | null;
  readonly flow: readonly PieceFlow[];
  /** Sums of what the pieces of each id take in and let out. */
  readonly inflow: number;
  readonly outflow: number;
  /** Difference of the two in parts of the inflow. */
  readonly imbalance: number;
  /** Bound of the relative error of the energy (of the seepage, with one inlet and one outlet); null without ψ. */
  readonly gap: number | null;
  readonly exits: readonly ExitGradient[];
  /** Free surface in section coordinates, upstream end first; null where the section is confined. */
  readonly phreatic: readonly (readonly Pair[])[] | null;
  /** Greatest departure of the head from the elevation along the free surface, length; null where confined. */
  readonly surfaceMisfit: number | null;
  /** √(kh·kv) of each soil, in the order of the problem. */
  readonly permeabilities: readonly number[];
  /** Permeability of each soil in the frame. */
  readonly tensors: readonly Tensor[];
  readonly nodeCount: number;
};
