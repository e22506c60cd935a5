import type { NodedSegments } from '#shared/compute/mesh/node-segments.ts';
import { FREE, nextOf, previousOf, TriangleMesh } from '#shared/compute/mesh/triangle-mesh.ts';

/** Vertices 0 to 3 are the corners of a box round everything; point i of the input is vertex i + BOX_VERTICES. */
export const BOX_VERTICES = 4;

/**
 * Constrained Delaunay triangulation of noded segments in a box twice as wide and high, each edge labelled with its
 * segment's label. Null when a segment cannot be had, which means that the segments were not noded. Points are put in
 * one by one (Lawson 1977), segments by swapping diagonals (Sloan 1993).
 */
export function constrainedDelaunay({ x, y, segments }: NodedSegments): TriangleMesh | null {
  const mesh = boxedMesh(x, y);
  for (let i = 0; i < x.length; i += 1) {
    const place = mesh.locate(x[i]!, y[i]!);
    if (place === null || 'stopped' in place || place.vertex !== null) return null;
    mesh.insertAt(mesh.addVertex(x[i]!, y[i]!), place);
  }
  for (const { from, to, label } of segments) {
    const e = edgeBetween(mesh, from + BOX_VERTICES, to + BOX_VERTICES);
    if (e < 0) return null;
    mesh.setLabel(e, label);
  }
  return mesh;
}

function boxedMesh(x: readonly number[], y: readonly number[]): TriangleMesh {
  let [minX, minY, maxX, maxY] = [
    Number.POSITIVE_INFINITY,
    Number.POSITIVE_INFINITY,
    Number.NEGATIVE_INFINITY,
    Number.NEGATIVE_INFINITY,
  ];
  for (let i = 0; i < x.length; i += 1) {
    minX = Math.min(minX, x[i]!);
    maxX = Math.max(maxX, x[i]!);
    minY = Math.min(minY, y[i]!);
    maxY = Math.max(maxY, y[i]!);
  }
  const margin = 0.5 * Math.max(maxX - minX, maxY - minY, Number.MIN_VALUE);
  const mesh = new TriangleMesh();
  mesh.addVertex(minX - margin, minY - margin);
  mesh.addVertex(maxX + margin, minY - margin);
  mesh.addVertex(maxX + margin, maxY + margin);
  mesh.addVertex(minX - margin, maxY + margin);
  mesh.addTriangle(0, 1, 2);
  mesh.addTriangle(0, 2, 3);
  mesh.join(2, 3);
  return mesh;
}

/** A half-edge between two vertices, made by swapping what lies in between; −1 when that cannot be. */
function edgeBetween(mesh: TriangleMesh, from: number, to: number): number {
  const there = mesh.find(from, to);
  if (there >= 0) return there;
  const crossed = edgesCrossed(mesh, from, to);
  if (crossed === null) return -1;
  const made: Array<readonly [number, number]> = [];
  // Every pass swaps at least one diagonal of a convex pair; more turns than this mean broken input.
  for (let turns = 20 + 4 * crossed.length * crossed.length; crossed.length > 0; turns -= 1) {
    const [a, b] = crossed.shift()!;
    const e = mesh.find(a, b);
    if (e < 0 || turns < 0) return -1;
    if (!mesh.isConvex(e)) {
      crossed.push([a, b]);
      continue;
    }
    const ends = [mesh.corner[previousOf(e)]!, mesh.corner[previousOf(mesh.twin[e]!)]!] as const;
    mesh.swap(e);
    (crosses(mesh, from, to, ...ends) ? crossed : made).push(ends);
  }
  const result = mesh.find(from, to);
  if (result >= 0) {
    mesh.setLabel(result, 0);
    mesh.restore(made.map(([a, b]) => mesh.find(a, b)).filter((e) => e >= 0));
  }
  return mesh.find(from, to);
}

function crosses(mesh: TriangleMesh, from: number, to: number, a: number, b: number): boolean {
  if (a === from || a === to || b === from || b === to) return false;
  return (
    mesh.side(from, to, a) * mesh.side(from, to, b) < 0 && mesh.side(a, b, from) * mesh.side(a, b, to) < 0
  );
}

/** Edges across the straight way between two vertices, as pairs; null when it meets a vertex or a labelled edge. */
function edgesCrossed(mesh: TriangleMesh, from: number, to: number): Array<readonly [number, number]> | null {
  const first = mesh
    .around(from)
    .map(nextOf)
    .find((e) => crosses(mesh, from, to, mesh.corner[e]!, mesh.corner[nextOf(e)]!));
  if (first === undefined) return null;
  const crossed: Array<readonly [number, number]> = [];
  for (let e = first; ; ) {
    const other = mesh.twin[e]!;
    if (mesh.label[e] !== FREE || other < 0 || crossed.length > mesh.corner.length) return null;
    crossed.push([mesh.corner[e]!, mesh.corner[nextOf(e)]!]);
    if (mesh.corner[previousOf(other)] === to) return crossed;
    const ahead = [nextOf(other), previousOf(other)].find((each) =>
      crosses(mesh, from, to, mesh.corner[each]!, mesh.corner[nextOf(each)]!),
    );
    if (ahead === undefined) return null;
    e = ahead;
  }
}
