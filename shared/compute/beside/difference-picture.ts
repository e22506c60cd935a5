import { STEPS } from '#shared/compute/beside/difference-steps.ts';
import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import type { SectionSolution } from '#shared/compute/independent/section-solution.ts';
import { solutionReader } from '#shared/compute/independent/solution-reader.ts';
import { lieOf } from '#shared/compute/net/lie-of-place.ts';
import { netLinesOf } from '#shared/compute/net/net-lines.ts';
import { findTangles } from '#shared/compute/net/tangles.ts';
import { fieldAt } from '#shared/compute/net/two-readings.ts';
import { type PreparedNet, prepareNet } from '#shared/compute/prepare-net.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { singleInputs } from '#shared/compute/single-inputs.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';

/** A difference at its place. `head` in the document's length unit, `part` of the whole head lost. */
export type PlacedDifference = { readonly at: SheetPoint; readonly head: number; readonly part: number };

/**
 * Where the heads of a traced net differ from the independent solution: squares of the sheet by the size of the
 * difference, traced minus independent. `above[k]`, `below[k]`: outlines in which it lies beyond `STEPS[k]` of the head
 * lost and within the next step. Greatest of each sign; null where there is none.
 */
export type DifferencePicture = {
  readonly above: ReadonlyArray<readonly (readonly SheetPoint[])[]>;
  readonly below: ReadonlyArray<readonly (readonly SheetPoint[])[]>;
  readonly greatestAbove: PlacedDifference | null;
  readonly greatestBelow: PlacedDifference | null;
  /** Places compared. */
  readonly compared: number;
};

const SQUARES = 2400;
const LEAST_SQUARE_PX = 6;
const NOTHING: DifferencePicture = {
  above: STEPS.map(() => []),
  below: STEPS.map(() => []),
  greatestAbove: null,
  greatestBelow: null,
  compared: 0,
};

/**
 * The picture of differences over the section of a document: total head of the traced net by the field between its
 * lines, less that of the solution, at the middles of some two thousand squares. Empty for a net that is unfinished.
 */
export function differencePicture(
  document: FlowNetDocument,
  map: SectionMap,
  solution: SectionSolution,
): DifferencePicture {
  const prepared = preparedOf(document);
  const lost = solution.greatestHead - solution.leastHead;
  if (prepared === null || !(lost > 0)) return NOTHING;
  const { headAt } = solutionReader(solution);
  const differenceAt = (at: SheetPx) => {
    const independent = headAt(map.toSection(at));
    const traced = independent === null ? null : tracedHead(at, prepared);
    return independent === null || traced === null ? null : traced - independent;
  };
  return pictureOf(gridOver(document), differenceAt, lost);
}

function preparedOf(document: FlowNetDocument): PreparedNet | null {
  const setOut = readSetOut(document);
  const inputs = singleInputs(document);
  if (setOut.map === null) return null;
  if (findTangles(netLinesOf(document), inputs.count.tracingAccuracyPx).length > 0) return null;
  const prepared = prepareNet(document, setOut, setOut.map, inputs);
  return prepared.finished ? prepared : null;
}

function tracedHead(at: SheetPx, { frame, ground }: PreparedNet): number | null {
  const place = frame.toWorking(at);
  const lie = lieOf(place, ground);
  if (lie.in !== 'strip') return null;
  const found = fieldAt(place, lie, ground);
  return found === null || 'code' in found || !Number.isFinite(found.totalHead) ? null : found.totalHead;
}

type Grid = {
  readonly left: number;
  readonly top: number;
  readonly size: number;
  readonly columns: number;
  readonly rows: number;
};

function gridOver(document: FlowNetDocument): Grid {
  const points = netLinesOf(document).flatMap((line) => line.value.points);
  let [left, top, right, bottom] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const [x, y] of points) {
    left = Math.min(left, x);
    right = Math.max(right, x);
    top = Math.min(top, y);
    bottom = Math.max(bottom, y);
  }
  const size = Math.max(LEAST_SQUARE_PX, Math.sqrt(((right - left) * (bottom - top)) / SQUARES));
  const along = (length: number) => (length > 0 ? Math.min(SQUARES, Math.ceil(length / size)) : 0);
  return { left, top, size, columns: along(right - left), rows: along(bottom - top) };
}

function pictureOf(
  grid: Grid,
  differenceAt: (at: SheetPx) => number | null,
  lost: number,
): DifferencePicture {
  const above: SheetPoint[][][] = STEPS.map(() => []);
  const below: SheetPoint[][][] = STEPS.map(() => []);
  let greatestAbove: PlacedDifference | null = null;
  let greatestBelow: PlacedDifference | null = null;
  let compared = 0;
  for (let row = 0; row < grid.rows; row += 1) {
    for (let column = 0; column < grid.columns; column += 1) {
      const [x, y] = [grid.left + (column + 0.5) * grid.size, grid.top + (row + 0.5) * grid.size];
      const head = differenceAt(sheetPx(x, y));
      if (head === null) continue;
      compared += 1;
      const found: PlacedDifference = { at: [x, y], head, part: head / lost };
      if (head > (greatestAbove?.head ?? 0)) greatestAbove = found;
      if (head < (greatestBelow?.head ?? 0)) greatestBelow = found;
      const step = STEPS.filter((least) => Math.abs(found.part) >= least).length - 1;
      (head > 0 ? above : below)[step]?.push(squareAbout(x, y, grid.size / 2));
    }
  }
  return { above, below, greatestAbove, greatestBelow, compared };
}

function squareAbout(x: number, y: number, half: number): SheetPoint[] {
  return [
    [x - half, y - half],
    [x + half, y - half],
    [x + half, y + half],
    [x - half, y + half],
  ];
}
