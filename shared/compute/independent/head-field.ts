import type { Tensor } from '#shared/compute/independent/conductivity.ts';
import {
  elementStiffness,
  type FieldSolution,
  solveField,
  unknownsOf,
} from '#shared/compute/independent/elliptic-system.ts';
import type { BoundarySide, QuadraticMesh } from '#shared/compute/independent/quadratic-mesh.ts';
import type { SectionCondition } from '#shared/compute/independent/section-problem.ts';

/**
 * A mesh with what is known of it: an order of elimination for its nodes, the condition of each label, permeability of
 * each element, elevation of each node.
 */
export type HeadProblem = {
  readonly mesh: QuadraticMesh;
  readonly order: Int32Array;
  readonly conditions: readonly SectionCondition[];
  readonly tensorOf: (element: number) => Tensor;
  readonly elevations: Float64Array;
};

/**
 * Heads at the nodes, what flows in at them, for each node the head it is held at (NaN where it is free), and the sides
 * of faces of free outflow that let water out.
 */
export type HeadField = FieldSolution & {
  readonly held: Float64Array;
  readonly open: ReadonlySet<BoundarySide>;
};

/** Turns until the faces of outflow must have settled. */
const MOST_ROUNDS = 40;

/**
 * The head in a section: held along heads, h = z along faces of free outflow as far as water comes out there, closed
 * elsewhere. Which part of the faces lets water out is found by turns: a side that would take water in is closed, a
 * closed side with pressure above zero is opened (Neuman and Witherspoon 1970). `elements`: stiffness of the elements; `opened`: sides
 * open to begin with, all if left out. Null when nothing holds a part of it.
 */
export function headField(
  problem: HeadProblem,
  elements: Float64Array = elementStiffness(problem.mesh, problem.tensorOf),
  opened?: ReadonlySet<BoundarySide>,
  mostRounds = MOST_ROUNDS,
): HeadField | null {
  const { mesh, conditions } = problem;
  const free = mesh.sides.filter((side) => conditions[side.label]?.kind === 'freeOutflow');
  const open = new Set(opened ?? free);
  for (let round = 0; ; round += 1) {
    const held = heldHeads(problem, open);
    const solution = solveField(mesh, elements, unknownsOf(held), problem.order);
    if (solution === null) return null;
    const wrong = free.filter((side) => isWrong(problem, solution, side, open.has(side)));
    if (wrong.length === 0 || round >= mostRounds) return { ...solution, held, open };
    for (const side of wrong) if (!open.delete(side)) open.add(side);
  }
}

function heldHeads(
  { mesh, conditions, elevations }: HeadProblem,
  open: ReadonlySet<BoundarySide>,
): Float64Array {
  const held = new Float64Array(mesh.x.length).fill(Number.NaN);
  for (const side of mesh.sides) {
    if (!open.has(side)) continue;
    for (const node of side.nodes) held[node] = elevations[node]!;
  }
  for (const { label, nodes } of mesh.sides) {
    const condition = conditions[label];
    if (condition?.kind !== 'head') continue;
    for (const node of nodes) held[node] = condition.head;
  }
  return held;
}

function isWrong(
  { elevations }: HeadProblem,
  { values, inflow }: FieldSolution,
  { nodes }: BoundarySide,
  isOpen: boolean,
): boolean {
  const middle = nodes[1];
  return isOpen ? inflow[middle]! > 0 : values[middle]! > elevations[middle]!;
}

/** Parts of the difference of heads by which two heads at one place may differ. */
const SAME_HEAD = 1e-6;

/** A node at which two pieces hold different heads; null when there is none. */
export function contradictoryNode({ mesh, conditions }: HeadProblem): number | null {
  const all = conditions.flatMap((each) => (each.kind === 'head' ? [each.head] : []));
  const tolerance = SAME_HEAD * (Math.max(...all) - Math.min(...all));
  const heads = new Map<number, number>();
  for (const { nodes, label } of mesh.sides) {
    const condition = conditions[label];
    if (condition?.kind !== 'head') continue;
    for (const node of nodes) {
      if (Math.abs((heads.get(node) ?? condition.head) - condition.head) > tolerance) return node;
      heads.set(node, condition.head);
    }
  }
  return null;
}
