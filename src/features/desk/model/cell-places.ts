import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import { segmentAt } from '#shared/compute/geometry/hit-test.ts';
import { polylineOf } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import {
  entitiesOf,
  type FlowNetDocument,
  type LineKind,
  type SheetPoint,
} from '#shared/contract/document.ts';
import type { NoteAnchor } from '#shared/contract/notes.ts';

export type CellAnchor = Extract<NoteAnchor, { on: 'cell' }>;

/** Lines along which the head is known or equal, and lines along which water flows. */
const HEAD_LINES: readonly LineKind[] = ['equipotential', 'submergedFace', 'outflowFace', 'drain'];
const FLOW_LINES: readonly LineKind[] = ['flowLine', 'phreaticLine', 'impervious'];
/** How far beside its four corners a place of a cell may lie, as a share of the cell: its sides are curved. */
const BULGE = 0.35;

/** The cell of the net in which a place lies, by the lines around it; null where it lies in none. */
export function cellAt(document: FlowNetDocument, at: SheetPoint): CellAnchor | null {
  const heads = linesAround(document, HEAD_LINES, at);
  const flows = linesAround(document, FLOW_LINES, at);
  if (heads === null || flows === null) return null;
  const anchor: CellAnchor = { on: 'cell', heads, flows, at };
  const corners = cornersOf(document, anchor);
  return corners !== null && isAmong(corners, at) ? anchor : null;
}

/** The middle of a cell as its lines run now; null when one of them is gone. */
export function middleOfCell(document: FlowNetDocument, anchor: CellAnchor): SheetPoint | null {
  const corners = cornersOf(document, anchor);
  return corners && mean(corners);
}

/** The nearest line and the nearest one beyond the place from there; null where there is no other side. */
function linesAround(
  document: FlowNetDocument,
  kinds: readonly LineKind[],
  at: SheetPoint,
): [string, string] | null {
  const hits = entitiesOf(document, 'line')
    .filter(({ value }) => value.finished && kinds.includes(value.line))
    .flatMap(({ id, value }) => {
      const hit = segmentAt(value.points, at, Number.POSITIVE_INFINITY);
      return hit ? [{ id, ...hit }] : [];
    })
    .sort((a, b) => a.distance - b.distance);
  const [first, ...others] = hits;
  if (!first) return null;
  const away = (to: Pair): Pair => [to[0] - at[0], to[1] - at[1]];
  const [x, y] = away(first.at);
  const second = others.find((hit) => x * away(hit.at)[0] + y * away(hit.at)[1] < 0);
  return second ? [first.id, second.id] : null;
}

function cornersOf(document: FlowNetDocument, { heads, flows }: CellAnchor): SheetPoint[] | null {
  const corners: SheetPoint[] = [];
  for (const head of heads)
    for (const flow of flows) {
      const [a, b] = [pointsOf(document, head), pointsOf(document, flow)];
      const corner = a && b && meetingOf(a, b);
      if (!corner) return null;
      corners.push(corner);
    }
  return corners;
}

function pointsOf(document: FlowNetDocument, id: string): readonly SheetPoint[] | null {
  const value = document.entities[id]?.value;
  return value?.kind === 'line' ? value.points : null;
}

/** Where two lines cross, or where they come nearest: a line may end a little before the one it stands on. */
function meetingOf(a: readonly SheetPoint[], b: readonly SheetPoint[]): SheetPoint | null {
  const [first, second] = [polylineOf(a), polylineOf(b)];
  const crossing = first && second && crossingsOf(first, second)[0];
  if (crossing) return [crossing.at[0], crossing.at[1]];
  let best: { distance: number; at: SheetPoint } | null = null;
  for (const [from, to] of [
    [a, b],
    [b, a],
  ] as const)
    for (const point of from) {
      const hit = segmentAt(to, point, best?.distance ?? Number.POSITIVE_INFINITY);
      if (hit && (best === null || hit.distance < best.distance))
        best = { distance: hit.distance, at: mean([point, [hit.at[0], hit.at[1]]]) };
    }
  return best?.at ?? null;
}

function mean(points: readonly SheetPoint[]): SheetPoint {
  const sum = points.reduce(([x, y], point) => [x + point[0], y + point[1]], [0, 0]);
  return [sum[0] / points.length, sum[1] / points.length];
}

function isAmong(corners: readonly SheetPoint[], at: SheetPoint): boolean {
  return ([0, 1] as const).every((axis) => {
    const sides = corners.map((corner) => corner[axis]);
    const [least, most] = [Math.min(...sides), Math.max(...sides)];
    const beside = (most - least) * BULGE;
    return at[axis] >= least - beside && at[axis] <= most + beside;
  });
}
