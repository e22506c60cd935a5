import { compareMeasured } from '#shared/compute/compare-measured.ts';
import { NO_QUANTITY_DOUBT } from '#shared/compute/doubt/net-doubt.ts';
import { doubtOverSection, setOutCauses } from '#shared/compute/doubt/place-doubt.ts';
import type { FieldMemory } from '#shared/compute/field/field-memory.ts';
import {
  extentOf,
  questionCellRatio,
  questionPermeability,
  questionPlace,
} from '#shared/compute/net/input-questions.ts';
import { markWide } from '#shared/compute/net/interval-questions.ts';
import type { NetHeads } from '#shared/compute/net/net-heads.ts';
import { linesOfKind, netLinesOf } from '#shared/compute/net/net-lines.ts';
import type { NetModel } from '#shared/compute/net/net-model.ts';
import { quantitiesOf } from '#shared/compute/net/quantities.ts';
import { type PlacedPoint, readPoint, withholdPoint } from '#shared/compute/net/read-point.ts';
import { findTangles } from '#shared/compute/net/tangles.ts';
import { phreaticOnSheet } from '#shared/compute/phreatic/read-phreatic.ts';
import { type PreparedNet, placedPoints, prepareNet } from '#shared/compute/prepare-net.ts';
import { profilesRead } from '#shared/compute/profiles/read-profiles.ts';
import { exitsRead } from '#shared/compute/quantities/exits.ts';
import { NO_STABILITY, stabilityRead } from '#shared/compute/quantities/stability.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { readSetOut, type SetOut } from '#shared/compute/set-out.ts';
import { type SingleInputs, singleInputs } from '#shared/compute/single-inputs.ts';
import { findingOnSheet, frameReadingOf, type WorkingFrame } from '#shared/compute/working-frame.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { Finding, LineReading, NetReading, PointReading } from '#shared/contract/reading.ts';

/**
 * Reads a whole flow net: set-out, order and count of the lines, quantities, and every reading point.
 *
 * Pure and total: it answers every document that the schema admits, and never throws. While something is missing or
 * wrong the state is `unfinished` and no point has a figure; the findings say what to do and where. Heads and
 * elevations are in the document's length unit, pressures in kPa (SI) or lb/ft² (US); figures are unrounded. `memory`
 * spares work that an earlier reading has done and alters no figure.
 */
export function readNet(document: FlowNetDocument, memory: FieldMemory | null = null): NetReading {
  return readAndKeep(document, memory).reading;
}

/** Each reading point as the net alone tells it, in the working frame, before the findings of the whole net. */
export type PointsByNet = ReadonlyMap<
  string,
  { readonly point: PlacedPoint; readonly reading: PointReading }
>;

/** What a reading was worked out from; null where the net gives no figure. */
export type KeptNet = { readonly prepared: PreparedNet; readonly points: PointsByNet } | null;

/** As `readNet`, with what a later reading may be built on. */
export function readAndKeep(
  document: FlowNetDocument,
  memory: FieldMemory | null,
): { reading: NetReading; kept: KeptNet } {
  const { kept, ...reading } = readLines(document, memory);
  return { reading: { ...reading, measured: compareMeasured(document, reading.points) }, kept };
}

/** All that is read off the lines, before it is held against what was measured. */
type LinesRead = Omit<NetReading, 'measured'> & { readonly kept: KeptNet };

function readLines(document: FlowNetDocument, memory: FieldMemory | null): LinesRead {
  const inputs = singleInputs(document);
  const setOut = withPlaceDoubt(document, readSetOut(document));
  const points = placedPoints(document, setOut.map);
  const tangles = findTangles(netLinesOf(document), inputs.count.tracingAccuracyPx);
  // Nothing is worked out from a tangle: it would take its time over every crossing, and come to nothing.
  if (setOut.map === null || tangles.length > 0) return withoutNet(document, setOut, tangles, inputs, points);
  return readOnSection(document, setOut, setOut.map, inputs, memory);
}

function withPlaceDoubt(document: FlowNetDocument, setOut: SetOut): SetOut {
  const placeDoubt = doubtOverSection(document, setOutCauses(document, setOut));
  return { ...setOut, reading: { ...setOut.reading, placeDoubt } };
}

function withoutNet(
  document: FlowNetDocument,
  setOut: SetOut,
  tangles: readonly Finding[],
  inputs: SingleInputs,
  points: readonly PlacedPoint[],
): LinesRead {
  const findings = [
    ...setOut.findings,
    ...tangles,
    ...questionPermeability(inputs.permeability),
    ...questionCellRatio(inputs.count.cellRatio),
  ];
  return {
    state: 'unfinished',
    findings,
    setOut: setOut.reading,
    lines: linesOfKind(netLinesOf(document), 'equipotential').map(({ id }) => unordered(id)),
    points: points.map((point) => withheldBy(point, findings)),
    quantities: quantitiesOf(null, inputs, document.unitSystem).quantities,
    phreatic: null,
    frame: null,
    soils: null,
    netCheck: null,
    doubt: NO_QUANTITY_DOUBT,
    profiles: profilesRead(document, null, null),
    exits: [],
    stability: NO_STABILITY,
    kept: null,
  };
}

function readOnSection(
  document: FlowNetDocument,
  setOut: SetOut,
  map: SectionMap,
  inputs: SingleInputs,
  memory: FieldMemory | null,
): LinesRead {
  const prepared = prepareNet(document, setOut, map, inputs, memory);
  const { frame, model, heads, quantities, findings, finished } = prepared;
  const byNet = finished ? pointsByNet(prepared, (point) => readPoint(point, prepared.ground)) : null;
  return {
    state: finished ? 'read' : 'unfinished',
    findings: [...findings],
    setOut: setOut.reading,
    lines: linesRead(model, heads),
    points: pointsOnSheet(document, prepared, byNet),
    quantities,
    phreatic: phreaticOnSheet(prepared.phreatic, frame),
    frame: frameReadingOf(frame, map),
    soils: prepared.soils.reading,
    netCheck: prepared.netCheck,
    doubt: prepared.doubt,
    profiles: profilesRead(document, prepared, inputs.water.tailwater),
    exits: exitsRead(prepared),
    stability: stabilityRead(prepared),
    kept: byNet && { prepared, points: byNet },
  };
}

/** The points of a net, each read by `read`. */
export function pointsByNet(
  { working, frame }: PreparedNet,
  read: (point: PlacedPoint) => PointReading,
): PointsByNet {
  return new Map(
    placedPoints(working, frame.map).map((point) => [point.id, { point, reading: read(point) }]),
  );
}

/**
 * The points of a net in the order of the schedule, with what the whole net says of each, places on the sheet. Without
 * `byNet` none has a figure.
 */
export function pointsOnSheet(
  document: FlowNetDocument,
  prepared: PreparedNet,
  byNet: PointsByNet | null,
): PointReading[] {
  const { working, frame, model, findings, wide } = prepared;
  const extent = extentOf(model.lines, frame.map);
  return placedPoints(working, frame.map).map((point) => {
    const read = byNet?.get(point.id)?.reading;
    const reading = read === undefined ? withheldBy(point, findings) : markWide(read, wide);
    const far = questionPlace(point, extent, document.unitSystem);
    return pointOnSheet({ ...reading, findings: [...reading.findings, ...far] }, frame);
  });
}

/** A reading made in the working frame, with its places on the sheet. */
function pointOnSheet(reading: PointReading, frame: WorkingFrame): PointReading {
  if (frame.isSheet) return reading;
  const findings = reading.findings.map((found) => findingOnSheet(found, frame));
  if (reading.sheetAt === null) return { ...reading, findings };
  const [x, y] = frame.toSheet(reading.sheetAt);
  return { ...reading, sheetAt: [x, y], findings };
}

function withheldBy(point: PlacedPoint, findings: readonly Finding[]): PointReading {
  const moved = findings.find((found) => found.code === 'headwaterMoved');
  const first =
    moved ??
    findings.find((found) => found.weight === 'wrong') ??
    findings.find((found) => found.weight === 'missing');
  const code = moved ? 'headwaterMoved' : 'netUnfinished';
  return withholdPoint(
    point,
    code,
    moved ? moved.text : `Net unfinished. ${first?.text ?? 'Nothing has been traced yet.'}`,
  );
}

function unordered(id: string): LineReading {
  return { id, drops: null, head: null, source: 'unordered' };
}

function linesRead(model: NetModel, heads: NetHeads): LineReading[] {
  const boundaries = model.potentials.flatMap(({ id, members }) =>
    members.map((member) => ({ id: member, of: id })),
  );
  const traced = model.equipotentials.flatMap(({ id, members }) =>
    members.map((member) => ({ id: member, of: id })),
  );
  return [...boundaries, ...traced].map(({ id, of }) => {
    const line = heads.byId.get(of);
    if (line !== undefined) return { id, drops: line.drops, head: line.head, source: line.source };
    return { ...numberedByPlace(model, of), id };
  });
}

/** While the count does not stand, a line is numbered by its place along the flow and has no head yet. */
function numberedByPlace(model: NetModel, id: string): LineReading {
  const place = model.order.place.get(id);
  const isEquipotential = model.equipotentials.some((line) => line.id === id);
  if (!isEquipotential || place === undefined) return unordered(id);
  return { id, drops: place, head: null, source: 'counted' };
}
