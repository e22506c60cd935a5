import type { BoundarySide, QuadraticMesh } from '#shared/compute/independent/quadratic-mesh.ts';

/** Sides of a mesh that follow one another round its edge, the section to their left. */
export type BoundaryLoop = readonly BoundarySide[];

/** All loops of sides, the one round the outside (of the greatest area) first. */
export function boundaryLoops(mesh: QuadraticMesh): BoundaryLoop[] {
  const byStart = new Map(mesh.sides.map((side) => [side.nodes[0], side]));
  const loops: BoundarySide[][] = [];
  while (byStart.size > 0) {
    const loop: BoundarySide[] = [];
    let next = byStart.values().next().value;
    while (next !== undefined) {
      loop.push(next);
      byStart.delete(next.nodes[0]);
      next = byStart.get(next.nodes[2]);
    }
    loops.push(loop);
  }
  const areas = new Map(loops.map((loop) => [loop, areaOf(mesh, loop)]));
  return loops.sort((a, b) => areas.get(b)! - areas.get(a)!);
}

function areaOf({ x, y }: QuadraticMesh, loop: BoundaryLoop): number {
  let twice = 0;
  for (const {
    nodes: [a, , b],
  } of loop)
    twice += x[a]! * y[b]! - x[b]! * y[a]!;
  return twice / 2;
}
