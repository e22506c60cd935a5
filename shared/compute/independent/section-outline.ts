import type { Pair } from '#shared/compute/geometry/predicates.ts';
import {
  permeabilityTensor,
  type Tensor,
  transformedTensor,
} from '#shared/compute/independent/conductivity.ts';
import {
  type SectionFrame,
  sectionFrame,
  toFrame,
  toSection,
} from '#shared/compute/independent/section-frame.ts';
import {
  failure,
  type SectionChain,
  type SectionCondition,
  type SectionFailure,
  type SectionProblem,
} from '#shared/compute/independent/section-problem.ts';
import { BOX_VERTICES, constrainedDelaunay } from '#shared/compute/mesh/constrained-delaunay.ts';
import { type LabelledChain, type NodedSegments, nodeSegments } from '#shared/compute/mesh/node-segments.ts';
import { FREE, nextOf, type TriangleMesh } from '#shared/compute/mesh/triangle-mesh.ts';

/** Region of a triangle outside the section; inside, the region is the number of its soil plus one. */
export const OUTSIDE = 0;

/** Places nearer than this part of the section's extent are one. */
const MERGE = 1e-6;

/** A bounded face of the lines of a problem: a place in it, and how long each condition's pieces about it are. */
export type OutlineFace = { readonly place: Pair; readonly lengths: ReadonlyMap<SectionCondition, number> };

/**
 * The bounded faces into which the outlines of a problem part the plane, places in section coordinates; and the places
 * at which an outline ends with nothing joined to it. A failure when the lines are too tangled or a figure is wrong.
 */
export function outlineFaces(
  problem: SectionProblem,
): { faces: OutlineFace[]; looseEnds: Array<{ at: Pair; condition: SectionCondition }> } | SectionFailure {
  const lines = linesOf(problem);
  if ('ok' in lines) return lines;
  const { frame, mesh, segments } = lines;
  const { outlines } = roles(mesh, segments);
  const passes = (e: number) => !outlines.has(e);
  const seen = new Set(
    flood(
      mesh,
      mesh.around(0).map((e) => Math.floor(e / 3)),
      passes,
    ),
  );
  const faces: OutlineFace[] = [];
  for (let t = 0; t < mesh.triangleCount; t += 1) {
    if (seen.has(t)) continue;
    const face = flood(mesh, [t], passes);
    for (const each of face) seen.add(each);
    faces.push({
      place: toSection(frame, largestMiddle(mesh, face)),
      lengths: lengthsAbout(lines, face),
    });
  }
  return { faces, looseEnds: looseEndsOf(lines) };
}

/** Natural length of the pieces of each condition along some triangles; both sides of a wall inside them count. */
function lengthsAbout(
  { frame, mesh, conditions }: SectionOutline,
  triangles: readonly number[],
): Map<SectionCondition, number> {
  const lengths = new Map<SectionCondition, number>();
  const placeOf = (v: number) => toSection(frame, [mesh.x[v]!, mesh.y[v]!]);
  for (const t of triangles) {
    for (let e = 3 * t; e < 3 * t + 3; e += 1) {
      const condition = conditions[mesh.label[e]!];
      if (condition === undefined) continue;
      const [a, b] = [placeOf(mesh.corner[e]!), placeOf(mesh.corner[nextOf(e)]!)];
      lengths.set(condition, (lengths.get(condition) ?? 0) + Math.hypot(b[0] - a[0], b[1] - a[1]));
    }
  }
  return lengths;
}

function looseEndsOf({
  frame,
  segments,
  conditions,
}: SectionOutline): Array<{ at: Pair; condition: SectionCondition }> {
  const meeting = new Map<number, number>();
  for (const { from, to } of segments.segments)
    for (const point of [from, to]) meeting.set(point, (meeting.get(point) ?? 0) + 1);
  return segments.segments.flatMap(({ from, to, label }) => {
    const condition = conditions[label];
    if (condition === undefined) return [];
    return [from, to]
      .filter((point) => meeting.get(point) === 1)
      .map((point) => ({ at: toSection(frame, [segments.x[point]!, segments.y[point]!]), condition }));
  });
}

/** Middle of the largest of some triangles. */
function largestMiddle({ x, y, corner }: TriangleMesh, triangles: readonly number[]): Pair {
  let best: Pair = [0, 0];
  let most = Number.NEGATIVE_INFINITY;
  for (const t of triangles) {
    const [a, b, c] = [corner[3 * t]!, corner[3 * t + 1]!, corner[3 * t + 2]!];
    const area = (x[b]! - x[a]!) * (y[c]! - y[a]!) - (y[b]! - y[a]!) * (x[c]! - x[a]!);
    if (area <= most) continue;
    most = area;
    best = [(x[a]! + x[b]! + x[c]!) / 3, (y[a]! + y[b]! + y[c]!) / 3];
  }
  return best;
}

/** A section as a coarse triangulation of its noded outline, not yet refined. */
export type SectionOutline = {
  readonly frame: SectionFrame;
  readonly mesh: TriangleMesh;
  readonly segments: NodedSegments;
  /** Label of an edge → its condition; labels from `conditions.length` on are soil boundaries. */
  readonly conditions: readonly SectionCondition[];
  /** Permeability of each soil in the frame. */
  readonly tensors: readonly Tensor[];
};

const RANK = { head: 0, freeOutflow: 1, closed: 2 } as const;

/** Nodes the lines of a problem, triangulates them and tells inside from outside and soil from soil. */
export function outlineOf(problem: SectionProblem): SectionOutline | SectionFailure {
  const lines = linesOf(problem);
  if ('ok' in lines) return lines;
  return markRegions(problem, lines) ?? lines;
}

function linesOf(problem: SectionProblem): SectionOutline | SectionFailure {
  const wrong = wrongFigure(problem);
  if (wrong !== null) return wrong;
  const tensors = problem.soils.map(permeabilityTensor);
  const frame = sectionFrame(
    problem.boundary.flatMap((chain) => chain.points),
    tensors[0]!,
  );
  const { chains, conditions } = labelledChains(problem, frame);
  const segments = nodeSegments(chains, MERGE * extentOf(chains));
  const mesh = segments === null ? null : constrainedDelaunay(segments);
  if (segments === null || mesh === null)
    return failure('tangled', 'The lines are too tangled to be parted at their crossings. Trace them anew.');
  return {
    frame,
    mesh,
    segments,
    conditions,
    tensors: tensors.map((tensor) => transformedTensor(frame.transform, tensor)),
  };
}

function wrongFigure({ boundary, inner, soils }: SectionProblem): SectionFailure | null {
  const chains = [...boundary, ...inner];
  if (!boundary.some((chain) => chain.points.length > 1) || soils.length === 0)
    return failure(
      'nothing-drawn',
      'No outline is drawn, or no soil is given. Trace the outline of the section.',
    );
  const unheld = chains.find(({ condition: c }) => c.kind === 'head' && !Number.isFinite(c.head));
  if (unheld !== undefined || chains.some(({ points }) => !points.flat().every(Number.isFinite)))
    return failure(
      'bad-figure',
      'A place or a head is not a number. Enter it anew.',
      unheld?.points[0] ?? null,
    );
  const isPositive = (k: number) => Number.isFinite(k) && k > 0;
  if (!soils.every((soil) => isPositive(soil.kh) && isPositive(soil.kv) && Number.isFinite(soil.dipDeg)))
    return failure('bad-figure', 'A permeability is missing or not above zero. Enter it for every soil.');
  return null;
}

function labelledChains(
  { boundary, inner, soilBoundaries }: SectionProblem,
  frame: SectionFrame,
): { chains: LabelledChain[]; conditions: SectionCondition[] } {
  // Where lines run along one another the smallest label holds: a held head before a closed line.
  const ranked = [
    ...boundary.map((chain) => ({ chain, bounds: true })),
    ...inner.map((chain) => ({ chain, bounds: false })),
  ].sort((a, b) => RANK[a.chain.condition.kind] - RANK[b.chain.condition.kind]);
  const pointsOf = (points: SectionChain['points']) => points.map((point) => toFrame(frame, point));
  return {
    chains: [
      ...ranked.map(({ chain, bounds }, label) => ({
        points: pointsOf(chain.points),
        label,
        bounds,
        parts: false,
      })),
      ...soilBoundaries.map((points) => ({
        points: pointsOf(points),
        label: ranked.length,
        bounds: false,
        parts: true,
      })),
    ],
    conditions: ranked.map(({ chain }) => chain.condition),
  };
}

function extentOf(chains: readonly LabelledChain[]): number {
  const points = chains.flatMap((chain) => chain.points);
  const span = (k: 0 | 1) => {
    let [low, high] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
    for (const point of points) {
      low = Math.min(low, point[k]);
      high = Math.max(high, point[k]);
    }
    return high - low;
  };
  return Math.hypot(span(0), span(1));
}

/** Writes OUTSIDE or the soil into the regions of the triangles; a failure when there is no inside. */
function markRegions(
  problem: SectionProblem,
  { frame, mesh, segments }: SectionOutline,
): SectionFailure | null {
  const { outlines, parting } = roles(mesh, segments);
  const inside = insideTriangles(problem, frame, mesh, outlines);
  if (!inside.includes(1))
    return failure(
      'outline-open',
      'The outline of the section is not closed. Draw what is missing of it, impervious where no water passes.',
    );
  inside.forEach((is, t) => {
    mesh.region[t] = is ? 1 : OUTSIDE;
  });
  problem.soils.forEach((soil, number) => {
    for (const place of soil.places) {
      for (const t of flood(mesh, triangleAt(mesh, toFrame(frame, place)), (e) => !parting.has(e)))
        if (inside[t]) mesh.region[t] = number + 1;
    }
  });
  return null;
}

/** How many outlines run along each half-edge, and the half-edges that part soils. */
function roles(
  mesh: TriangleMesh,
  { segments }: NodedSegments,
): { outlines: Map<number, number>; parting: Set<number> } {
  const outlines = new Map<number, number>();
  const parting = new Set<number>();
  for (const { from, to, outlines: times, parts } of segments) {
    const e = mesh.find(from + BOX_VERTICES, to + BOX_VERTICES);
    for (const side of [e, mesh.twin[e]!]) {
      if (times > 0) outlines.set(side, times);
      if (times > 0 || parts > 0) parting.add(side);
    }
  }
  return { outlines, parting };
}

function triangleAt(mesh: TriangleMesh, [x, y]: Pair): number[] {
  const place = mesh.locate(x, y);
  return place === null || 'stopped' in place ? [] : [place.triangle];
}

/** 1 for each triangle inside, else 0. */
function insideTriangles(
  problem: SectionProblem,
  frame: SectionFrame,
  mesh: TriangleMesh,
  outlines: ReadonlyMap<number, number>,
): number[] {
  const inside = new Array<number>(mesh.triangleCount).fill(0);
  const outside = new Set(
    flood(
      mesh,
      mesh.around(0).map((e) => Math.floor(e / 3)),
      (e) => !outlines.has(e),
    ),
  );
  if (problem.inside !== undefined) {
    for (const place of problem.inside) {
      for (const t of flood(mesh, triangleAt(mesh, toFrame(frame, place)), (e) => !outlines.has(e)))
        if (!outside.has(t)) inside[t] = 1;
    }
    return inside;
  }
  const depth = new Array<number>(mesh.triangleCount).fill(-1);
  let wave = [...outside];
  for (const t of wave) depth[t] = 0;
  while (wave.length > 0) {
    const next: number[] = [];
    for (const t of wave) {
      for (let e = 3 * t; e < 3 * t + 3; e += 1) {
        const other = mesh.twin[e]! < 0 ? -1 : Math.floor(mesh.twin[e]! / 3);
        if (other < 0 || depth[other]! >= 0) continue;
        const parity = (depth[t]! + (outlines.get(e) ?? 0)) % 2;
        for (const each of flood(mesh, [other], (side) => !outlines.has(side))) {
          depth[each] = parity;
          next.push(each);
        }
      }
    }
    wave = next;
  }
  return depth.map((each) => (each === 1 ? 1 : 0));
}

/** Triangles reached from some without crossing a half-edge that may not be passed. */
function flood(mesh: TriangleMesh, from: readonly number[], passes: (e: number) => boolean): number[] {
  const seen = new Set(from);
  const open = [...from];
  while (open.length > 0) {
    const t = open.pop()!;
    for (let e = 3 * t; e < 3 * t + 3; e += 1) {
      const other = mesh.twin[e]!;
      if (other < 0 || (mesh.label[e] !== FREE && !passes(e))) continue;
      const next = Math.floor(other / 3);
      if (seen.has(next)) continue;
      seen.add(next);
      open.push(next);
    }
  }
  return [...seen];
}
