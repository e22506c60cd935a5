import { indexLines, type LineIndex } from '#shared/compute/geometry/line-index.ts';
import type { SheetPoint } from '#shared/contract/document.ts';
import { clippedPart } from './clip-line.ts';
import { LABEL_HEIGHT_PX, labelWidthPx } from './label-layout.ts';
import type { SceneItem, SceneLine } from './scene.ts';

/** Parts of a line, from the end at which its label would stand, that may carry it instead. */
const PARTS = [0.15, 0.3, 0.45, 0.6, 0.75, 0.9];

export type PlacesAlong = {
  /** Places on a line, in screen pixels of the whole sheet, at which its label would cover no other line. */
  of(lineId: string, from: SheetPoint, text: string): Iterable<readonly [number, number]>;
};

/** The lines of a scene as places for their labels. `zoom`: screen pixels a pixel of the picture. */
export function placesAlong(items: readonly SceneItem[], zoom: number): PlacesAlong {
  let known: { lines: readonly SceneLine[]; index: LineIndex; byId: ReadonlyMap<string, SceneLine> } | null =
    null;

  // Most labels find room at their line's end: the index is made for the first that does not.
  function ready() {
    if (known !== null) return known;
    const lines = items.filter((item): item is SceneLine => item.shape === 'line');
    const byId = new Map(lines.map((line) => [line.id, line]));
    known = { lines, index: indexLines(lines.map(({ points }) => points)), byId };
    return known;
  }

  function coversAnother(lineId: string, [x, y]: SheetPoint, text: string): boolean {
    const { lines, index } = ready();
    const [width, height] = [labelWidthPx(text) / zoom, LABEL_HEIGHT_PX / zoom];
    const box = [x - width / 2, y - height / 2, width, height] as const;
    return index
      .within(box[0], box[1], box[0] + width, box[1] + height)
      .some(({ line, a, b }) => lines[line]!.id !== lineId && clippedPart([...a], [...b], box) !== null);
  }

  return {
    *of(lineId, from, text) {
      const line = ready().byId.get(lineId);
      if (line === undefined || line.points.length < 2) return;
      const first = line.points[0]!;
      const points = first[0] === from[0] && first[1] === from[1] ? line.points : [...line.points].reverse();
      for (const place of placesAt(points, PARTS)) {
        if (!coversAnother(lineId, place, text)) yield [place[0] * zoom, place[1] * zoom];
      }
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
