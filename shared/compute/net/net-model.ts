import { makeFinding } from '#shared/compute/findings.ts';
import type { Polyline } from '#shared/compute/geometry/polyline.ts';
import { type CarrierGraph, carrierGraph } from '#shared/compute/net/carrier-graph.ts';
import { type Carrier, carryToFeet, type FootedLine } from '#shared/compute/net/feet.ts';
import { joinBoundaries } from '#shared/compute/net/join-boundaries.ts';
import { joinPieces, offerToJoin } from '#shared/compute/net/join-pieces.ts';
import { findLeavingLines } from '#shared/compute/net/leaving-lines.ts';
import { type HeadLine, neighbourLinks } from '#shared/compute/net/neighbours.ts';
import { checkLines } from '#shared/compute/net/net-checks.ts';
import { linesOfKind, medianLength, type NetLine, netLinesOf } from '#shared/compute/net/net-lines.ts';
import { questionOpenEnds } from '#shared/compute/net/open-ends.ts';
import { type FlowOrder, orderAlongFlow, withPassed } from '#shared/compute/net/order.ts';
import { type Potential, potentialsOf } from '#shared/compute/net/potentials.ts';
import { type Strip, type StripLine, stripBetween } from '#shared/compute/net/strips.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { type EntityOf, entitiesOf, type FlowNetDocument } from '#shared/contract/document.ts';
import type { Finding } from '#shared/contract/reading.ts';

/** A gap or overshoot at the end of an equipotential is bridged up to this part of the usual equipotential's length. */
const REACH_PART = 0.05;

/** An equipotential from foot to foot; `members` are the traced pieces of which it is made, its own id first. */
export type Equipotential = {
  readonly id: string;
  readonly members: readonly string[];
  readonly line: NetLine;
  readonly footed: FootedLine;
};

/** The traced net put in order, before heads: everything in base-raster pixels. */
export type NetModel = {
  readonly lines: readonly NetLine[];
  readonly equipotentials: readonly Equipotential[];
  readonly potentials: readonly Potential[];
  readonly order: FlowOrder;
  readonly strips: readonly Strip[];
  /** Lines on which equipotentials end, and how they hang together. */
  readonly carriers: readonly Carrier[];
  readonly ways: CarrierGraph;
  /** Lines that no flow crosses: impervious boundaries and the phreatic line. */
  readonly walls: readonly NetLine[];
  /** Greatest gap taken for a tracing error. */
  readonly reach: number;
  readonly findings: readonly Finding[];
};

/**
 * Puts the traced lines of a document in order: potential boundaries, feet, neighbours, order along the flow, strips.
 * Nothing here knows a drop or a head. `water` gives the levels at which faces are clipped; `accuracyPx` is the
 * tracing accuracy.
 */
export function modelNet(
  document: FlowNetDocument,
  map: SectionMap,
  water: EntityOf<'waterLevels'>,
  accuracyPx: number,
): NetModel {
  const lines = netLinesOf(document);
  const walls = linesOfKind(lines, 'impervious', 'phreaticLine');
  const flowLines = linesOfKind(lines, 'flowLine');
  const { all, findings } = potentialsOf(lines, map, water, accuracyPx);
  const traced = linesOfKind(lines, 'equipotential');
  const reach = reachOf(lines, accuracyPx);
  const potentials = joinBoundaries(all, reach);
  const carriers = carriersOf(walls, flowLines, potentials);
  const edges = [...walls, ...potentials].map(({ shape }) => shape);
  const { whole, findings: joints } = joinPieces(traced, edges, reach);
  const equipotentials = whole.map(
    ({ line, members }): Equipotential => ({
      id: line.id,
      members,
      line,
      footed: carryToFeet(line.shape, carriers, reach),
    }),
  );
  const heads = headLines(equipotentials, potentials);
  const links = neighbourLinks(heads, shapesOf(walls), shapesOf(flowLines));
  const levels = new Map(potentials.map(({ id, outHead }) => [id, outHead]));
  const seen = orderAlongFlow(heads, links, levels);
  const ways = carrierGraph(carriers, potentials, reach);
  const strips = stripsOf(seen, equipotentials, potentials, ways, (more) =>
    carrierGraph([...carriers, ...more], potentials, reach),
  );
  const held = new Set(carriers.filter((carrier) => carrier.held === 'atOneHead').map(({ id }) => id));
  const order = withPassed(seen, held, strips);
  return {
    lines,
    equipotentials,
    potentials,
    order,
    strips,
    carriers,
    ways,
    walls,
    reach,
    findings: [
      ...findings,
      ...unfinishedLines(document),
      ...joints,
      ...checkLines(equipotentials, flowLines, walls, accuracyPx, reach),
      ...findLeavingLines(equipotentials, lines, potentials, map.up, reach),
      // While a boundary is still to be marked, neither the order nor an open end says anything.
      ...(findings.length === 0
        ? [
            ...offerToJoin(whole, edges, reach, new Set([...order.unordered, ...order.sideBySide])),
            ...orderFindings(order, equipotentials, potentials),
            ...questionOpenEnds(equipotentials, lines, reach),
          ]
        : []),
    ],
  };
}

/** Greatest gap taken for a tracing error, in the pixels of the lines. */
export function reachOf(lines: readonly NetLine[], accuracyPx: number): number {
  const traced = linesOfKind(lines, 'equipotential');
  return Math.max(3 * accuracyPx, REACH_PART * medianLength(traced.length > 0 ? traced : lines));
}

function shapesOf(lines: readonly NetLine[]): Polyline[] {
  return lines.map((line) => line.shape);
}

/**
 * Faces along which the head is the elevation carry feet too: equipotentials end on them. So do boundaries of a head
 * between the highest and the lowest, which the flow passes beside.
 */
function carriersOf(
  walls: readonly NetLine[],
  flowLines: readonly NetLine[],
  potentials: readonly Potential[],
): Carrier[] {
  const outlets = potentials.filter(({ role }) => role === 'outlet');
  const lowest = Math.min(...outlets.map(({ outHead }) => outHead));
  return [
    ...walls.map((line) => ({ id: line.id, shape: line.shape, real: true })),
    ...outlets
      .filter(({ level }) => level === null)
      .map(({ id, shape }): Carrier => ({ id, shape, real: true, held: 'alongIt' })),
    ...outlets
      .filter(({ level, outHead }) => level !== null && outHead > lowest)
      .map(({ id, shape }): Carrier => ({ id, shape, real: true, held: 'atOneHead' })),
    ...flowLines.map((line) => ({ id: line.id, shape: line.shape, real: false })),
  ];
}

function headLines(equipotentials: readonly Equipotential[], potentials: readonly Potential[]): HeadLine[] {
  return [
    ...potentials.map(
      ({ id, shape, role, level }): HeadLine => ({ id, shape, role, varies: level === null }),
    ),
    ...equipotentials.map(
      ({ id, footed }): HeadLine => ({ id, shape: footed.shape, role: 'equipotential', varies: false }),
    ),
  ];
}

/**
 * The strips of the pairs that have one, in the order of the pairs. `plain`: the carriers of the net, to which `graphWith`
 * adds more.
 */
export function stripsOf(
  order: Pick<FlowOrder, 'pairs'>,
  equipotentials: readonly Equipotential[],
  potentials: readonly Potential[],
  plain: CarrierGraph,
  graphWith: (more: readonly Carrier[]) => CarrierGraph,
): Strip[] {
  const stripLines = new Map<string, StripLine>([
    ...equipotentials.map(({ id, footed }) => [id, { id, ...footed, isBoundary: false }] as const),
    ...potentials.map(
      ({ id, shape }) => [id, { id, shape, start: null, end: null, isBoundary: true }] as const,
    ),
  ]);
  return order.pairs
    .map((pair) => {
      const lines = equipotentials.filter(({ id }) => id !== pair.before && id !== pair.after);
      const [beside, others] = [true, false].map((isBeside) =>
        lines.filter(({ id }) => pair.beside.includes(id) === isBeside).map(({ id }) => stripLines.get(id)!),
      ) as [StripLine[], StripLine[]];
      // Where the flow parts, the ways from line to line run along the lines beside.
      const graph =
        beside.length === 0
          ? plain
          : graphWith(beside.map(({ id, shape }) => ({ id, shape, real: true, held: 'atOneHead' })));
      return stripBetween(stripLines.get(pair.before)!, stripLines.get(pair.after)!, pair, graph, others);
    })
    .filter((strip) => strip !== null);
}

function unfinishedLines(document: FlowNetDocument): Finding[] {
  return entitiesOf(document, 'line')
    .filter(({ value }) => !value.finished)
    .map(({ id, value }) =>
      makeFinding('note', 'lineNotFinished', 'A line has not been finished and is left out of the reading.', {
        entityIds: [id],
        at: value.points[0] ?? null,
      }),
    );
}

function orderFindings(
  order: FlowOrder,
  equipotentials: readonly Equipotential[],
  potentials: readonly Potential[],
): Finding[] {
  const placeOf = (id: string) => equipotentials.find((line) => line.id === id)?.line.value.points[0] ?? null;
  const about = (code: string, text: string, ids: readonly string[]) =>
    ids.map((id) => makeFinding('wrong', code, text, { cell: 'netCheck', entityIds: [id], at: placeOf(id) }));
  const reached = potentials.some(
    (potential) => potential.role === 'outlet' && order.place.has(potential.id),
  );
  return [
    ...about(
      'lineUnordered',
      'An equipotential could not be placed in the order from the headwater to the outlet. Check where it runs and which lines lie beside it.',
      order.unordered,
    ),
    ...about(
      'flowStops',
      'From an equipotential the flow leads on to no other line and to no outlet. Check the next line and the outlet.',
      order.deadEnds,
    ),
    ...about(
      'sideBySide',
      'Two equipotentials lie side by side between the same lines, as the pieces of one do. Join them into one line, or correct the one that is out of place.',
      order.sideBySide,
    ),
    ...(reached ? leftOut(order, equipotentials, potentials) : []),
    ...(reached || order.deadEnds.length > 0
      ? []
      : [
          makeFinding(
            'wrong',
            'outletNotReached',
            'The flow from the headwater does not reach the outlet. Check the outlet and the last equipotential.',
            {
              cell: 'outlet',
            },
          ),
        ]),
  ];
}

/**
 * Drains, faces of free outflow and waters at another level that take no part though the flow reaches another outlet: a
 * net drawn without the drain holds for a section without it. A free face along which equipotentials end does take part.
 */
function leftOut(
  order: FlowOrder,
  equipotentials: readonly Equipotential[],
  potentials: readonly Potential[],
): Finding[] {
  const lowest = Math.min(
    ...potentials.filter(({ id }) => order.outlets.includes(id)).map(({ outHead }) => outHead),
  );
  const bearsFoot = (id: string) =>
    equipotentials.some(({ footed }) => footed.start?.carrier.id === id || footed.end?.carrier.id === id);
  return potentials
    .filter(
      ({ id, role, line, level, outHead }) =>
        role === 'outlet' &&
        (line.kind !== 'submergedFace' || outHead !== lowest) &&
        !order.place.has(id) &&
        !(level === null && bearsFoot(id)),
    )
    .map(({ members, label, line }) =>
      makeFinding(
        'wrong',
        'outletLeftOut',
        `The flow does not reach ${label}, so that the net leaves it out. Trace the equipotentials that lead to it, or take it away if it draws no water.`,
        { cell: 'outlet', entityIds: members, at: line.value.points[0] ?? null },
      ),
    );
}
