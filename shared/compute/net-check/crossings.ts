import type { NetCell, NetCells } from '#shared/compute/cells/cells.ts';
import { angleBetween } from '#shared/compute/cells/quadrilateral.ts';
import type { Rail } from '#shared/compute/cells/rails.ts';
import { lengthOfVector } from '#shared/compute/geometry/length.ts';
import { lengthOf, nearestOnPolyline, type Polyline } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { NetModel } from '#shared/compute/net/net-model.ts';
import { type Tangent, tangentOfBoundary, tangentOfCurve } from '#shared/compute/net-check/tangent.ts';

/** What meets at right angles in a flow net: the two families of lines, and each with the boundaries of the other. */
export type MeetingKind =
  | 'crossing'
  | 'equipotentialAtImpervious'
  | 'equipotentialAtPhreatic'
  | 'flowLineAtPotential';

/** A place where two lines of the net meet that should do so at right angles. Working pixels. */
export type NetMeeting = {
  readonly kind: MeetingKind;
  /** The head line, and the flow line or boundary. */
  readonly lines: readonly [head: string, flow: string];
  readonly at: Pair;
  /** The sharper of the two angles, 0 to 90 degrees. */
  readonly angleDeg: number;
  /** Standard deviation of it from the tracing accuracy, degrees. */
  readonly tremorDeg: number;
  /** Mean length and width of the cells round it. */
  readonly length: number;
  readonly width: number;
  /** Those cells. */
  readonly cells: readonly NetCell[];
};

/** A place within this part of a cell of a corner of the ground is not judged. */
const CORNER_PART = 0.25;

type Corner = { readonly head: string; readonly rail: Rail; readonly at: Pair; readonly cells: NetCell[] };

/**
 * The places where head lines meet flow lines, impervious boundaries and the phreatic line, and where flow lines meet
 * potential boundaries of one head, each with its angle. Left out: corners of the ground, which give their own angle
 * (a potential boundary with an impervious one or with the phreatic line); faces of free outflow, which are neither
 * kind of line; and places at a singular point, where no angle is asked for. Directions are taken over half the shorter
 * side of a cell to either side. Working pixels, `accuracyPx` the tracing accuracy in them.
 */
export function meetingsOf(model: NetModel, net: NetCells, accuracyPx: number): NetMeeting[] {
  const shapes = new Map<string, Polyline>(model.lines.map((line) => [line.id, line.shape]));
  const footed = new Map(model.equipotentials.map((line) => [line.id, line.footed]));
  const potentials = new Map(model.potentials.map((potential) => [potential.id, potential]));
  return cornersOf(net.cells).flatMap((corner): NetMeeting[] => {
    const potential = potentials.get(corner.head);
    const kind = kindOf(corner.rail, potential === undefined ? null : { isLevel: potential.level !== null });
    if (kind === null) return [];
    const length = mean(corner.cells.map((cell) => cell.measures.length));
    const width = mean(corner.cells.map((cell) => cell.measures.width));
    const near = Math.max(3 * accuracyPx, CORNER_PART * Math.min(length, width));
    if (net.singular.some(([x, y]) => lengthOfVector(x - corner.at[0], y - corner.at[1]) <= near)) return [];
    const line = footed.get(corner.head);
    const headShape = line?.shape ?? potential?.shape;
    const carrier = [line?.start, line?.end].find(
      (foot) => foot && isAt(foot.at, corner.at, accuracyPx),
    )?.carrier;
    const flowShape = corner.rail.edge === null ? shapes.get(corner.rail.id) : carrier?.shape;
    if (headShape === undefined || flowShape === undefined) return [];
    const angle = angleAt(corner.at, headShape, flowShape, kind, Math.min(width, length), accuracyPx);
    const flowId = corner.rail.edge === null ? corner.rail.id : carrier!.id;
    return [
      { kind, lines: [corner.head, flowId], at: corner.at, ...angle, length, width, cells: corner.cells },
    ];
  });
}

/** The corners of all cells, those of neighbouring cells that are one place together. */
function cornersOf(cells: readonly NetCell[]): Corner[] {
  const corners = new Map<string, Corner>();
  const add = (head: string, rail: Rail, at: Pair, cell: NetCell) => {
    const key = `${head} ${rail.edge ?? rail.id}`;
    const corner = corners.get(key);
    if (corner) corner.cells.push(cell);
    else corners.set(key, { head, rail, at, cells: [cell] });
  };
  for (const cell of cells) {
    const { before, after } = cell.sides;
    add(cell.before, cell.left, before[0]!, cell);
    add(cell.before, cell.right, before[before.length - 1]!, cell);
    add(cell.after, cell.left, after[0]!, cell);
    add(cell.after, cell.right, after[after.length - 1]!, cell);
  }
  return [...corners.values()];
}

function kindOf(rail: Rail, potential: { readonly isLevel: boolean } | null): MeetingKind | null {
  if (potential !== null) return rail.kind === 'flowLine' && potential.isLevel ? 'flowLineAtPotential' : null;
  if (rail.kind === 'flowLine') return 'crossing';
  if (rail.kind === 'impervious') return 'equipotentialAtImpervious';
  return rail.kind === 'phreaticLine' ? 'equipotentialAtPhreatic' : null;
}

function angleAt(
  at: Pair,
  head: Polyline,
  flow: Polyline,
  kind: MeetingKind,
  cell: number,
  accuracyPx: number,
): Pick<NetMeeting, 'angleDeg' | 'tremorDeg'> {
  const headFit = kind === 'flowLineAtPotential' ? tangentOfBoundary : tangentOfCurve;
  const flowFit = kind === 'equipotentialAtImpervious' ? tangentOfBoundary : tangentOfCurve;
  const onHead = fitAt(headFit, head, at, cell, accuracyPx);
  const onFlow = fitAt(flowFit, flow, at, cell, accuracyPx);
  const angle = angleBetween(onHead.direction, onFlow.direction);
  const degrees = 180 / Math.PI;
  return {
    angleDeg: Math.min(angle, 180 - angle),
    tremorDeg: degrees * lengthOfVector(onHead.tremor, onFlow.tremor),
  };
}

/** A direction over half a cell to either side; at an end of the line, where there is one side only, over a whole cell. */
function fitAt(
  tangentOf: typeof tangentOfCurve,
  line: Polyline,
  at: Pair,
  cell: number,
  accuracyPx: number,
): Tangent {
  const { s } = nearestOnPolyline(line, ...at);
  const toEnd = Math.min(s, lengthOf(line) - s);
  return tangentOf(line, s, toEnd < cell / 4 ? cell : cell / 2, accuracyPx);
}

function isAt(a: Pair, b: Pair, accuracyPx: number): boolean {
  return lengthOfVector(a[0] - b[0], a[1] - b[1]) <= Math.max(1e-6, accuracyPx);
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}
