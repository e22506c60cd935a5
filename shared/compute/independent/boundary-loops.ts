import type { BoundarySide, QuadraticMesh } from '#shared/compute/independent/quadratic-mesh.ts';

/** Sides of a mesh that follow one another round its edge, the section to their left. */
export type BoundaryLoop = readonly BoundarySide[];

/** Part of the greatest loop's area below which a loop encloses none: walls of no thickness. */
const NO_AREA = 1e-9;

/** All loops of sides: those round a part of the mesh, and those round what is left out within (walls among them). */
export function boundaryLoops(mesh: QuadraticMesh): { outer: BoundaryLoop[]; inner: BoundaryLoop[] } {
  const byStart = new Map(mesh.sides.map((side) => [side.nodes[0], side]));
  const loops: Array<{ loop: BoundaryLoop; area: number }> = [];
  while (byStart.size > 0) {
    const loop: BoundarySide[] = [];
    let next = byStart.values().next().value;
    while (next !== undefined) {
      loop.push(next);
      byStart.delete(next.nodes[0]);
      next = byStart.get(next.nodes[2]);
    }
    loops.push({ loop, area: areaOf(mesh, loop) });
  }
  const least = NO_AREA * loops.reduce((most, { area }) => Math.max(most, area), 0);
  const ofKind = (isOuter: boolean) =>
    loops.filter(({ area }) => area > least === isOuter).map(({ loop }) => loop);
  return { outer: ofKind(true), inner: ofKind(false) };
}

function areaOf({ x, y }: QuadraticMesh, loop: BoundaryLoop): number {
  const [x0, y0] = [x[loop[0]!.nodes[0]]!, y[loop[0]!.nodes[0]]!];
  let twice = 0;
  for (const { nodes } of loop) {
    const [a, b] = [nodes[0], nodes[2]];
    twice += (x[a]! - x0) * (y[b]! - y0) - (x[b]! - x0) * (y[a]! - y0);
  }
  return twice / 2;
}
