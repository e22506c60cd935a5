import type { NetCell } from '#shared/compute/cells/cells.ts';
import { lengthOfPoints } from '#shared/compute/cells/quadrilateral.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { NetHeads } from '#shared/compute/net/net-heads.ts';
import { elevationAt } from '#shared/compute/net/potentials.ts';

/** A cell at which the water leaves the section. */
export type ExitCell = {
  readonly before: string;
  readonly outlet: string;
  /** Flow lines or boundaries at its left and right, seen along the flow. */
  readonly left: string;
  readonly right: string;
  /** Its middle, and the middle of its side on the outlet, in working pixels. */
  readonly middle: Pair;
  readonly exit: Pair;
  /** Its length along the flow ℓ in the natural section, document length unit. */
  readonly length: number;
  /** Head lost over it Δh, length unit; null while the lines have no heads. */
  readonly headLost: number | null;
  /** Average gradient Δh/ℓ, positive in the direction of the flow; null with Δh. */
  readonly gradient: number | null;
  /** Upward part of the unit vector of the flow through it, natural section: 1 straight up, 0 level, −1 straight down. */
  readonly upward: number;
  /** True at the edge of a floor or another corner of the ground, where the gradient at a point has no bound or is zero. */
  readonly atSingularEdge: boolean;
};

/**
 * The cells at the outlets with their average exit gradients i = Δh/ℓ. Δh is the head of the line before less that of
 * the outlet, where the head is the elevation the one at the middle of the cell's side on it; ℓ is the cell's mean
 * length along the flow, taken to the natural section by the ratio of its mid-line there to that in working pixels.
 * Source: Terzaghi and Peck; Harr (1962), exit gradient of a net as Δh over the length of the last cell. Never throws.
 */
export function exitCellsOf(cells: readonly NetCell[], heads: NetHeads): ExitCell[] {
  return cells.filter((cell) => cell.isExit).map((cell) => exitCellOf(cell, heads));
}

function exitCellOf(cell: NetCell, heads: NetHeads): ExitCell {
  const { along, middle } = cell.measures;
  const exit = along[along.length - 1]!;
  const natural = along.map(([x, y]) => heads.map.toSection(sheetPx(x, y)));
  const length = (cell.measures.length * lengthOfPoints(natural)) / lengthOfPoints(along);
  const before = heads.byId.get(cell.before)?.head ?? null;
  const outlet = heads.byId.get(cell.after);
  const after = outlet === undefined ? null : (outlet.head ?? elevationAt(heads.map, ...exit));
  const headLost = before === null || after === null ? null : finiteOrNull(before - after);
  const [from, to] = [natural[0]!, natural[natural.length - 1]!];
  const chord = Math.hypot(to[0] - from[0], to[1] - from[1]);
  return {
    before: cell.before,
    outlet: cell.after,
    left: cell.left.id,
    right: cell.right.id,
    middle,
    exit,
    length,
    headLost,
    gradient: headLost === null ? null : finiteOrNull(headLost / length),
    upward: chord > 0 ? (to[1] - from[1]) / chord : 0,
    atSingularEdge: cell.notJudged === 'singular',
  };
}

function finiteOrNull(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}
