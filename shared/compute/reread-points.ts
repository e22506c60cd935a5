import { compareMeasured } from '#shared/compute/compare-measured.ts';
import type { FieldMemory } from '#shared/compute/field/field-memory.ts';
import { fieldsOnDemand } from '#shared/compute/field/strip-fields.ts';
import { liesAt, type MovedNet, withLineMoved } from '#shared/compute/net/moved-line.ts';
import { linesOfKind, netLinesOf } from '#shared/compute/net/net-lines.ts';
import { type PlacedPoint, readPoint } from '#shared/compute/net/read-point.ts';
import { solidBodies } from '#shared/compute/net/solid-bodies.ts';
import type { PreparedNet } from '#shared/compute/prepare-net.ts';
import { type KeptNet, pointsByNet, pointsOnSheet } from '#shared/compute/read-net.ts';
import { singleInputs } from '#shared/compute/single-inputs.ts';
import { steadyTraces } from '#shared/compute/steady-traces.ts';
import { tracesInWorkingFrame } from '#shared/compute/working-frame.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NetReading } from '#shared/contract/reading.ts';

/** The reading points of a net and how they compare with what was measured, ahead of the whole reading. */
export type PointsRead = Pick<NetReading, 'points' | 'measured'>;

/** Ids of the entities that are not as before, and which of them is an equipotential whose vertices moved. */
export type SmallChange = { readonly changed: readonly string[]; readonly moved: string | null };

/**
 * Reads the points of a net again after a small change, from what the whole reading of before has left: where reading
 * points were changed, those; where one equipotential was moved, the points in the strips beside it. The order and the count of before are taken to hold, so that the whole net is to be
 * read after all; where that finds them changed, or withholds, it stands. Null when more than that may have changed.
 */
export function rereadPoints(
  document: FlowNetDocument,
  { changed, moved }: SmallChange,
  kept: KeptNet,
  memory: FieldMemory,
): PointsRead | null {
  if (kept === null) return null;
  const { ground } = kept.prepared;
  const accuracyPx = singleInputs(document).count.tracingAccuracyPx;
  const working = workingWith(document, changed, kept.prepared, accuracyPx);
  const net = moved === null ? unmoved(kept.prepared) : movedNet(kept.prepared, working, moved, accuracyPx);
  if (net === null) return null;
  const prepared = onNet({ ...kept.prepared, working }, net, memory);
  if (prepared.ground.bodies.length !== ground.bodies.length) return null;
  const byNet = pointsByNet(prepared, (point) => {
    const before = kept.points.get(point.id);
    const stands =
      before !== undefined && isSamePlace(point, before.point) && !isTouched(point, net, prepared);
    return stands ? before.reading : readPoint(point, prepared.ground);
  });
  const points = pointsOnSheet(document, prepared, byNet);
  return { points, measured: compareMeasured(document, points) };
}

/** The traces in working pixels, only what changed carried there anew. */
function workingWith(
  document: FlowNetDocument,
  changed: readonly string[],
  { working, frame }: PreparedNet,
  accuracyPx: number,
): FlowNetDocument {
  const anew = Object.fromEntries(Object.entries(document.entities).filter(([id]) => changed.includes(id)));
  const moved = steadyTraces(tracesInWorkingFrame({ ...document, entities: anew }, frame), accuracyPx);
  const entities = { ...working.entities };
  for (const id of changed) delete entities[id];
  return { ...document, entities: { ...entities, ...moved.entities } };
}

function unmoved({ model }: PreparedNet): MovedNet {
  return { model, touched: [] };
}

/** Where soils differ, a line that moves may change which of them the net lies in. */
function movedNet(
  { model, soils, ground }: PreparedNet,
  working: FlowNetDocument,
  moved: string,
  accuracyPx: number,
): MovedNet | null {
  if (ground.tensorAt !== null || soils.boundaries.length > 0) return null;
  return withLineMoved(model, netLinesOf(working), moved, accuracyPx);
}

function onNet(prepared: PreparedNet, { model }: MovedNet, memory: FieldMemory): PreparedNet {
  const shapes = (kind: 'impervious' | 'equipotential') =>
    linesOfKind(model.lines, kind).map((line) => line.shape);
  const ground = {
    ...prepared.ground,
    strips: model.strips,
    fieldOf: fieldsOnDemand(prepared.ground, memory),
    bodies: solidBodies(shapes('impervious'), shapes('equipotential'), model.reach),
  };
  return { ...prepared, model, ground };
}

/** The very value of before, whatever its place in the schedule: the value holds the place and the name. */
function isSamePlace(now: PlacedPoint, before: PlacedPoint): boolean {
  return now.value === before.value;
}

function isTouched({ sheetAt }: PlacedPoint, { touched }: MovedNet, { ground }: PreparedNet): boolean {
  return sheetAt !== null && liesAt(touched, sheetAt, ground.slack);
}
