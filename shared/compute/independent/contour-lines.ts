import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { QuadraticMesh } from '#shared/compute/independent/quadratic-mesh.ts';

/** The four triangles between corners and middles of an element, by places in its list of nodes. */
const QUARTERS = [
  [0, 3, 5],
  [3, 1, 4],
  [5, 4, 2],
  [3, 4, 5],
] as const;

/**
 * Lines along which a field has a value, in the mesh's frame: the field is taken as linear within the quarters of the
 * elements. Lines end at the edge of the mesh or close on themselves (first point repeated). A place with just the
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
      const nodes = quarter.map((k) => mesh.elements[6 * n + k]!);
      const crossed = [0, 1, 2].flatMap((k) => crossing(mesh, values, level, nodes[k]!, nodes[(k + 1) % 3]!));
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

function crossing(
  { x, y }: QuadraticMesh,
  values: Float64Array,
  level: number,
  a: number,
  b: number,
): Array<{ key: string; at: Pair }> {
  // Taken in one direction whichever element asks, so that both get the same place.
  const [i, j] = a < b ? [a, b] : [b, a];
  const [u, v] = [values[i]! - level, values[j]! - level];
  if (u >= 0 === v >= 0) return [];
  const t = u / (u - v);
  return [{ key: `${i},${j}`, at: [x[i]! + t * (x[j]! - x[i]!), y[i]! + t * (y[j]! - y[i]!)] }];
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
