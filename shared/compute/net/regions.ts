import type { HeadLine, NeighbourLink, Side } from '#shared/compute/net/neighbours.ts';

/** One side of an equipotential. */
export type LineSide = { readonly id: string; readonly side: Side };

/**
 * A stretch of ground with head lines round it and none across it: the equipotentials that bound it, each with the side
 * that faces it, and the potential boundaries that are seen from it.
 */
export type FlowRegion = {
  readonly sides: readonly LineSide[];
  readonly boundaries: readonly string[];
};

/**
 * Parts the section into the regions between its head lines: what faces one another belongs to one region. A potential
 * boundary may bound several regions, as a bed does on which an equipotential ends. Boundaries that face one another
 * without any line between make a region of their own. In the order of `heads`.
 */
export function regionsOf(heads: readonly HeadLine[], links: readonly NeighbourLink[]): FlowRegion[] {
  const isLine = new Set(heads.filter((line) => line.role === 'equipotential').map((line) => line.id));
  const owner = new Map<string, string>();
  const rootOf = (key: string): string => {
    const above = owner.get(key) ?? key;
    return above === key ? key : rootOf(above);
  };
  const boundaries = new Map<string, Set<string>>();
  const bare: FlowRegion[] = [];
  for (const link of links) {
    const [keyA, keyB] = [sideKey(link.a, link.sideA), sideKey(link.b, link.sideB)];
    if (isLine.has(link.a)) owner.set(keyA, rootOf(keyA));
    if (isLine.has(link.b)) owner.set(keyB, rootOf(keyB));
    if (isLine.has(link.a) && isLine.has(link.b)) owner.set(rootOf(keyA), rootOf(keyB));
    else if (isLine.has(link.a)) noteSeen(boundaries, keyA, link.b);
    else if (isLine.has(link.b)) noteSeen(boundaries, keyB, link.a);
    else bare.push({ sides: [], boundaries: [link.a, link.b] });
  }
  const regions = new Map<string, { sides: LineSide[]; boundaries: Set<string> }>();
  for (const { id } of heads) {
    for (const side of [0, 1] as const) {
      const key = sideKey(id, side);
      if (!owner.has(key)) continue;
      const region = regions.get(rootOf(key)) ?? { sides: [], boundaries: new Set() };
      region.sides.push({ id, side });
      for (const boundary of boundaries.get(key) ?? []) region.boundaries.add(boundary);
      regions.set(rootOf(key), region);
    }
  }
  const rank = new Map(heads.map(({ id }, i) => [id, i]));
  const inOrder = (seen: ReadonlySet<string>) => [...seen].sort((a, b) => rank.get(a)! - rank.get(b)!);
  return [
    ...[...regions.values()].map(({ sides, boundaries: seen }) => ({ sides, boundaries: inOrder(seen) })),
    ...bare,
  ];
}

function sideKey(id: string, side: Side): string {
  return `${side} ${id}`;
}

function noteSeen(boundaries: Map<string, Set<string>>, key: string, boundary: string): void {
  boundaries.set(key, (boundaries.get(key) ?? new Set()).add(boundary));
}
