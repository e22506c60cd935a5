import { FREE, nextOf, previousOf, type TriangleMesh } from '#shared/compute/mesh/triangle-mesh.ts';

/** A side of an element on the edge of the flow. `nodes`: start, middle, end, the section to the left of them. */
export type BoundarySide = {
  readonly element: number;
  readonly nodes: readonly [number, number, number];
  readonly label: number;
};

/**
 * Six-node triangles. `x`, `y`: places of the nodes. `elements`: six node numbers each, three corners counter-clockwise
 * and the middles of the sides 1–2, 2–3, 3–1. `triangles`: number of each element in the mesh it was made of. Nodes on
 * a labelled line inside the section are there twice, once for each side, so that the head may jump across it.
 */
export type QuadraticMesh = {
  readonly x: Float64Array;
  readonly y: Float64Array;
  readonly elements: Int32Array;
  readonly regions: Int32Array;
  readonly triangles: Int32Array;
  readonly sides: readonly BoundarySide[];
};

/**
 * Six-node triangles over the wanted regions of a mesh. `parts`: true for the labels whose lines part the flow; an edge
 * towards a region that is not wanted always does.
 */
export function quadraticMesh(
  mesh: TriangleMesh,
  wanted: (region: number) => boolean,
  parts: (label: number) => boolean,
): QuadraticMesh {
  const kept = mesh.region.flatMap((region, t) => (wanted(region) ? [t] : []));
  const isOpen = (e: number) => {
    const other = mesh.twin[e]!;
    return (
      other >= 0 &&
      wanted(mesh.region[Math.floor(other / 3)]!) &&
      (mesh.label[e] === FREE || !parts(mesh.label[e]!))
    );
  };
  const nodes = new NodeNumbers(mesh);
  const elements = new Int32Array(6 * kept.length);
  const corners = cornerNodes(mesh, kept, isOpen, nodes);
  const middles = middleNodes(mesh, kept, isOpen, nodes);
  const sides: BoundarySide[] = [];
  kept.forEach((t, n) => {
    for (let k = 0; k < 3; k += 1) {
      const e = 3 * t + k;
      elements[6 * n + k] = corners.get(e)!;
      elements[6 * n + 3 + k] = middles.get(e)!;
      if (isOpen(e)) continue;
      const ends = [corners.get(e)!, middles.get(e)!, corners.get(nextOf(e))!] as const;
      sides.push({ element: n, nodes: ends, label: mesh.label[e]! });
    }
  });
  return {
    x: Float64Array.from(nodes.x),
    y: Float64Array.from(nodes.y),
    elements,
    regions: Int32Array.from(kept, (t) => mesh.region[t]!),
    triangles: Int32Array.from(kept),
    sides,
  };
}

class NodeNumbers {
  readonly x: number[] = [];
  readonly y: number[] = [];

  constructor(private readonly mesh: TriangleMesh) {}

  atVertex(v: number): number {
    this.y.push(this.mesh.y[v]!);
    return this.x.push(this.mesh.x[v]!) - 1;
  }

  atMiddle(e: number): number {
    const [a, b] = [this.mesh.corner[e]!, this.mesh.corner[nextOf(e)]!];
    this.y.push((this.mesh.y[a]! + this.mesh.y[b]!) / 2);
    return this.x.push((this.mesh.x[a]! + this.mesh.x[b]!) / 2) - 1;
  }
}

/** Node of each corner, keyed by the half-edge that starts there: one for each fan of elements not parted by a line. */
function cornerNodes(
  mesh: TriangleMesh,
  kept: readonly number[],
  isOpen: (e: number) => boolean,
  nodes: NodeNumbers,
): Map<number, number> {
  const found = new Map<number, number>();
  for (const t of kept) {
    for (let start = 3 * t; start < 3 * t + 3; start += 1) {
      if (found.has(start)) continue;
      const node = nodes.atVertex(mesh.corner[start]!);
      let e = start;
      do {
        found.set(e, node);
        const out = previousOf(e);
        e = isOpen(out) ? mesh.twin[out]! : -1;
      } while (e >= 0 && e !== start);
      if (e === start) continue;
      // Stopped at a line: the rest of the fan lies the other way round.
      for (let back = start; isOpen(back); ) {
        back = nextOf(mesh.twin[back]!);
        found.set(back, node);
      }
    }
  }
  return found;
}

/** Node in the middle of each half-edge, shared with its other side unless a line parts them. */
function middleNodes(
  mesh: TriangleMesh,
  kept: readonly number[],
  isOpen: (e: number) => boolean,
  nodes: NodeNumbers,
): Map<number, number> {
  const found = new Map<number, number>();
  for (const t of kept) {
    for (let e = 3 * t; e < 3 * t + 3; e += 1) {
      if (found.has(e)) continue;
      const node = nodes.atMiddle(e);
      found.set(e, node);
      if (isOpen(e)) found.set(mesh.twin[e]!, node);
    }
  }
  return found;
}
