import { areAt, lengthOf, type Polyline, polylineOf } from '#shared/compute/geometry/polyline.ts';
import {
  entitiesOf,
  type FlowNetDocument,
  type LineKind,
  type TracedLine,
} from '#shared/contract/document.ts';

/** Shapes are kept as long as the points are: a line that was not touched is not measured again. */
const shapes = new WeakMap<TracedLine['points'], Polyline>();

function shapeOf({ points }: TracedLine): Polyline | null {
  const known = shapes.get(points);
  // Whoever changes a vertex in place must not be given the shape of before.
  if (known !== undefined && areAt(points, known.xy)) return known;
  const shape = polylineOf(points);
  if (shape !== null) shapes.set(points, shape);
  return shape;
}

/** A finished traced line with its shape in base-raster pixels. */
export type NetLine = {
  readonly id: string;
  readonly kind: LineKind;
  readonly value: TracedLine;
  readonly shape: Polyline;
};

/**
 * The finished lines of a document that have a length, in id order. Lines still being drawn, and lines of fewer than
 * two distinct places, are left out.
 */
export function netLinesOf(document: FlowNetDocument): NetLine[] {
  const lines: NetLine[] = [];
  for (const { id, value } of entitiesOf(document, 'line')) {
    const shape = value.finished ? shapeOf(value) : null;
    if (shape !== null) lines.push({ id, kind: value.line, value, shape });
  }
  return lines;
}

/** The lines of some kinds, order kept. */
export function linesOfKind(lines: readonly NetLine[], ...kinds: readonly LineKind[]): NetLine[] {
  return lines.filter((line) => kinds.includes(line.kind));
}

/** Middle value of the lengths of lines in pixels; 0 when there are none. */
export function medianLength(lines: readonly NetLine[]): number {
  const lengths = lines.map((line) => lengthOf(line.shape)).sort((a, b) => a - b);
  return lengths[lengths.length >> 1] ?? 0;
}
