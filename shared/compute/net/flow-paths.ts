import type { HeadLine } from '#shared/compute/net/neighbours.ts';
import type { Walk, WalkedRegion } from '#shared/compute/net/walk-regions.ts';

/** A way of the water: from a boundary that gives it, across equipotentials, to one that takes it. */
export type FlowPath = {
  readonly source: string;
  readonly lines: readonly string[];
  readonly outlet: string;
};

/** A boundary that the flow passes beside, the last line before it, and the lines round the ground it bounds there. */
export type PassedBoundary = {
  readonly boundary: string;
  readonly after: string | null;
  readonly lines: readonly string[];
};

type Arrival = {
  readonly region: WalkedRegion;
  readonly outlet: string;
  readonly lines: readonly string[];
};

/**
 * The ways of the water through the walked regions. The first leads to the lowest outlet. A boundary beyond a fork takes
 * water when its head lies below that of the fork, and gives it when it lies above: then its way runs back to the fork
 * and on to the lowest outlet. Where the fork's head has to be known for that, it is taken from the count of the traced
 * lines on the first way. `levels`: head of each potential boundary.
 */
export function flowPaths(
  walk: Walk,
  heads: readonly HeadLine[],
  levels: ReadonlyMap<string, number>,
): { paths: FlowPath[]; passed: PassedBoundary[] } {
  const outlets = heads.filter((line) => line.role === 'outlet');
  const levelOf = (id: string) => levels.get(id) ?? 0;
  const arrivals = arrivalsOf(walk, outlets, levelOf).sort(
    (a, b) => levelOf(a.outlet) - levelOf(b.outlet) || b.lines.length - a.lines.length,
  );
  const [main] = arrivals;
  const passed = passedBoundaries(walk, outlets, arrivals);
  if (main === undefined) return { paths: [], passed };
  const paths: FlowPath[] = [pathTo(main)];
  for (const arrival of arrivals.slice(1)) paths.push(pathBeyond(arrival, paths, levelOf));
  for (const region of walk.regions) {
    for (const { via, from } of region.joinedBy) {
      const on = onwardFrom(region, paths);
      if (on !== null)
        paths.push({ source: from.source, lines: [...linesTo(from), via, ...on.lines], outlet: on.outlet });
    }
  }
  return { paths, passed };
}

/** Boundaries met where no line leads on: of several in one region the lowest, a level one before a free face. */
function arrivalsOf(walk: Walk, outlets: readonly HeadLine[], levelOf: (id: string) => number): Arrival[] {
  const ends = walk.regions.filter(({ onward }) => onward.length === 0);
  const found = ends.flatMap((region): Arrival[] => {
    const [outlet] = outlets
      .filter(({ id }) => region.boundaries.includes(id) && id !== region.source)
      .sort((a, b) => Number(a.varies) - Number(b.varies) || levelOf(a.id) - levelOf(b.id));
    return outlet === undefined ? [] : [{ region, outlet: outlet.id, lines: linesTo(region) }];
  });
  // Boundaries that see one another past the ends of the lines between them are no way of the water.
  const crossing = found.filter(({ lines }) => lines.length > 0);
  return crossing.length > 0 ? crossing : found;
}

function passedBoundaries(
  walk: Walk,
  outlets: readonly HeadLine[],
  arrivals: readonly Arrival[],
): PassedBoundary[] {
  return walk.regions.flatMap((region) =>
    outlets
      .filter(({ id, varies }) => region.boundaries.includes(id) && !varies && id !== region.source)
      .filter(
        ({ id }) =>
          region.sides.length > 0 && !arrivals.some((each) => each.region === region && each.outlet === id),
      )
      .map(({ id }) => ({ boundary: id, after: region.via, lines: region.sides.map((side) => side.id) })),
  );
}

function linesTo(region: WalkedRegion): string[] {
  return region.via === null || region.from === null ? [] : [...linesTo(region.from), region.via];
}

function pathTo({ region, lines, outlet }: Arrival): FlowPath {
  return { source: region.source, lines, outlet };
}

function pathBeyond(arrival: Arrival, paths: readonly FlowPath[], levelOf: (id: string) => number): FlowPath {
  const { lines, outlet } = arrival;
  const shared = (path: FlowPath) =>
    path.source === arrival.region.source ? lines.findIndex((id, i) => path.lines[i] !== id) : -1;
  const known = paths.reduce((best, path) => (shared(path) > shared(best) ? path : best));
  const fork = shared(known);
  if (fork === -1) return pathTo(arrival);
  const [source, lowest] = [levelOf(known.source), levelOf(known.outlet)];
  const forkHead = source - (fork * (source - lowest)) / (known.lines.length + 1);
  if (levelOf(outlet) <= forkHead) return pathTo(arrival);
  return {
    source: outlet,
    lines: [...lines.slice(fork).reverse(), ...known.lines.slice(fork)],
    outlet: known.outlet,
  };
}

/** How a known path goes on from a region. */
function onwardFrom(
  region: WalkedRegion,
  paths: readonly FlowPath[],
): Pick<FlowPath, 'lines' | 'outlet'> | null {
  for (const { lines, outlet } of paths) {
    const at = region.via === null ? -1 : lines.indexOf(region.via);
    if (at !== -1) return { lines: lines.slice(at + 1), outlet };
    const first = lines.findIndex((id) => region.onward.includes(id));
    if (region.via === null && first !== -1) return { lines: lines.slice(first), outlet };
  }
  return null;
}
