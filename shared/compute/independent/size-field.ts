import type { SectionOutline } from '#shared/compute/independent/section-outline.ts';
import { OUTSIDE } from '#shared/compute/independent/section-outline.ts';
import { BOX_VERTICES } from '#shared/compute/mesh/constrained-delaunay.ts';
import { FREE, nextOf, previousOf, type TriangleMesh } from '#shared/compute/mesh/triangle-mesh.ts';

/**
 * A place to refine towards, in the frame: the head goes with r^λ there, `exponent` λ; `reach`: distance to what else is
 * drawn. `singular`: the gradient has no bound.
 */
export type FineCorner = {
  readonly x: number;
  readonly y: number;
  readonly exponent: number;
  readonly reach: number;
  readonly singular: boolean;
  /** Part of the reach at which the mesh begins; by the exponent if left out. */
  readonly finest?: number;
};

/** Exponents at or above this bound the gradient, or nearly so. */
const SMOOTH = 0.9;
/** Part of its reach at which the mesh begins at a smooth end of a held piece, where exit gradients are wanted. */
const FINE_END = 0.04;
/** Part of the energy about a corner that may be missed within its smallest elements. */
const MISSED = 2e-4;
/** Growth of the wanted size with distance from a corner. */
const GROWTH = 0.4;

/**
 * Corners of a section to refine towards. At some the gradient of the head has no bound: in a sector of angle ω the head goes with r^λ,
 * λ = π/ω where both sides are alike (both closed or both held) and π/(2ω) where one is closed and one held. Wall tips
 * (ω = 2π), re-entrant corners and edges of floors are such. The others are the ends of held pieces. Angles in the frame, where the reference soil is alike in
 * all directions. Source: Strang and Fix (1973), An Analysis of the Finite Element Method, ch. 8.
 */
export function fineCorners(outline: SectionOutline): FineCorner[] {
  const { mesh } = outline;
  const corners: FineCorner[] = [];
  for (let v = BOX_VERTICES; v < mesh.x.length; v += 1) {
    const sectors = sectorsAt(outline, v);
    const exponent = Math.min(...sectors.map((sector) => sector.exponent));
    const singular = exponent < SMOOTH;
    if (!singular && !sectors.some((sector) => sector.mixed)) continue;
    corners.push({ x: mesh.x[v]!, y: mesh.y[v]!, exponent, reach: clearanceOf(outline, v), singular });
  }
  return corners;
}

/** Whether an edge bounds the flow: 'held', 'closed', or null where water passes. */
function sideKind({ conditions }: SectionOutline, label: number): 'held' | 'closed' | null {
  const condition = label === FREE ? undefined : conditions[label];
  if (condition === undefined) return null;
  return condition.kind === 'closed' ? 'closed' : 'held';
}

/** For each sector of the section at a vertex its exponent, and whether one of its sides is held and one closed. */
function sectorsAt(outline: SectionOutline, v: number): Array<{ exponent: number; mixed: boolean }> {
  const { mesh } = outline;
  return mesh.around(v).flatMap((first) => {
    const kind = sideKind(outline, mesh.label[first]!);
    if (kind === null || mesh.region[Math.floor(first / 3)] === OUTSIDE) return [];
    const { angle, end } = sectorFrom(outline, first);
    if (end === null) return [];
    const mixed = end !== kind;
    return [{ exponent: Math.PI / angle / (mixed ? 2 : 1), mixed }];
  });
}

/** The angle from half-edge `first` round its start, through the inside, to the next edge that bounds the flow. */
function sectorFrom(
  outline: SectionOutline,
  first: number,
): { angle: number; end: 'held' | 'closed' | null } {
  const { mesh } = outline;
  let angle = 0;
  for (let e = first, turns = 0; turns < mesh.triangleCount; turns += 1) {
    angle += angleAt(mesh, e);
    const last = previousOf(e);
    const end = sideKind(outline, mesh.label[last]!);
    if (end !== null) return { angle, end };
    if (mesh.twin[last]! < 0) break;
    e = mesh.twin[last]!;
  }
  return { angle, end: null };
}

function angleAt({ x, y, corner }: TriangleMesh, e: number): number {
  const [a, b, c] = [corner[e]!, corner[nextOf(e)]!, corner[previousOf(e)]!];
  const [ux, uy] = [x[b]! - x[a]!, y[b]! - y[a]!];
  const [wx, wy] = [x[c]! - x[a]!, y[c]! - y[a]!];
  return Math.atan2(ux * wy - uy * wx, ux * wx + uy * wy);
}

/** Distance from a vertex to the nearest segment that does not end at it. */
function clearanceOf({ mesh, segments }: SectionOutline, v: number): number {
  const [px, py] = [mesh.x[v]!, mesh.y[v]!];
  let nearest = Number.POSITIVE_INFINITY;
  for (const { from, to } of segments.segments) {
    if (from + BOX_VERTICES === v || to + BOX_VERTICES === v) {
      nearest = Math.min(
        nearest,
        Math.hypot(segments.x[to]! - segments.x[from]!, segments.y[to]! - segments.y[from]!),
      );
      continue;
    }
    const [ax, ay] = [segments.x[from]!, segments.y[from]!];
    const [dx, dy] = [segments.x[to]! - ax, segments.y[to]! - ay];
    const t = Math.min(1, Math.max(0, ((px - ax) * dx + (py - ay) * dy) / (dx * dx + dy * dy)));
    nearest = Math.min(nearest, Math.hypot(ax + t * dx - px, ay + t * dy - py));
  }
  return nearest;
}

/**
 * Wanted length of edges at a place of the frame: `coarsest` far from the corners, near each of them growing with the
 * distance from a smallest size at which the energy missed about it, (size/reach)^(2λ), is negligible.
 */
export function sizeField(
  corners: readonly FineCorner[],
  coarsest: number,
): (x: number, y: number) => number {
  const sources = corners.map(({ x, y, exponent, reach, singular, finest }) => ({
    x,
    y,
    finest: Math.min(coarsest, reach * (finest ?? (singular ? MISSED ** (1 / (2 * exponent)) : FINE_END))),
  }));
  return (x, y) => {
    let size = coarsest;
    for (const source of sources) {
      const dx = x - source.x;
      const dy = y - source.y;
      const near = source.finest + GROWTH * Math.sqrt(dx * dx + dy * dy);
      if (near < size) size = near;
    }
    return size;
  };
}

/** Length of the edges of `elements` equal triangles over the area of a section. */
export function coarsestSize({ mesh }: SectionOutline, elements: number): number {
  let area = 0;
  for (let t = 0; t < mesh.triangleCount; t += 1) {
    if (mesh.region[t] === OUTSIDE) continue;
    const [a, b, c] = [mesh.corner[3 * t]!, mesh.corner[3 * t + 1]!, mesh.corner[3 * t + 2]!];
    const { x, y } = mesh;
    area += ((x[b]! - x[a]!) * (y[c]! - y[a]!) - (y[b]! - y[a]!) * (x[c]! - x[a]!)) / 2;
  }
  return Math.sqrt((4 * area) / (Math.sqrt(3) * elements));
}
