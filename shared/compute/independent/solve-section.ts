import { type EnergyGap, energyGap } from '#shared/compute/independent/energy-gap.ts';
import { exitGradients } from '#shared/compute/independent/exit-gradients.ts';
import { type HeadField, type HeadProblem, headField } from '#shared/compute/independent/head-field.ts';
import { pieceFlows } from '#shared/compute/independent/piece-flows.ts';
import { quadraticMesh } from '#shared/compute/independent/quadratic-mesh.ts';
import { toSection } from '#shared/compute/independent/section-frame.ts';
import { OUTSIDE, outlineOf, type SectionOutline } from '#shared/compute/independent/section-outline.ts';
import {
  failure,
  type SectionFailure,
  type SectionProblem,
} from '#shared/compute/independent/section-problem.ts';
import type { SectionSolution } from '#shared/compute/independent/section-solution.ts';
import { type FineCorner, fineCorners, sizeField } from '#shared/compute/independent/size-field.ts';
import {
  type StreamField,
  streamFunction,
  wholeInflow,
} from '#shared/compute/independent/stream-function.ts';
import { refine } from '#shared/compute/mesh/refine.ts';

export type SolveOptions = {
  /** Bound of the relative error of the energy at which refinement ends. */
  readonly accuracy?: number;
  /** Elements over the section's area before corners are refined. */
  readonly elements?: number;
  /** Nodes at which refinement ends. */
  readonly mostNodes?: number;
};

const USUAL = { accuracy: 1e-3, elements: 1200, mostNodes: 30_000 } as const;
const MOST_ROUNDS = 8;
/** Part of the gap that is refined away in a round (Dörfler 1996). */
const MARKED_PART = 0.6;

/**
 * Solves steady seepage through a section: ∇·(K∇h) = 0 by six-node triangles, refined towards corners where the gradient
 * has no bound and wherever the solution for h and the one for ψ disagree (Prager and Synge 1947), until their gap is
 * below the accuracy asked for. Heads in the problem's length unit, flow in that unit squared per time unit of k. Never
 * throws; what cannot be solved is said, with the place.
 */
export function solveSection(
  problem: SectionProblem,
  options: SolveOptions = {},
): SectionSolution | SectionFailure {
  const outline = outlineOf(problem);
  if ('ok' in outline) return outline;
  return solveConfined(problem, outline, { ...USUAL, ...options });
}

type Round = {
  readonly problem: HeadProblem;
  readonly head: HeadField;
  readonly stream: StreamField | null;
  readonly gap: EnergyGap | null;
};

function solveConfined(
  problem: SectionProblem,
  outline: SectionOutline,
  options: Required<SolveOptions>,
): SectionSolution | SectionFailure {
  if (!outline.conditions.some(({ kind }) => kind === 'head'))
    return failure(
      'no-head',
      'No water level acts on the section. Trace a submerged face and enter its level.',
    );
  const corners = fineCorners(outline);
  const sizeAt = sizeField(corners, coarsestSize(outline, options.elements));
  const wanted = (region: number) => region !== OUTSIDE;
  // Six-node triangles have about four nodes for each vertex.
  const mostVertices = options.mostNodes / 4;
  let marked: number[] = [];
  for (let round = 0; ; round += 1) {
    refine(outline.mesh, {
      sizeAt,
      wanted,
      mostVertices: round === 0 ? options.mostNodes : mostVertices,
      marked,
    });
    const solved = solveOnce(outline);
    if ('ok' in solved) return solved;
    const { gap } = solved;
    const isDone = gap === null || gap.gap <= options.accuracy * gap.energy || round === MOST_ROUNDS;
    if (isDone || outline.mesh.x.length >= mostVertices) return solutionOf(problem, outline, corners, solved);
    marked = worstElements(gap.byElement).map((n) => solved.problem.mesh.triangles[n]!);
  }
}

function coarsestSize({ mesh }: SectionOutline, elements: number): number {
  let area = 0;
  for (let t = 0; t < mesh.triangleCount; t += 1) {
    if (mesh.region[t] === OUTSIDE) continue;
    const [a, b, c] = [mesh.corner[3 * t]!, mesh.corner[3 * t + 1]!, mesh.corner[3 * t + 2]!];
    const { x, y } = mesh;
    area += ((x[b]! - x[a]!) * (y[c]! - y[a]!) - (y[b]! - y[a]!) * (x[c]! - x[a]!)) / 2;
  }
  return Math.sqrt((4 * area) / (Math.sqrt(3) * elements));
}

function solveOnce(outline: SectionOutline): Round | SectionFailure {
  const { frame, conditions, tensors } = outline;
  const mesh = quadraticMesh(
    outline.mesh,
    (region) => region !== OUTSIDE,
    (label) => label < conditions.length,
  );
  // Heads are counted from the frame's origin, so that high ground costs no digits.
  const datum = frame.origin[1];
  const problem: HeadProblem = {
    mesh,
    conditions: conditions.map((each) =>
      each.kind === 'head' ? { ...each, head: each.head - datum } : each,
    ),
    tensorOf: (n) => tensors[mesh.regions[n]! - 1]!,
    elevations: mesh.x.map((x, node) => toSection(frame, [x, mesh.y[node]!])[1] - datum),
  };
  const head = headField(problem);
  if (head === null)
    return failure('no-head', 'A part of the section is cut off from every water level. Check its outline.');
  const stream = streamFunction(problem, head);
  return { problem, head, stream, gap: stream === null ? null : energyGap(problem, head, stream) };
}

/** The fewest elements that hold the part of the gap to be refined away. */
function worstElements(byElement: Float64Array): number[] {
  const order = Array.from(byElement.keys()).sort((a, b) => byElement[b]! - byElement[a]!);
  const enough = MARKED_PART * byElement.reduce((a, b) => a + b, 0);
  let sum = 0;
  const count = order.findIndex((n) => {
    sum += byElement[n]!;
    return sum >= enough;
  });
  return order.slice(0, count + 1);
}

function solutionOf(
  problem: SectionProblem,
  outline: SectionOutline,
  corners: readonly FineCorner[],
  { problem: headProblem, head, stream, gap }: Round,
): SectionSolution {
  const flow = pieceFlows(headProblem, head);
  const heads = head.values.map((value) => value + outline.frame.origin[1]);
  const inflow = wholeInflow(head);
  const outflow = inflow - flow.reduce((sum, piece) => sum + piece.inflow, 0);
  return {
    ok: true,
    frame: outline.frame,
    mesh: headProblem.mesh,
    heads,
    leastHead: heads.reduce((a, b) => Math.min(a, b)),
    greatestHead: heads.reduce((a, b) => Math.max(a, b)),
    stream,
    flow,
    inflow,
    outflow,
    imbalance: inflow > 0 ? Math.abs(inflow - outflow) / inflow : 0,
    gap: gap === null || gap.energy === 0 ? null : gap.gap / gap.energy,
    exits: exitGradients(headProblem, head, outline.frame, corners),
    phreatic: null,
    permeabilities: problem.soils.map(({ kh, kv }) => Math.sqrt(kh * kv)),
    tensors: outline.tensors,
    nodeCount: headProblem.mesh.x.length,
  };
}
