import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { orientation } from '#shared/compute/geometry/predicates.ts';
import { nodeSegments } from '#shared/compute/mesh/node-segments.ts';

/** A bounded region of the plane, told by its outline. `edges`: flat x0 y0 x1 y1 of each edge; `area` in squared units. */
type Face = { readonly area: number; readonly bands: Bands };

/** Edges sorted into level bands, so that a place is held against the few that pass its height. */
type Bands = {
  readonly minX: number;
  readonly maxX: number;
  readonly minY: number;
  readonly maxY: number;
  readonly edges: readonly (readonly number[])[];
};

/** The regions into which lines part the plane. */
export type Faces = {
  readonly count: number;
  /** Number of the region that holds a place; −1 outside all. */
  at(x: number, y: number): number;
};

const BANDS = 128;

/**
 * Parts the plane along polylines: their segments are noded, the outline of each region is walked, and a place lies in
 * the region of the smallest outline about it, so that a lens inside a layer is a region of its own. `merge`: places
 * nearer than this are one. One frame. Null for input that cannot be noded.
 */
export function facesOf(chains: ReadonlyArray<readonly Pair[]>, merge: number): Faces | null {
  const noded = nodeSegments(
    chains.map((points) => ({ points, label: 0, bounds: false, parts: true })),
    merge,
  );
  if (noded === null) return null;
  const { x, y, segments } = noded;
  const around: number[][] = x.map(() => []);
  for (const { from, to } of segments) {
    around[from]!.push(to);
    around[to]!.push(from);
  }
  around.forEach((ends, at) => {
    const angle = (end: number) => Math.atan2(y[end]! - y[at]!, x[end]! - x[at]!);
    ends.sort((a, b) => angle(a) - angle(b));
  });
  const faces = outlinesOf(around)
    .map((outline) => faceOf(outline.map((n): Pair => [x[n]!, y[n]!])))
    .filter((face) => face !== null)
    .sort((a, b) => a.area - b.area);
  return {
    count: faces.length,
    at: (px, py) => faces.findIndex(({ bands }) => holds(bands, px, py)),
  };
}

/** Every walk that keeps turning to the next edge about each point, as lists of points. */
function outlinesOf(around: readonly (readonly number[])[]): number[][] {
  const walked = new Set<string>();
  const outlines: number[][] = [];
  around.forEach((ends, start) => {
    for (const first of ends) {
      if (walked.has(`${start},${first}`)) continue;
      const outline: number[] = [];
      let [from, to] = [start, first];
      while (!walked.has(`${from},${to}`)) {
        walked.add(`${from},${to}`);
        outline.push(from);
        const next = around[to]!;
        const turn = next[(next.indexOf(from) + next.length - 1) % next.length]!;
        [from, to] = [to, turn];
      }
      outlines.push(outline);
    }
  });
  return outlines;
}

/** A region of an outline walked with the region at one hand; null for the outside, which is walked the other way round. */
function faceOf(outline: readonly Pair[]): Face | null {
  const [x0, y0] = outline[0]!;
  let twice = 0;
  outline.forEach(([x, y], i) => {
    const [nx, ny] = outline[(i + 1) % outline.length]!;
    twice += (x - x0) * (ny - y0) - (nx - x0) * (y - y0);
  });
  return twice > 0 ? { area: twice / 2, bands: bandsOf(outline) } : null;
}

function bandsOf(outline: readonly Pair[]): Bands {
  const xs = outline.map((point) => point[0]);
  const ys = outline.map((point) => point[1]);
  const range = (values: readonly number[]) =>
    values.reduce(([low, high], v) => [Math.min(low, v), Math.max(high, v)] as [number, number], [
      Number.POSITIVE_INFINITY,
      Number.NEGATIVE_INFINITY,
    ] as [number, number]);
  const [minX, maxX] = range(xs);
  const [minY, maxY] = range(ys);
  const edges: number[][] = Array.from({ length: BANDS }, () => []);
  const bounds = { minX, maxX, minY, maxY, edges };
  outline.forEach(([ax, ay], i) => {
    const [bx, by] = outline[(i + 1) % outline.length]!;
    const last = bandAt(bounds, Math.max(ay, by));
    for (let band = bandAt(bounds, Math.min(ay, by)); band <= last; band += 1)
      edges[band]!.push(ax, ay, bx, by);
  });
  return bounds;
}

function bandAt({ minY, maxY }: Bands, y: number): number {
  return Math.min(BANDS - 1, Math.max(0, Math.floor(((y - minY) / (maxY - minY)) * BANDS)));
}

/** Even-odd rule with exact side tests; an edge that is walked there and back counts twice, and so not at all. */
function holds(bands: Bands, x: number, y: number): boolean {
  if (!(x >= bands.minX && x <= bands.maxX && y >= bands.minY && y <= bands.maxY)) return false;
  const edges = bands.edges[bandAt(bands, y)]!;
  let inside = false;
  for (let i = 0; i < edges.length; i += 4) {
    const [ax, ay, bx, by] = [edges[i]!, edges[i + 1]!, edges[i + 2]!, edges[i + 3]!];
    if (ay > y === by > y) continue;
    if (orientation(ax, ay, bx, by, x, y) > 0 === by > ay) inside = !inside;
  }
  return inside;
}
