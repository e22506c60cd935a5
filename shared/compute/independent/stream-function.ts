import { type BoundaryLoop, boundaryLoops } from '#shared/compute/independent/boundary-loops.ts';
import { streamTensor } from '#shared/compute/independent/conductivity.ts';
import { elementStiffness, solveField, type Unknowns } from '#shared/compute/independent/elliptic-system.ts';
import type { HeadField, HeadProblem } from '#shared/compute/independent/head-field.ts';
import type { QuadraticMesh } from '#shared/compute/independent/quadratic-mesh.ts';

/** Parts of the whole flow below which a loop inside the section counts as giving and taking none. */
const NO_FLOW = 1e-9;

/** Values of the stream function ψ at the nodes of its mesh, flow per unit of thickness; v = (∂ψ/∂y, −∂ψ/∂x). */
export type StreamField = { readonly mesh: QuadraticMesh; readonly values: Float64Array };

/**
 * The stream function of a solved head: ∇·(K/det K·∇ψ) = 0, constant along every closed piece of the edge, by its value
 * the flow that enters and leaves before it; where a head is held, K/det K·∇ψ·n = ∂h/∂s. The flow to the left of a wall
 * or an opening that touches no other edge is an unknown of its own. Null where a drain inside the section takes water,
 * as ψ has no single value about it, or where the system cannot be solved. Sources: Bear (1972), sec. 6.5; Fraeijs de
 * Veubeke (1965) for the pair of solutions.
 */
export function streamFunction(problem: HeadProblem, head: HeadField): StreamField | null {
  const { mesh } = problem;
  const loops = boundaryLoops(mesh);
  const whole = wholeInflow(head);
  const inner = loops.slice(1);
  if (inner.some((loop) => Math.abs(netInflow(loop, head)) > NO_FLOW * whole)) return null;
  const unknowns = streamUnknowns(mesh, loops, head);
  const elements = elementStiffness(mesh, (n) => streamTensor(problem.tensorOf(n)));
  const solution = solveField(mesh, elements, unknowns, problem.order, tangentialLoad(mesh, head));
  return solution === null ? null : { mesh, values: solution.values };
}

/** All that flows into the section at single nodes. */
function wholeInflow({ inflow, held }: HeadField): number {
  let sum = 0;
  held.forEach((value, node) => {
    if (!Number.isNaN(value)) sum += Math.max(0, inflow[node]!);
  });
  return sum;
}

function isHeld({ held }: HeadField, node: number): boolean {
  return !Number.isNaN(held[node]!);
}

function netInflow(loop: BoundaryLoop, head: HeadField): number {
  let sum = 0;
  for (const { nodes } of loop)
    for (const node of [nodes[0], nodes[1]]) if (isHeld(head, node)) sum += head.inflow[node]!;
  return sum;
}

function streamUnknowns(mesh: QuadraticMesh, loops: readonly BoundaryLoop[], head: HeadField): Unknowns {
  const count = mesh.x.length;
  const base = new Float64Array(count);
  const unknown = new Int32Array(count).fill(FREE_NODE);
  let next = 0;
  loops.forEach((loop, number) => {
    // The outer loop fixes the level of ψ; if no piece of it is closed, its first node does.
    const tie = number === 0 ? HELD_NODE : next;
    const touched = writeLoop(loop, head, base, unknown, tie);
    if (number === 0 && !touched) unknown[loop[0]!.nodes[0]] = HELD_NODE;
    if (number > 0 && touched) next += 1;
  });
  for (let node = 0; node < count; node += 1) if (unknown[node] === FREE_NODE) unknown[node] = next++;
  return { base, unknown, count: next };
}

const FREE_NODE = -2;
const HELD_NODE = -1;

/** Writes ψ along the closed sides of a loop, up to the loop's own constant; true when there is a closed side. */
function writeLoop(
  loop: BoundaryLoop,
  head: HeadField,
  base: Float64Array,
  unknown: Int32Array,
  tie: number,
): boolean {
  // Begun where a held piece begins, so that none is cut in two.
  const start = Math.max(
    0,
    loop.findIndex(({ nodes }, i) => isOpenSide(head, nodes) && !isOpenSide(head, loop.at(i - 1)!.nodes)),
  );
  let psi = 0;
  let touched = false;
  for (let i = 0; i < loop.length; i += 1) {
    const { nodes } = loop[(start + i) % loop.length]!;
    if (isOpenSide(head, nodes)) {
      // The first node of a held piece belongs to it, the last one too; each is passed once on the way.
      psi -= head.inflow[nodes[0]]! + head.inflow[nodes[1]]!;
      const following = loop[(start + i + 1) % loop.length]!;
      if (!isOpenSide(head, following.nodes)) psi -= head.inflow[nodes[2]]!;
      continue;
    }
    touched = true;
    for (const node of nodes) {
      base[node] = psi;
      unknown[node] = tie;
    }
  }
  return touched;
}

function isOpenSide(head: HeadField, nodes: readonly [number, number, number]): boolean {
  return isHeld(head, nodes[1]);
}

/** ∮N·∂h/∂s along held sides: nothing where the head is one, its rise along the side where h = z. */
function tangentialLoad(mesh: QuadraticMesh, head: HeadField): Float64Array {
  const load = new Float64Array(mesh.x.length);
  for (const { nodes } of mesh.sides) {
    if (!isOpenSide(head, nodes)) continue;
    const rise = head.values[nodes[2]]! - head.values[nodes[0]]!;
    for (const [k, part] of [1 / 6, 2 / 3, 1 / 6].entries()) load[nodes[k]!] = load[nodes[k]!]! + part * rise;
  }
  return load;
}
