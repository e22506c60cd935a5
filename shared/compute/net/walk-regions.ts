import type { HeadLine } from '#shared/compute/net/neighbours.ts';
import type { FlowRegion, LineSide } from '#shared/compute/net/regions.ts';

/** A region with the way by which the walk came into it. */
export type WalkedRegion = FlowRegion & {
  /** The equipotential crossed to come here; null where the walk starts. */
  readonly via: string | null;
  readonly from: WalkedRegion | null;
  /** The boundary from which the walk started. */
  readonly source: string;
  /** Equipotentials by which the flow comes in from regions that were reached another way. */
  readonly joinedBy: Array<{ readonly via: string; readonly from: WalkedRegion }>;
  /** Equipotentials that lead on from here. */
  readonly onward: string[];
};

export type Walk = {
  readonly regions: readonly WalkedRegion[];
  /** Lines crossed to come to a line, itself included. */
  readonly place: ReadonlyMap<string, number>;
  /** Lines that lead back to where the walk has been. */
  readonly loops: ReadonlySet<string>;
  /** Lines beyond which no further line lies. */
  readonly ends: ReadonlySet<string>;
  /** The greatest place. */
  readonly depth: number;
};

/**
 * Walks from region to region across the equipotentials, from the highest boundaries outwards; what they do not reach is
 * walked from the next lower one. `levels`: head of each potential boundary.
 */
export function walkRegions(
  regions: readonly FlowRegion[],
  heads: readonly HeadLine[],
  levels: ReadonlyMap<string, number>,
): Walk {
  const walked = new Map<FlowRegion, WalkedRegion>();
  const place = new Map<string, number>();
  const loops = new Set<string>();
  const bySide = new Map(
    regions.flatMap((region) => region.sides.map((side) => [sideKey(side), region] as const)),
  );
  for (const sources of sourcesInTurn(heads, levels)) {
    const queue = regions
      .filter((region) => !walked.has(region))
      .flatMap((region) => {
        const source = sources.find((id) => region.boundaries.includes(id));
        return source === undefined ? [] : [started(region, null, null, source, walked)];
      });
    for (let here = queue.shift(); here !== undefined; here = queue.shift()) {
      queue.push(...crossed(here, bySide, walked, place, loops));
    }
  }
  const onward = new Set(
    [...walked.values()].flatMap((region) => (region.onward.length > 0 ? [region.via] : [])),
  );
  const ends = new Set([...place.keys()].filter((id) => !onward.has(id)));
  return { regions: [...walked.values()], place, loops, ends, depth: Math.max(0, ...place.values()) };
}

/** The headwater boundaries together, then the others one by one, the highest first. */
function sourcesInTurn(heads: readonly HeadLine[], levels: ReadonlyMap<string, number>): string[][] {
  const idsOf = (role: HeadLine['role']) => heads.filter((line) => line.role === role).map(({ id }) => id);
  const lower = idsOf('outlet').sort((a, b) => (levels.get(b) ?? 0) - (levels.get(a) ?? 0));
  // The lowest gives no water to anything.
  return [idsOf('headwater'), ...lower.slice(0, -1).map((id) => [id])];
}

function started(
  region: FlowRegion,
  via: string | null,
  from: WalkedRegion | null,
  source: string,
  walked: Map<FlowRegion, WalkedRegion>,
): WalkedRegion {
  const here: WalkedRegion = { ...region, via, from, source, joinedBy: [], onward: [] };
  walked.set(region, here);
  return here;
}

/** The regions across the lines of one region, entered for the first time. */
function crossed(
  here: WalkedRegion,
  bySide: ReadonlyMap<string, FlowRegion>,
  walked: Map<FlowRegion, WalkedRegion>,
  place: Map<string, number>,
  loops: Set<string>,
): WalkedRegion[] {
  const entered: WalkedRegion[] = [];
  for (const { id, side } of here.sides) {
    if (place.has(id)) continue;
    place.set(id, here.via === null ? 1 : place.get(here.via)! + 1);
    const beyond = bySide.get(sideKey({ id, side: side === 0 ? 1 : 0 }));
    if (beyond === undefined) continue;
    const known = walked.get(beyond);
    if (known === undefined) {
      here.onward.push(id);
      entered.push(started(beyond, id, here, here.source, walked));
    } else if (startOf(known) !== startOf(here)) {
      here.onward.push(id);
      known.joinedBy.push({ via: id, from: here });
    } else {
      loops.add(id);
      if (known.via !== null) loops.add(known.via);
    }
  }
  return entered;
}

function sideKey({ id, side }: LineSide): string {
  return `${side} ${id}`;
}

/** The region where the walk to a region started. */
function startOf(region: WalkedRegion): WalkedRegion {
  return region.from === null ? region : startOf(region.from);
}
