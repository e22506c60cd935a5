import { makeFinding } from '#shared/compute/findings.ts';
import { crossingsOf } from '#shared/compute/geometry/crossing.ts';
import {
  distanceToPolyline,
  lengthOf,
  type Polyline,
  pieceOf,
  pointAlong,
  polylineOf,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { FootedLine } from '#shared/compute/net/feet.ts';
import { linesOfKind, type NetLine } from '#shared/compute/net/net-lines.ts';
import type { Finding } from '#shared/contract/reading.ts';

/** The last part of a line that says where it would run on. */
const DIRECTION_PART = 0.1;

/** One end of a line: its tip, the half of the line next to it, and the way it would run on by the line's length. */
type End = { readonly tip: Pair; readonly half: Polyline | null; readonly onward: Polyline | null };

/**
 * Questions equipotentials and phreatic lines an end of which reaches no boundary: one finding a line, at the open end.
 * An equipotential that has run past the outermost flow line ends where it likes when no boundary lies ahead of it, as
 * under an apron on ground without a base. Shapes and `reach`, the gap that is taken for a tracing error, in
 * base-raster pixels.
 */
export function questionOpenEnds(
  equipotentials: ReadonlyArray<{ readonly id: string; readonly footed: FootedLine }>,
  lines: readonly NetLine[],
  reach: number,
): Finding[] {
  const walls = linesOfKind(lines, 'impervious', 'phreaticLine');
  const faces = linesOfKind(lines, 'submergedFace', 'outflowFace', 'drain');
  const flowLines = shapesOf(linesOfKind(lines, 'flowLine'));
  const boundaries = shapesOf([...walls, ...faces]);
  const isOpen = (end: End) => stopsShort(end, boundaries, reach) && !runsOut(end, boundaries, flowLines);
  return [
    ...equipotentials.flatMap(({ id, footed }) => questionEquipotential(id, feetless(footed).filter(isOpen))),
    ...linesOfKind(lines, 'phreaticLine').flatMap((line) => {
      const others = shapesOf([...walls, ...faces].filter((other) => other.id !== line.id));
      return questionPhreatic(
        line.id,
        endsOf(line.shape).filter((end) => stopsShort(end, others, reach)),
      );
    }),
  ];
}

function shapesOf(lines: readonly NetLine[]): Polyline[] {
  return lines.map((line) => line.shape);
}

function feetless({ shape, start, end }: FootedLine): End[] {
  const [first, last] = endsOf(shape);
  return [...(start === null ? [first] : []), ...(end === null ? [last] : [])];
}

function endsOf(shape: Polyline): [End, End] {
  const length = lengthOf(shape);
  return [endOf(shape, 0, length), endOf(shape, length, 0)];
}

function endOf(shape: Polyline, s: number, far: number): End {
  const tip = pointAlong(shape, s);
  const back = pointAlong(shape, s + DIRECTION_PART * (far - s));
  const onward: Pair = [
    tip[0] + (tip[0] - back[0]) / DIRECTION_PART,
    tip[1] + (tip[1] - back[1]) / DIRECTION_PART,
  ];
  return {
    tip,
    half: polylineOf(pieceOf(shape, s, lengthOf(shape) / 2)),
    onward: polylineOf([tip, onward]),
  };
}

/** True when no boundary lies within reach of the end; a line that has run through one is told as that. */
function stopsShort({ tip, half }: End, boundaries: readonly Polyline[], reach: number): boolean {
  return !boundaries.some((shape) => distanceToPolyline(shape, ...tip) <= reach || meets(half, shape));
}

/** True when the end lies past a flow line and nothing is traced ahead of it. */
function runsOut(
  { half, onward }: End,
  boundaries: readonly Polyline[],
  flowLines: readonly Polyline[],
): boolean {
  return (
    flowLines.some((shape) => meets(half, shape)) &&
    ![...boundaries, ...flowLines].some((shape) => meets(onward, shape))
  );
}

function meets(line: Polyline | null, shape: Polyline): boolean {
  return line !== null && crossingsOf(line, shape).length > 0;
}

function questionEquipotential(id: string, open: readonly End[]): Finding[] {
  const what =
    open.length > 1
      ? 'An equipotential reaches no boundary at either end. Extend it to the boundaries'
      : 'An equipotential reaches no boundary at one end. Extend it to the boundary';
  return question(id, open, `${what}, or trace the boundary or the outermost flow line there.`);
}

function questionPhreatic(id: string, open: readonly End[]): Finding[] {
  const what =
    open.length > 1
      ? 'The phreatic line reaches no boundary at either end. Extend it to the faces or the drain between which it runs'
      : 'The phreatic line reaches no boundary at one end. Extend it to the face or the drain at which it ends';
  return question(id, open, `${what}, or trace that boundary.`);
}

function question(id: string, open: readonly End[], text: string): Finding[] {
  const [first] = open;
  if (!first) return [];
  return [
    makeFinding('question', 'gapAtBoundary', text, { cell: 'netCheck', entityIds: [id], at: first.tip }),
  ];
}
