import { makeFinding } from '#shared/compute/findings.ts';
import { type Crossing, crossingsOf } from '#shared/compute/geometry/crossing.ts';
import {
  distanceToPolyline,
  lengthOf,
  type Polyline,
  pieceOf,
  pointAlong,
} from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { liesAbovePhreatic } from '#shared/compute/net/above-phreatic.ts';
import type { FootedLine } from '#shared/compute/net/feet.ts';
import { linesOfKind, type NetLine } from '#shared/compute/net/net-lines.ts';
import type { Potential } from '#shared/compute/net/potentials.ts';
import type { Finding } from '#shared/contract/reading.ts';

/** A line of the net that should stay within the ground, with its words. */
type InnerLine = { readonly id: string; readonly shape: Polyline; readonly what: string };
/** A line beyond which no water flows. */
type Edge = {
  readonly id: string;
  readonly shape: Polyline;
  readonly what: string;
  readonly holdsHead: boolean;
};

/**
 * Finds equipotentials and flow lines that leave the ground, each with the place: that run through the ground surface, a
 * face, a drain or, for flow lines, an impervious boundary or the phreatic line (equipotentials through those are told
 * by `checkLines`), or that lie above the phreatic line all along. To run through means to go farther than `reach` to
 * both sides: a flow line traced along a boundary trembles across it. An equipotential through a boundary with one head
 * contradicts it and is wrong; the others are questions. `up`: the section's up; all in working pixels.
 */
export function findLeavingLines(
  equipotentials: ReadonlyArray<{ readonly id: string; readonly footed: FootedLine }>,
  lines: readonly NetLine[],
  potentials: readonly Potential[],
  up: Pair,
  reach: number,
): Finding[] {
  const heads = equipotentials.map(
    ({ id, footed }): InnerLine => ({ id, shape: footed.shape, what: 'An equipotential' }),
  );
  const flows = linesOfKind(lines, 'flowLine').map(
    ({ id, shape }): InnerLine => ({ id, shape, what: 'A flow line' }),
  );
  const edges = [
    ...potentials.map(({ id, shape, label, level }) => ({
      id,
      shape,
      what: label,
      holdsHead: level !== null,
    })),
    ...edgesOf(lines, 'ground', 'the ground surface'),
  ];
  const closed = [
    ...edgesOf(lines, 'impervious', 'an impervious boundary'),
    ...edgesOf(lines, 'phreaticLine', 'the phreatic line'),
  ];
  return [
    ...heads.flatMap((line) => edges.flatMap((edge) => runsThrough(line, edge, reach, edge.holdsHead))),
    ...flows.flatMap((line) =>
      [...edges, ...closed].flatMap((edge) => runsThrough(line, edge, reach, false)),
    ),
    ...[...heads, ...flows].flatMap((line) => liesInAir(line, lines, up, reach)),
  ];
}

function edgesOf(lines: readonly NetLine[], kind: NetLine['kind'], what: string): Edge[] {
  return linesOfKind(lines, kind).map(({ id, shape }) => ({ id, shape, what, holdsHead: false }));
}

function runsThrough(line: InnerLine, edge: Edge, reach: number, isWrong: boolean): Finding[] {
  const crossings = crossingsOf(line.shape, edge.shape);
  const place = crossings.find((crossing, i) => {
    const from = crossings[i - 1]?.s ?? 0;
    const to = crossings[i + 1]?.s ?? lengthOf(line.shape);
    return departs(line, edge, from, crossing, reach) && departs(line, edge, to, crossing, reach);
  });
  if (place === undefined) return [];
  const text = `${line.what} runs out of the ground through ${edge.what}. End it there.`;
  return [
    makeFinding(isWrong ? 'wrong' : 'question', 'lineLeavesRegion', text, {
      cell: 'netCheck',
      entityIds: [line.id, edge.id],
      at: place.at,
    }),
  ];
}

/** True when the line goes farther than `reach` from the edge between a crossing and another place along it. */
function departs({ shape }: InnerLine, edge: Edge, s: number, crossing: Crossing, reach: number): boolean {
  if (Math.abs(s - crossing.s) <= reach) return false;
  return pieceOf(shape, s, crossing.s).some(([x, y]) => distanceToPolyline(edge.shape, x, y) > reach);
}

function liesInAir(line: InnerLine, lines: readonly NetLine[], up: Pair, reach: number): Finding[] {
  const shapesOf = (...kinds: NetLine['kind'][]) => linesOfKind(lines, ...kinds).map(({ shape }) => shape);
  const phreatic = shapesOf('phreaticLine');
  const faces = shapesOf('ground', 'submergedFace', 'outflowFace');
  const places = [0.2, 0.5, 0.8].map((part) => pointAlong(line.shape, part * lengthOf(line.shape)));
  if (phreatic.length === 0 || !places.every((at) => liesAbovePhreatic(at, up, phreatic, faces, reach)))
    return [];
  return [
    makeFinding(
      'question',
      'lineLeavesRegion',
      `${line.what} lies above the phreatic line. Trace it below.`,
      {
        cell: 'netCheck',
        entityIds: [line.id],
        at: places[1]!,
      },
    ),
  ];
}
