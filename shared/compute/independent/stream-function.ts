import { type BoundaryLoop, boundaryLoops } from '#shared/compute/independent/boundary-loops.ts';
import { streamTensor } from '#shared/compute/independent/conductivity.ts';
import { CUT, cutMesh } from '#shared/compute/independent/cut-mesh.ts';
import {
  elementStiffness,
  eliminationOrder,
  solveField,
  type Unknowns,
} from '#shared/compute/independent/elliptic-system.ts';
import type { HeadField, HeadProblem } from '#shared/compute/independent/head-field.ts';
import type { BoundarySide, QuadraticMesh } from '#shared/compute/independent/quadratic-mesh.ts';

/** Parts of the whole flow below which a loop inside the section counts as giving and taking none. */
const NO_FLOW = 1e-9;

/**
 * Values of the stream function ψ at the nodes of its mesh, flow per unit of thickness; v = (∂ψ/∂y, −∂ψ/∂x). The mesh
 * has the elements of that of the head, and more nodes where it is cut.
 */
export type StreamField = { readonly mesh: QuadraticMesh; readonly values: Float64Array };

/**
 * The stream function of a solved head: ∇·(K/det K·∇ψ) = 0, constant along every closed piece of the edge, by its value
 * the flow that enters and leaves before it; where a head is held, K/det K·∇ψ·n = ∂h/∂s. The flow between a wall that
 * touches no other edge and the rest is an unknown of its own. About a drain inside the section ψ has no single value:
 * the mesh is cut from it to the outside, and ψ jumps across the cut by what the drain takes. Null where the system
 * cannot be solved. Sources: Bear (1972), sec. 6.5; Fraeijs de Veubeke (1965) for the pair of solutions.
 */
export function streamFunction(problem: HeadProblem, head: HeadField): StreamField | null {
  const ground = cutGround(problem.mesh, head);
  if (ground === null) return null;
  const { mesh } = ground;
  const elements = elementStiffness(mesh, (n) => streamTensor(problem.tensorOf(n)));
  const order = mesh === problem.mesh ? problem.order : eliminationOrder(mesh);
  const solution = solveField(mesh, elements, streamUnknowns(ground), order, tangentialLoad(ground));
  return solution === null ? null : { mesh, values: solution.values };
}

/** What the stream function needs of the head, by nodes of its own mesh. */
type Ground = {
  readonly mesh: QuadraticMesh;
  readonly isHeld: (node: number) => boolean;
  readonly inflow: Float64Array;
  readonly heads: Float64Array;
  /** Nodes on the two sides of the cuts, with the flow by which ψ falls from the right to the left. */
  readonly jumps: ReadonlyArray<{ readonly right: number; readonly left: number; readonly inflow: number }>;
  /** For nodes of loops that were inside before the mesh was cut the number of the loop. */
  readonly innerLoop: (node: number) => number | null;
};

/** Cuts the mesh from every loop inside it that gives or takes water to the outside; null when there is no way. */
function cutGround(uncut: QuadraticMesh, head: HeadField): Ground | null {
  const { outer, inner } = boundaryLoops(uncut);
  const least = NO_FLOW * wholeInflow(head);
  const loopOf = new Map(
    inner.flatMap((loop, k) => loop.flatMap(({ nodes }) => nodes.map((node) => [node, k] as const))),
  );
  let mesh = uncut;
  let original = Int32Array.from(uncut.x.keys());
  let jumps: Ground['jumps'] = [];
  for (const [k, loop] of inner.entries()) {
    const taken = netInflow(loop, head);
    if (Math.abs(taken) <= least) continue;
    const outside = new Set(outer.flatMap((each) => each.map(({ nodes }) => nodes[0])));
    const nodesWhere = (has: (before: number) => boolean) =>
      new Set(Array.from(original.keys()).filter((node) => has(original[node]!)));
    const cut = cutMesh(
      mesh,
      nodesWhere((before) => loopOf.get(before) === k && loop.some(({ nodes }) => nodes[0] === before)),
      nodesWhere((before) => outside.has(before)),
    );
    if (cut === null) return null;
    // A later cut may part nodes of an earlier one only at its ends; both halves keep the jump.
    const nodesOf = (before: number) =>
      Array.from(cut.original.keys()).filter((node) => cut.original[node] === before);
    jumps = [
      ...jumps.flatMap(({ right, left, inflow }) =>
        nodesOf(right).flatMap((r) => nodesOf(left).map((l) => ({ right: r, left: l, inflow }))),
      ),
      ...cut.pairs.map(([right, left]) => ({ right, left, inflow: taken })),
    ];
    const before = original;
    original = cut.original.map((node) => before[node]!);
    mesh = cut.mesh;
  }
  return {
    ...carried(head, original),
    mesh,
    jumps,
    innerLoop: (node) => loopOf.get(original[node]!) ?? null,
  };
}

/** The head's figures by the nodes of a cut mesh; what flows in at a node that was parted is counted at one half. */
function carried(head: HeadField, original: Int32Array): Pick<Ground, 'isHeld' | 'inflow' | 'heads'> {
  const counted = new Set<number>();
  const inflow = Float64Array.from(original, (node) => {
    if (counted.has(node)) return 0;
    counted.add(node);
    return head.inflow[node]!;
  });
  return {
    isHeld: (node) => !Number.isNaN(head.held[original[node]!]!),
    inflow,
    heads: Float64Array.from(original, (node) => head.values[node]!),
  };
}

/** All that flows into the section at single nodes. */
function wholeInflow({ inflow, held }: HeadField): number {
  let sum = 0;
  held.forEach((value, node) => {
    if (!Number.isNaN(value)) sum += Math.max(0, inflow[node]!);
  });
  return sum;
}

function netInflow(loop: BoundaryLoop, { inflow, held }: HeadField): number {
  let sum = 0;
  for (const { nodes } of loop)
    for (const node of [nodes[0], nodes[1]]) if (!Number.isNaN(held[node]!)) sum += inflow[node]!;
  return sum;
}

const FREE_NODE = -2;
const HELD_NODE = -1;

function streamUnknowns(ground: Ground): Unknowns {
  const count = ground.mesh.x.length;
  const base = new Float64Array(count);
  const unknown = new Int32Array(count).fill(FREE_NODE);
  const ties = new Map<number, number>();
  let next = 0;
  const { outer, inner } = boundaryLoops(ground.mesh);
  for (const loop of [...outer, ...inner]) {
    const isFixed = walkLoop(ground, loop, (node, psi, innerLoop) => {
      base[node] = psi;
      unknown[node] = innerLoop === null ? HELD_NODE : tieOf(innerLoop);
    });
    // A part of the mesh with no closed piece on its outside has the level of ψ fixed at one node.
    if (!isFixed && outer.includes(loop)) unknown[loop[0]!.nodes[0]] = HELD_NODE;
  }
  for (const { right, left, inflow } of ground.jumps) {
    if (unknown[right] !== FREE_NODE || unknown[left] !== FREE_NODE) continue;
    unknown[right] = next;
    unknown[left] = next;
    base[left] = -inflow;
    next += 1;
  }
  for (let node = 0; node < count; node += 1) if (unknown[node] === FREE_NODE) unknown[node] = next++;
  return { base, unknown, count: next };

  /** The unknown that the closed pieces of a loop inside share. */
  function tieOf(innerLoop: number): number {
    const known = ties.get(innerLoop);
    if (known !== undefined) return known;
    ties.set(innerLoop, next);
    return next++;
  }
}

/**
 * Goes round a loop and gives ψ at the nodes of its closed sides, up to a constant on loops inside; true when a closed
 * piece fixes the level of ψ.
 */
function walkLoop(
  ground: Ground,
  loop: BoundaryLoop,
  write: (node: number, psi: number, innerLoop: number | null) => void,
): boolean {
  const isOpen = (side: BoundarySide) => ground.isHeld(side.nodes[1]) && side.label !== CUT;
  // Begun where a held piece begins, so that none is cut in two.
  const start = Math.max(
    0,
    loop.findIndex((side, i) => isOpen(side) && !isOpen(loop.at(i - 1)!)),
  );
  let psi = 0;
  let isFixed = false;
  for (let i = 0; i < loop.length; i += 1) {
    const side = loop[(start + i) % loop.length]!;
    if (isOpen(side)) {
      // The first node of a held piece belongs to it, the last one too; each is passed once on the way.
      psi -= ground.inflow[side.nodes[0]]! + ground.inflow[side.nodes[1]]!;
      if (!isOpen(loop[(start + i + 1) % loop.length]!)) psi -= ground.inflow[side.nodes[2]]!;
    } else if (side.label !== CUT) {
      const innerLoop = ground.innerLoop(side.nodes[1]);
      for (const node of side.nodes) write(node, psi, innerLoop);
      isFixed ||= innerLoop === null;
    }
  }
  return isFixed;
}

/** ∮N·∂h/∂s along held sides: nothing where the head is one, its rise along the side where h = z. */
function tangentialLoad({ mesh, isHeld, heads }: Ground): Float64Array {
  const load = new Float64Array(mesh.x.length);
  for (const { nodes, label } of mesh.sides) {
    if (label === CUT || !isHeld(nodes[1])) continue;
    const rise = heads[nodes[2]]! - heads[nodes[0]]!;
    for (const [k, part] of [1 / 6, 2 / 3, 1 / 6].entries()) load[nodes[k]!] = load[nodes[k]!]! + part * rise;
  }
  return load;
}
