import { withholdsFigures } from '#shared/compute/findings.ts';
import { countChannels } from '#shared/compute/net/channels.ts';
import {
  extentOf,
  questionLevels,
  questionPermeability,
  questionPlace,
} from '#shared/compute/net/input-questions.ts';
import { headsOf, type NetHeads } from '#shared/compute/net/net-heads.ts';
import { linesOfKind, netLinesOf } from '#shared/compute/net/net-lines.ts';
import { modelNet, type NetModel } from '#shared/compute/net/net-model.ts';
import { placeDoubtOf } from '#shared/compute/net/provisional-doubt.ts';
import { quantitiesOf } from '#shared/compute/net/quantities.ts';
import {
  type PlacedPoint,
  placePoint,
  type ReadingGround,
  readPoint,
  withholdPoint,
} from '#shared/compute/net/read-point.ts';
import { checkWaterline } from '#shared/compute/net/waterline.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { readSetOut, type SetOut } from '#shared/compute/set-out.ts';
import { type SingleInputs, singleInputs } from '#shared/compute/single-inputs.ts';
import { entitiesOf, type FlowNetDocument } from '#shared/contract/document.ts';
import type { Finding, LineReading, NetReading, PointReading } from '#shared/contract/reading.ts';

/** The waterline may depart from the headwater by this part of a drop before the readings are withheld. */
const WATERLINE_PART = 0.05;

/**
 * Reads a whole flow net: set-out, order and count of the lines, quantities, and every reading point.
 *
 * Pure and total: it answers every document that the schema admits, and never throws. While something is missing or
 * wrong the state is `unfinished` and no point has a figure; the findings say what to do and where. Heads and
 * elevations are in the document's length unit, pressures in kPa (SI) or lb/ft² (US); figures are unrounded.
 */
export function readNet(document: FlowNetDocument): NetReading {
  const inputs = singleInputs(document);
  const setOut = readSetOut(document);
  const points = entitiesOf(document, 'readingPoint')
    .sort((a, b) => a.value.order - b.value.order || (a.id < b.id ? -1 : 1))
    .map(({ id, value }) => placePoint(id, value, setOut.map));
  if (setOut.map === null) return withoutSetOut(document, setOut, inputs, points);
  return readOnSection(document, setOut, setOut.map, inputs, points);
}

function withoutSetOut(
  document: FlowNetDocument,
  setOut: SetOut,
  inputs: SingleInputs,
  points: readonly PlacedPoint[],
): NetReading {
  const findings = [...setOut.findings, ...questionPermeability(inputs.permeability)];
  return {
    state: 'unfinished',
    findings,
    setOut: setOut.reading,
    lines: linesOfKind(netLinesOf(document), 'equipotential').map(({ id }) => unordered(id)),
    points: points.map((point) => withheldBy(point, findings)),
    quantities: quantitiesOf(null, null, inputs, document.unitSystem).quantities,
  };
}

function readOnSection(
  document: FlowNetDocument,
  setOut: SetOut,
  map: SectionMap,
  inputs: SingleInputs,
  points: readonly PlacedPoint[],
): NetReading {
  const { water, permeability, count } = inputs;
  const model = modelNet(document, map, water, count.tracingAccuracyPx);
  const accuracy = count.tracingAccuracyPx * map.unitsPerPx;
  const heads = headsOf(model, map, water.headwater, count.drops, accuracy);
  const channels = countChannels(model.equipotentials, linesOfKind(model.lines, 'flowLine'), slackOf(inputs));
  const { quantities, findings: quantityFindings } = quantitiesOf(
    heads,
    channels,
    inputs,
    document.unitSystem,
  );
  const findings = [
    ...setOut.findings,
    ...model.findings,
    ...heads.findings,
    ...waterlineFindings(model, heads, map, inputs),
    ...questionLevels(water, model.potentials),
    ...questionPermeability(permeability),
    ...channels.findings,
    ...quantityFindings,
  ];
  const finished = !withholdsFigures(findings) && heads.count !== null;
  const extent = extentOf(model.lines, map);
  const ground = groundOf(model, heads, setOut, map, inputs);
  return {
    state: finished ? 'read' : 'unfinished',
    findings,
    setOut: setOut.reading,
    lines: linesRead(model, heads),
    points: points.map((point) => {
      const reading = finished ? readPoint(point, ground) : withheldBy(point, findings);
      const far = questionPlace(point, extent, document.unitSystem);
      return { ...reading, findings: [...reading.findings, ...far] };
    }),
    quantities,
  };
}

/** Pixels by which a traced line may miss what it is meant to meet. */
function slackOf(inputs: SingleInputs): number {
  return Math.max(2, 2 * inputs.count.tracingAccuracyPx);
}

function waterlineFindings(
  model: NetModel,
  heads: NetHeads,
  map: SectionMap,
  inputs: SingleInputs,
): Finding[] {
  if (heads.headwater === null) return [];
  const { tracingAccuracyPx, knownPointAccuracyPx } = inputs.count;
  const tolerance = Math.max(
    3 * Math.hypot(tracingAccuracyPx, knownPointAccuracyPx) * map.unitsPerPx,
    WATERLINE_PART * (heads.count?.headPerDrop ?? 0),
  );
  return checkWaterline(model.lines, map, heads.headwater, tolerance);
}

function groundOf(
  model: NetModel,
  heads: NetHeads,
  setOut: SetOut,
  map: SectionMap,
  inputs: SingleInputs,
): ReadingGround {
  const { tracingAccuracyPx, knownPointAccuracyPx } = inputs.count;
  const shapes = (...kinds: Parameters<typeof linesOfKind>[1][]) =>
    linesOfKind(model.lines, ...kinds).map((line) => line.shape);
  return {
    map,
    strips: model.strips,
    heads,
    walls: model.walls.map((wall) => wall.shape),
    phreaticLines: shapes('phreaticLine'),
    faces: shapes('ground', 'submergedFace', 'outflowFace'),
    freeFaces: model.potentials
      .filter((potential) => potential.level === null)
      .map((potential) => potential.shape),
    slack: slackOf(inputs),
    gammaW: inputs.water.gammaW,
    placeDoubt: placeDoubtOf(
      setOut.reading.residual,
      knownPointAccuracyPx,
      tracingAccuracyPx,
      map.unitsPerPx,
    ),
    unequal: heads.count?.unequal ?? false,
  };
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
  const traced = model.equipotentials.map(({ id }) => ({ id, of: id }));
  return [...boundaries, ...traced].map(({ id, of }) => {
    const line = heads.byId.get(of);
    if (line !== undefined) return { id, drops: line.drops, head: line.head, source: line.source };
    return numberedByPlace(model, id);
  });
}

/** While the count does not stand, a line is numbered by its place along the flow and has no head yet. */
function numberedByPlace(model: NetModel, id: string): LineReading {
  const place = model.order.place.get(id);
  const isEquipotential = model.equipotentials.some((line) => line.id === id);
  if (!isEquipotential || place === undefined) return unordered(id);
  return { id, drops: place, head: null, source: 'counted' };
}
