import { type FlowPath, flowPaths, type PassedBoundary } from '#shared/compute/net/flow-paths.ts';
import type { HeadLine, NeighbourLink } from '#shared/compute/net/neighbours.ts';
import { type FlowRegion, regionsOf } from '#shared/compute/net/regions.ts';
import { type Walk, walkRegions } from '#shared/compute/net/walk-regions.ts';

/** Two neighbouring head lines with the flow running from `before` to `after`. */
export type OrderedPair = {
  readonly before: string;
  readonly after: string;
  readonly sameDirection: boolean;
  /** Further equipotentials on the outline of the ground between the two, where the flow parts or joins. */
  readonly beside: readonly string[];
};

export type FlowOrder = {
  /** Place of each line that the flow reaches: 0 for the headwater boundaries, then 1, 2, … along the flow. */
  readonly place: ReadonlyMap<string, number>;
  /** One pair for each stretch of ground between head lines. */
  readonly pairs: readonly OrderedPair[];
  /** Ways of the water from a boundary that gives it to one that takes it; the first leads to the lowest outlet. */
  readonly paths: readonly FlowPath[];
  /** Boundaries that the flow passes beside. */
  readonly passed: readonly PassedBoundary[];
  /** Equipotentials in the order in which the flow meets them, those of the first path first. */
  readonly sequence: readonly string[];
  /** Equipotentials that the flow from the headwater does not reach. */
  readonly unordered: readonly string[];
  /** Equipotentials from which the flow goes no further. */
  readonly deadEnds: readonly string[];
  /** Equipotentials that part the same two stretches of ground, as the pieces of one line do. */
  readonly sideBySide: readonly string[];
  /** Outlets that the flow reaches. */
  readonly outlets: readonly string[];
};

/**
 * Orders head lines along the flow, from the headwater boundaries to the outlets. Each equipotential parts the ground in
 * two, so that the stretches of ground between the lines hang together as a tree, with the boundaries at its ends: the
 * order along the flow is the way through it, and it forks where the water parts. Neither the order of drawing nor the
 * direction of a line matters. Lines that cannot be reached are returned as `unordered`, never guessed. `levels`: head
 * of each potential boundary, any one unit. Own derivation.
 */
export function orderAlongFlow(
  heads: readonly HeadLine[],
  links: readonly NeighbourLink[],
  levels: ReadonlyMap<string, number>,
): FlowOrder {
  const regions = regionsOf(heads, links);
  const walk = walkRegions(regions, heads, levels);
  const { paths, passed } = flowPaths(walk, heads, levels);
  const reached = new Set(paths.flatMap(({ lines }) => lines));
  const sequence = [...reached];
  const equipotentials = heads.filter((line) => line.role === 'equipotential').map((line) => line.id);
  const ends = paths.flatMap(({ source, outlet }) => [source, outlet]);
  const met = new Set([...ends, ...passed.map(({ boundary }) => boundary)]);
  return {
    place: placesOf(walk, heads, met),
    pairs: pairsOf(walk, paths, links, heads),
    paths,
    passed,
    sequence,
    unordered: equipotentials.filter((id) => !walk.place.has(id)),
    deadEnds: equipotentials.filter((id) => walk.ends.has(id) && !reached.has(id) && !walk.loops.has(id)),
    sideBySide: equipotentials.filter((id) => walk.loops.has(id)),
    outlets: heads.filter((line) => line.role === 'outlet' && met.has(line.id)).map((line) => line.id),
  };
}

function placesOf(walk: Walk, heads: readonly HeadLine[], met: ReadonlySet<string>): Map<string, number> {
  const place = new Map(walk.place);
  for (const { id, role } of heads) {
    if (role === 'headwater') place.set(id, 0);
    else if (role === 'outlet' && met.has(id)) place.set(id, walk.depth + 1);
  }
  return place;
}

/** For each region the two head lines between which the flow crosses it, by the first path that does. */
function pairsOf(
  walk: Walk,
  paths: readonly FlowPath[],
  links: readonly NeighbourLink[],
  heads: readonly HeadLine[],
): OrderedPair[] {
  const varies = new Set(heads.filter((line) => line.varies).map((line) => line.id));
  const steps = paths.flatMap(({ source, lines, outlet }) => {
    const stops = [source, ...lines, outlet];
    return stops.slice(1).map((after, i) => ({ before: stops[i]!, after }));
  });
  return walk.regions.flatMap((region): OrderedPair[] => {
    const here = steps.filter((step) => bounds(region, step.before) && bounds(region, step.after));
    const step = here.find(({ after }) => !varies.has(after)) ?? here[0];
    if (step === undefined) return [];
    const beside = region.sides.map(({ id }) => id).filter((id) => id !== step.before && id !== step.after);
    return [{ ...step, sameDirection: drawnAlike(step.before, step.after, region, links), beside }];
  });
}

function bounds(region: FlowRegion, id: string): boolean {
  return region.sides.some((side) => side.id === id) || region.boundaries.includes(id);
}

/** True when two lines are drawn in the same direction across the flow: with the region on different hands. */
function drawnAlike(a: string, b: string, region: FlowRegion, links: readonly NeighbourLink[]): boolean {
  const link = links.find((each) => (each.a === a && each.b === b) || (each.a === b && each.b === a));
  if (link !== undefined) return link.sameDirection;
  const sideOf = (id: string) => region.sides.find((side) => side.id === id)?.side ?? null;
  return sideOf(a) !== sideOf(b);
}

/**
 * The order with the boundaries that the flow passes as the outlines of the strips tell it: what is seen along straight
 * lines misses a bed on which an equipotential ends. `held`: ids of boundaries that can be on an outline; `outlines`: the
 * strips with what is held along them.
 */
export function withPassed(
  order: FlowOrder,
  held: ReadonlySet<string>,
  outlines: ReadonlyArray<{
    readonly before: string;
    readonly after: string;
    readonly held: ReadonlyArray<{ readonly id: string }>;
  }>,
): FlowOrder {
  const lines = new Set(order.sequence);
  const onOutlines = outlines.flatMap((strip): PassedBoundary[] => {
    const pair = order.pairs.find(({ before, after }) => before === strip.before && after === strip.after);
    const round = [strip.before, strip.after, ...(pair?.beside ?? [])].filter((id) => lines.has(id));
    const after = lines.has(strip.before) ? strip.before : null;
    const ids = new Set(strip.held.map(({ id }) => id).filter((id) => held.has(id)));
    return [...ids].map((boundary) => ({ boundary, after, lines: round }));
  });
  const passed = [...order.passed.filter(({ boundary }) => !held.has(boundary)), ...onOutlines];
  const ends = new Set(order.paths.flatMap(({ source, outlet }) => [source, outlet]));
  const met = new Set([...ends, ...passed.map(({ boundary }) => boundary)]);
  const place = new Map([...order.place].filter(([id]) => !held.has(id) || met.has(id)));
  const last = Math.max(0, ...order.sequence.map((id) => order.place.get(id) ?? 0)) + 1;
  for (const id of met) if (!place.has(id)) place.set(id, last);
  const outlets = [...met].filter((id) => held.has(id) || order.outlets.includes(id));
  return { ...order, passed, place, outlets };
}
