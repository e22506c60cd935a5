import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { type EnergyGap, energyGap } from '#shared/compute/independent/energy-gap.ts';
import { exitGradients } from '#shared/compute/independent/exit-gradients.ts';
import { freeSurface } from '#shared/compute/independent/free-surface.ts';
import {
  contradictoryNode,
  type HeadField,
  type HeadProblem,
  headField,
} from '#shared/compute/independent/head-field.ts';
import { headProblemOf } from '#shared/compute/independent/head-problem.ts';
import { pieceFlows } from '#shared/compute/independent/piece-flows.ts';
import { toSection } from '#shared/compute/independent/section-frame.ts';
import { OUTSIDE, outlineOf, type SectionOutline } from '#shared/compute/independent/section-outline.ts';
import {
  failure,
  type SectionFailure,
  type SectionProblem,
} from '#shared/compute/independent/section-problem.ts';
import type { SectionSolution } from '#shared/compute/independent/section-solution.ts';
import {
  coarsestSize,
  type FineCorner,
  fineCorners,
  sizeField,
} from '#shared/compute/independent/size-field.ts';
import { solutionReader } from '#shared/compute/independent/solution-reader.ts';
import { type StreamField, streamFunction } from '#shared/compute/independent/stream-function.ts';
import { refine } from '#shared/compute/mesh/refine.ts';

export type SolveOptions = {
  /** Bound of the relative error of the energy at which refinement ends. */
  readonly accuracy?: number;
  /** Elements over the section's area before corners are refined. */
  readonly elements?: number;
  /** Nodes at which refinement ends. */
  readonly mostNodes?: number;
};

const USUAL = { accuracy: 1e-3, elements: 1200, mostNodes: 20_000 } as const;
const MOST_ROUNDS = 8;
const NO_ENERGY = 1e-8;
const NO_FLOW = 1e-9;
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
  const all = { ...USUAL, ...options };
  return problem.unconfined ? solveUnconfined(problem, outline, all) : solveConfined(problem, outline, all);
}

/** Finds the free surface and solves the section below it, the surface being closed. */
function solveUnconfined(
  problem: SectionProblem,
  outline: SectionOutline,
  options: Required<SolveOptions>,
): SectionSolution | SectionFailure {
  if (!outline.conditions.some(({ kind }) => kind === 'head')) return noHead();
  const surface = freeSurface(outline, Math.ceil(options.elements / 2));
  if ('ok' in surface) return surface;
  const toOwn = (place: Pair) => toSection(outline.frame, place);
  const lines = surface.lines.map((line) => upstreamFirst(line.map(toOwn)));
  const below: SectionProblem = {
    ...problem,
    boundary: [
      ...problem.boundary,
      ...lines.map((points) => ({ points, condition: { kind: 'closed', id: SURFACE_ID } as const })),
    ],
    inside: surface.wetPlaces.map(toOwn),
  };
  const belowOutline = outlineOf(below);
  if ('ok' in belowOutline) return belowOutline;
  const solution = solveConfined(below, belowOutline, options);
  return solution.ok ? { ...solution, phreatic: lines, surfaceMisfit: misfitOf(solution, lines) } : solution;
}

function misfitOf(solution: SectionSolution, lines: ReadonlyArray<readonly Pair[]>): number {
  const { headAt } = solutionReader(solution);
  let greatest = 0;
  for (const place of lines.flat()) {
    const head = headAt(place);
    if (head !== null) greatest = Math.max(greatest, Math.abs(head - place[1]));
  }
  return greatest;
}

/** Id of the free surface among the pieces of an outline. */
export const SURFACE_ID = 'free surface';

function upstreamFirst(line: readonly Pair[]): readonly Pair[] {
  return line[0]![1] >= line.at(-1)![1] ? line : line.toReversed();
}

function noHead(): SectionFailure {
  return failure(
    'no-head',
    'No water level acts on the section. Trace a submerged face and enter its level.',
  );
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
      mostVertices: round === 0 ? 2 * mostVertices : mostVertices,
      marked,
    });
    const solved = solveOnce(outline);
    if ('ok' in solved) return solved;
    const { gap } = solved;
    const isDone = gap === null || isFineEnough(solved, gap, options.accuracy) || round === MOST_ROUNDS;
    if (isDone || outline.mesh.x.length >= mostVertices) return solutionOf(problem, outline, corners, solved);
    marked = worstElements(gap.byElement).map((n) => solved.problem.mesh.triangles[n]!);
  }
}

/** Flow below which there is none: a rounding of what would pass with the section's height lost. */
function leastFlow({ elevations, tensorOf }: HeadProblem): number {
  const height = elevations.reduce((most, each) => Math.max(most, Math.abs(each)), 0);
  const { xx, yy } = tensorOf(0);
  return Math.max(NO_FLOW * Math.sqrt(xx * yy) * height, Number.MIN_VALUE);
}

/** The gap in parts of the energy, but where next to nothing flows in parts of what would with the section's height lost. */
function isFineEnough({ problem }: Round, { energy, gap }: EnergyGap, accuracy: number): boolean {
  const height = problem.elevations.reduce((most, each) => Math.max(most, Math.abs(each)), 0);
  const { xx, yy } = problem.tensorOf(0);
  return gap <= accuracy * Math.max(energy, NO_ENERGY * Math.sqrt(xx * yy) * height * height);
}

function solveOnce(outline: SectionOutline): Round | SectionFailure {
  const problem = headProblemOf(outline);
  const torn = contradictoryNode(problem);
  if (torn !== null)
    return failure(
      'contradictory-heads',
      'Two pieces with different heads touch. Part them by a closed piece or correct a level.',
      toSection(outline.frame, [problem.mesh.x[torn]!, problem.mesh.y[torn]!]),
    );
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
  const inflow = flow.reduce((sum, piece) => sum + Math.max(0, piece.inflow), 0);
  const outflow = flow.reduce((sum, piece) => sum - Math.min(0, piece.inflow), 0);
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
    imbalance: Math.abs(inflow - outflow) / Math.max(inflow, leastFlow(headProblem)),
    gap: gap === null || gap.energy === 0 ? null : gap.gap / gap.energy,
    exits: exitGradients(headProblem, head, outline.frame, corners),
    phreatic: null,
    surfaceMisfit: null,
    permeabilities: problem.soils.map(({ kh, kv }) => Math.sqrt(kh * kv)),
    tensors: outline.tensors,
    nodeCount: headProblem.mesh.x.length,
  };
}
