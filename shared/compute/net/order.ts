import type { HeadLine, NeighbourLink, Side } from '#shared/compute/net/neighbours.ts';

/** Two neighbouring head lines with the flow running from `before` to `after`. */
export type OrderedPair = {
  readonly before: string;
  readonly after: string;
  readonly sameDirection: boolean;
};

export type FlowOrder = {
  /** Place of each line that the flow reaches: 0 for the headwater boundaries, then 1, 2, … along the flow. */
  readonly place: Map<string, number>;
  readonly pairs: readonly OrderedPair[];
  /** Equipotentials in the order in which the flow meets them. */
  readonly sequence: readonly string[];
  /** Equipotentials that the flow from the headwater does not reach. */
  readonly unordered: readonly string[];
  /** Equipotentials from which the flow goes no further. */
  readonly deadEnds: readonly string[];
  /** Outlets that the flow reaches. */
  readonly outlets: readonly string[];
};

/**
 * Orders head lines along the flow, from the headwater boundaries to the outlets, by stepping from neighbour to
 * neighbour: a line entered on one side is left by the other. Neither the order of drawing nor the direction of a line
 * matters. Lines that cannot be reached are returned as `unordered`, never guessed.
 */
export function orderAlongFlow(heads: readonly HeadLine[], links: readonly NeighbourLink[]): FlowOrder {
  const byId = new Map(heads.map((line) => [line.id, line]));
  const place = new Map<string, number>();
  const pairs: OrderedPair[] = [];
  const sequence: string[] = [];
  let front: Array<{ id: string; leaveBy: Side | null }> = heads
    .filter((line) => line.role === 'headwater')
    .map((line) => ({ id: line.id, leaveBy: null }));
  for (const { id } of front) place.set(id, 0);
  for (let step = 1; front.length > 0; step += 1) {
    const next = new Map<string, Side | null>();
    for (const { id, leaveBy } of front) {
      for (const { to, enterBy, sameDirection } of onward(leaving(id, leaveBy, links), byId)) {
        const isOutlet = byId.get(to)!.role === 'outlet';
        if (!isOutlet && (place.get(to) ?? step) < step) continue;
        pairs.push({ before: id, after: to, sameDirection });
        if (!isOutlet && place.has(to)) continue;
        place.set(to, step);
        if (isOutlet) continue;
        sequence.push(to);
        next.set(to, enterBy === 0 ? 1 : 0);
      }
    }
    front = [...next].map(([id, leaveBy]) => ({ id, leaveBy }));
  }
  const equipotentials = heads.filter((line) => line.role === 'equipotential').map((line) => line.id);
  return {
    place,
    pairs,
    sequence,
    unordered: equipotentials.filter((id) => !place.has(id)),
    deadEnds: sequence.filter((id) => !pairs.some((pair) => pair.before === id)),
    outlets: heads.filter((line) => line.role === 'outlet' && place.has(line.id)).map((line) => line.id),
  };
}

/**
 * The steps that lead on. A face of free outflow runs along the ends of many lines; only the last of them, from which no
 * other line follows, gives its water to it.
 */
function onward(steps: readonly Step[], byId: ReadonlyMap<string, HeadLine>): Step[] {
  const lines = steps.map((step) => ({ step, line: byId.get(step.to)! }));
  const followed = lines.some(({ line }) => line.role === 'equipotential');
  return lines
    .filter(({ line }) => line.role !== 'headwater' && !(followed && line.varies))
    .map(({ step }) => step);
}

type Step = { to: string; enterBy: Side; sameDirection: boolean };

function leaving(id: string, leaveBy: Side | null, links: readonly NeighbourLink[]): Step[] {
  const steps: Step[] = [];
  for (const link of links) {
    if (link.a === id && (leaveBy === null || link.sideA === leaveBy)) {
      steps.push({ to: link.b, enterBy: link.sideB, sameDirection: link.sameDirection });
    } else if (link.b === id && (leaveBy === null || link.sideB === leaveBy)) {
      steps.push({ to: link.a, enterBy: link.sideA, sameDirection: link.sameDirection });
    }
  }
  return steps;
}
