import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { MIDDLES, shapeValues } from '#shared/compute/independent/quadratic-element.ts';
import type { QuadraticMesh } from '#shared/compute/independent/quadratic-mesh.ts';

/** The four triangles between corners and middles of an element, by places in its list of nodes. */
const QUARTERS = [
  [0, 3, 5],
  [3, 1, 4],
  [5, 4, 2],
  [3, 4, 5],
] as const;

/**
 * Lines along which a field has a value, in the mesh's frame: straight within the quarters of the elements, between
 * places at which the quadratic field has the value. Lines end at the edge of the mesh or close on themselves (first point repeated). A place with just the
 * value counts as above it.
 */
export function contourLines(mesh: QuadraticMesh, values: Float64Array, level: number): Pair[][] {
  const links = new Map<string, string[]>();
  const places = new Map<string, Pair>();
  const link = (from: string, to: string) => {
    const known = links.get(from);
    if (known === undefined) links.set(from, [to]);
    else known.push(to);
  };
  for (let n = 0; 6 * n < mesh.elements.length; n += 1) {
    for (const quarter of QUARTERS) {
      const crossed = [0, 1, 2].flatMap((k) =>
        crossing(mesh, n, values, level, [quarter[k]!, quarter[(k + 1) % 3]!]),
      );
      const [first, second] = crossed;
      if (first === undefined || second === undefined) continue;
      places.set(first.key, first.at);
      places.set(second.key, second.at);
      link(first.key, second.key);
      link(second.key, first.key);
    }
  }
  return chained(links).map((keys) => keys.map((key) => places.get(key)!));
}

/** Area coordinates of the six nodes of an element. */
const NODE_PLACES: ReadonlyArray<readonly [number, number, number]> = [
  [1, 0, 0],
  [0, 1, 0],
  [0, 0, 1],
  ...MIDDLES,
];

/** Where the field has the level between two nodes of an element, given by their places in its list; empty if nowhere. */
function crossing(
  mesh: QuadraticMesh,
  n: number,
  values: Float64Array,
  level: number,
  ends: readonly [number, number],
): Array<{ key: string; at: Pair }> {
  const nodeOf = (k: number) => mesh.elements[6 * n + k]!;
  // Taken in one direction whichever element asks, so that both get the same place.
  const [i, j] = nodeOf(ends[0]) < nodeOf(ends[1]) ? ends : ([ends[1], ends[0]] as const);
  const [a, b] = [nodeOf(i), nodeOf(j)];
  if (values[a]! >= level === values[b]! >= level) return [];
  const t = partOfWay((part) => {
    const at = NODE_PLACES[i]!.map((from, k) => from + part * (NODE_PLACES[j]![k]! - from));
    const weights = shapeValues([at[0]!, at[1]!, at[2]!]);
    return weights.reduce((sum, weight, k) => sum + weight * values[nodeOf(k)]!, -level);
  });
  const { x, y } = mesh;
  return [{ key: `${a},${b}`, at: [x[a]! + t * (x[b]! - x[a]!), y[a]! + t * (y[b]! - y[a]!)] }];
}

/** A zero of a quadratic between 0 and 1, of different signs there: by its three values, the stabler form of the root. */
function partOfWay(f: (part: number) => number): number {
  const [start, middle, end] = [f(0), f(0.5), f(1)];
  const c = 2 * (start + end - 2 * middle);
  const slope = end - start - c;
  const root = Math.sqrt(Math.max(0, slope * slope - 4 * c * start));
  const q = -0.5 * (slope + (slope >= 0 ? root : -root));
  const candidates = [q / c, start / q].filter((t) => t >= 0 && t <= 1);
  return candidates[0] ?? start / (start - end);
}

/** Chains of linked keys: open ones from their ends first, then closed ones. */
function chained(links: Map<string, string[]>): string[][] {
  const seen = new Set<string>();
  const walk = (start: string): string[] => {
    const chain = [start];
    seen.add(start);
    for (let at = start; ; ) {
      const next = links.get(at)!.find((key) => !seen.has(key));
      if (next === undefined) break;
      seen.add(next);
      chain.push(next);
      at = next;
    }
    if (chain.length > 2 && links.get(chain.at(-1)!)!.includes(start) && links.get(start)!.length === 2)
      chain.push(start);
    return chain;
  };
  const starts = [...links.keys()].sort((a, b) => links.get(a)!.length - links.get(b)!.length);
  return starts.filter((key) => !seen.has(key)).flatMap((key) => (seen.has(key) ? [] : [walk(key)]));
}
