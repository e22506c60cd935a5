import type { PlacedLine, PlacedNet } from '#shared/compute/beside/placed-net.ts';
import { thinned } from '#shared/compute/geometry/thin.ts';
import type { LineKind, SheetPoint, TracedLine } from '#shared/contract/document.ts';

/** Vertices are left out while a line stays this near the computed one, sheet pixels: a third of what a hand traces to. */
const TOLERANCE = 0.3;
/** A piece of a contour shorter than this is a speck of the mesh and no line, sheet pixels. */
const SHORTEST = 4;

export type AdoptableKind = Extract<LineKind, 'equipotential' | 'flowLine' | 'phreaticLine'>;

/** A line of the computed net that may be adopted: one contour may come in several pieces, each a line of its own. */
export type Adoptable = {
  readonly kind: AdoptableKind;
  /** Its place among those of its kind, from 0. */
  readonly index: number;
  /** Head of an equipotential in the document's unit, ψ of a flow line, 0 for the free surface. */
  readonly value: number;
  readonly pieces: readonly TracedLine[];
};

/** The lines of a computed net as traced lines of few vertices, marked as adopted. */
export function adoptableLines(net: PlacedNet): Adoptable[] {
  const surface = net.surface.length > 0 ? [{ value: 0, lines: net.surface }] : [];
  return [
    ...adoptables('equipotential', net.equipotentials),
    ...adoptables('flowLine', net.flowLines),
    ...adoptables('phreaticLine', surface),
  ];
}

function adoptables(kind: AdoptableKind, lines: readonly PlacedLine[]): Adoptable[] {
  return lines.map(({ value, lines: pieces }, index) => ({
    kind,
    index,
    value,
    pieces: pieces
      .filter((points) => lengthOf(points) >= SHORTEST)
      .map((points) =>
        adopted(
          kind,
          thinned(points, TOLERANCE).map(([x, y]): SheetPoint => [x, y]),
        ),
      ),
  }));
}

function adopted(line: AdoptableKind, points: SheetPoint[]): TracedLine {
  return {
    kind: 'line',
    line,
    name: '',
    points,
    finished: true,
    water: null,
    // The head follows from the count of the net, as of a line traced by hand: a typed one would outlive a change of level.
    head: null,
    drops: null,
    origin: 'adopted',
  };
}

function lengthOf(points: readonly SheetPoint[]): number {
  let length = 0;
  for (let i = 1; i < points.length; i += 1) {
    const [[ax, ay], [bx, by]] = [points[i - 1]!, points[i]!];
    length += Math.hypot(bx - ax, by - ay);
  }
  return length;
}
