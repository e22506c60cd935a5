import { clippedPart } from '#shared/compute/geometry/clip-line.ts';
import { indexLines, type LineIndex } from '#shared/compute/geometry/line-index.ts';
import type { SheetPoint } from '#shared/contract/document.ts';

/** Parts of a line, from the end at which its label would stand, that may carry it instead. */
const PARTS = [0.15, 0.3, 0.45, 0.6, 0.75, 0.9];

type Line = { readonly id: string; readonly points: readonly SheetPoint[] };
/** Width and height of a label's box, pixels or points of what is drawn on. */
type Size = { readonly widthPx: number; readonly heightPx: number };

export type PlacesAlong = {
  /** Places on a line, in pixels of what is drawn on, at which a label of its own would cover no other line. */
  of(lineId: string, from: SheetPoint, size: Size): Iterable<readonly [number, number]>;
  /** The same places whatever lies there. */
  over(lineId: string, from: SheetPoint): Iterable<readonly [number, number]>;
  /** True when a box with its middle at a place, in pixels of what is drawn on, lies over another line than its own. */
  coversAnother(lineId: string, place: SheetPoint, size: Size): boolean;
};

/** Lines as places for their labels. `zoom`: pixels or points of what is drawn on to a pixel of the sheet. */
export function placesAlong(linesOf: () => readonly Line[], zoom: number): PlacesAlong {
  let known: { lines: readonly Line[]; index: LineIndex; byId: ReadonlyMap<string, Line> } | null = null;

  // Most labels find room at their line's end: the index is made for the first that does not.
  function ready() {
    if (known !== null) return known;
    const lines = linesOf();
    const byId = new Map(lines.map((line) => [line.id, line]));
    known = { lines, index: indexLines(lines.map(({ points }) => points)), byId };
    return known;
  }

  function coversAnother(lineId: string, [x, y]: SheetPoint, size: Size): boolean {
    const { lines, index } = ready();
    const [width, height] = [size.widthPx / zoom, size.heightPx / zoom];
    const box = [x - width / 2, y - height / 2, width, height] as const;
    return index
      .within(box[0], box[1], box[0] + width, box[1] + height)
      .some(({ line, a, b }) => lines[line]!.id !== lineId && clippedPart([...a], [...b], box) !== null);
  }

  function* placesOn(lineId: string, from: SheetPoint): Iterable<SheetPoint> {
    const line = ready().byId.get(lineId);
    if (line === undefined || line.points.length < 2) return;
    const first = line.points[0]!;
    const points = first[0] === from[0] && first[1] === from[1] ? line.points : [...line.points].reverse();
    yield* placesAt(points, PARTS);
  }

  return {
    *of(lineId, from, size) {
      for (const place of placesOn(lineId, from)) {
        if (!coversAnother(lineId, place, size)) yield [place[0] * zoom, place[1] * zoom];
      }
    },
    coversAnother: (lineId, [x, y], size) => coversAnother(lineId, [x / zoom, y / zoom], size),
    *over(lineId, from) {
      for (const [x, y] of placesOn(lineId, from)) yield [x * zoom, y * zoom];
    },
  };
}

/** Places at parts of the length of a run of points, the parts ascending. */
function placesAt(points: readonly SheetPoint[], parts: readonly number[]): SheetPoint[] {
  const lengths = points.slice(1).map(([x, y], i) => Math.hypot(x - points[i]![0], y - points[i]![1]));
  const whole = lengths.reduce((sum, length) => sum + length, 0);
  const places: SheetPoint[] = [];
  let passed = 0;
  let i = 0;
  for (const part of parts) {
    while (i < lengths.length - 1 && passed + lengths[i]! < part * whole) {
      passed += lengths[i]!;
      i += 1;
    }
    const [a, b] = [points[i]!, points[i + 1]!];
    const t = lengths[i]! > 0 ? Math.min(1, (part * whole - passed) / lengths[i]!) : 0;
    places.push([a[0] + t * (b[0] - a[0]), a[1] + t * (b[1] - a[1])]);
  }
  return places;
}
