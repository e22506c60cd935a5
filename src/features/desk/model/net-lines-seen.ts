import type { FamilyLine } from '#shared/compute/cells/cells-beside.ts';
import { familyOf } from '#shared/compute/cells/right-angles.ts';
import { joinTouching } from '#shared/compute/geometry/join-touching.ts';
import { type Polyline, polylineOf } from '#shared/compute/geometry/polyline.ts';
import { type LinearMap, mapped } from '#shared/compute/linear-map.ts';
import {
  entitiesOf,
  type FlowNetDocument,
  type SheetPoint,
  type TracedLine,
} from '#shared/contract/document.ts';

export type SeenLine = { readonly id: string; readonly value: TracedLine; readonly shape: Polyline };

/** The finished lines of a net in working pixels, one by one, and those of its two families with their pieces joined. */
export type NetLinesSeen = {
  readonly lines: readonly SeenLine[];
  readonly families: readonly FamilyLine[];
};

/** Shapes are kept as long as the points are, so that a change of one line measures that line alone. */
const shapes = new WeakMap<readonly SheetPoint[], { map: LinearMap; shape: Polyline | null }>();
const seen = new WeakMap<
  FlowNetDocument['entities'],
  { map: LinearMap; without: string; net: NetLinesSeen }
>();

/** Points of the sheet as a line in working pixels; null when they are no line yet. */
export function shapeThrough(points: readonly SheetPoint[], map: LinearMap): Polyline | null {
  return polylineOf(points.map(([x, y]) => mapped(map, x, y)));
}

/**
 * The lines of a document but the one being drawn or dragged. `map`: sheet to working pixels; `reach`: how near ends of
 * boundary pieces lie that belong together, working pixels.
 */
export function netLinesSeen(
  document: FlowNetDocument,
  without: string,
  map: LinearMap,
  reach: number,
): NetLinesSeen {
  const known = seen.get(document.entities);
  if (known !== undefined && sameMap(known.map, map) && known.without === without) return known.net;
  const lines = entitiesOf(document, 'line').flatMap(({ id, value }): SeenLine[] => {
    const shape = id !== without && value.finished ? keptShape(value.points, map) : null;
    return shape === null ? [] : [{ id, value, shape }];
  });
  const net = { lines, families: withPiecesJoined(lines, reach) };
  seen.set(document.entities, { map, without, net });
  return net;
}

function keptShape(points: readonly SheetPoint[], map: LinearMap): Polyline | null {
  const known = shapes.get(points);
  if (known !== undefined && sameMap(known.map, map)) return known.shape;
  const shape = shapeThrough(points, map);
  shapes.set(points, { map, shape });
  return shape;
}

/** A base is often traced in pieces, and a face together with the bed before it: a cell may lie across the joint. */
function withPiecesJoined(lines: readonly SeenLine[], reach: number): FamilyLine[] {
  const joined: Array<FamilyLine & { readonly joins: string | null }> = [];
  for (const { id, value, shape } of lines) {
    const family = familyOf(value.line);
    if (family === null) continue;
    const isNet = value.line === 'equipotential' || value.line === 'flowLine';
    joined.push({ id, family, shape, joins: isNet ? null : `${value.line} ${value.water} ${value.head}` });
  }
  for (let i = 0; i < joined.length; i += 1) {
    for (let k = i + 1; k < joined.length; k += 1) {
      const [a, b] = [joined[i]!, joined[k]!];
      const shape = a.joins !== null && a.joins === b.joins ? joinTouching(a.shape, b.shape, reach) : null;
      if (shape === null) continue;
      joined[i] = { ...a, shape };
      joined.splice(k, 1);
      // The longer piece may reach one that was passed over before.
      k = i;
    }
  }
  return joined;
}

function sameMap(a: LinearMap, b: LinearMap): boolean {
  return a === b || a.every((entry, i) => entry === b[i]);
}
