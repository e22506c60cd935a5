import { cellsOf, type NetCells } from '#shared/compute/cells/cells.ts';
import { fieldsOnDemand } from '#shared/compute/field/strip-fields.ts';
import { withholdsFigures } from '#shared/compute/findings.ts';
import { countChannels } from '#shared/compute/net/channels.ts';
import {
  extentOf,
  questionCellRatio,
  questionHeadwater,
  questionLevels,
  questionPermeability,
  questionUnitWeight,
} from '#shared/compute/net/input-questions.ts';
import { headsOf, type NetHeads } from '#shared/compute/net/net-heads.ts';
import { linesOfKind } from '#shared/compute/net/net-lines.ts';
import { modelNet, type NetModel } from '#shared/compute/net/net-model.ts';
import { placeDoubtOf } from '#shared/compute/net/provisional-doubt.ts';
import { quantitiesOf } from '#shared/compute/net/quantities.ts';
import { type PlacedPoint, placePoint } from '#shared/compute/net/read-point.ts';
import type { ReadingGround } from '#shared/compute/net/reading-ground.ts';
import { questionSoils } from '#shared/compute/net/soil-boundaries.ts';
import { solidBodies } from '#shared/compute/net/solid-bodies.ts';
import { questionUpstream } from '#shared/compute/net/upstream-side.ts';
import { checkWaterline } from '#shared/compute/net/waterline.ts';
import { netCheckOf } from '#shared/compute/net-check/net-check.ts';
import { questionNetCheck } from '#shared/compute/net-check/net-check-findings.ts';
import { readPhreatic } from '#shared/compute/phreatic/read-phreatic.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { SetOut } from '#shared/compute/set-out.ts';
import type { SingleInputs } from '#shared/compute/single-inputs.ts';
import { type CommonAnisotropy, commonAnisotropy } from '#shared/compute/soils/anisotropy.ts';
import { steadyTraces } from '#shared/compute/steady-traces.ts';
import {
  findingOnSheet,
  tracesInWorkingFrame,
  type WorkingFrame,
  workingFrameOf,
} from '#shared/compute/working-frame.ts';
import { entitiesOf, type FlowNetDocument, singleOf } from '#shared/contract/document.ts';
import type { Finding, NetReading } from '#shared/contract/reading.ts';
import type { NetCheckReading } from '#shared/contract/reading-net-check.ts';
import type { PhreaticReading } from '#shared/contract/reading-phreatic.ts';
import { elevationUnit } from '#shared/text/unit-text.ts';

/** The waterline may depart from the headwater by this part of a drop before the readings are withheld. */
const WATERLINE_PART = 0.05;

/** A set-out net in order and counted, against which points are read by whatever rule. */
export type PreparedNet = {
  /** Model, heads and ground are in its working pixels; the findings have their places on the sheet. */
  readonly frame: WorkingFrame;
  /** The document with its traces in working pixels. */
  readonly working: FlowNetDocument;
  readonly model: NetModel;
  readonly heads: NetHeads;
  readonly cells: NetCells;
  readonly ground: ReadingGround;
  readonly quantities: NetReading['quantities'];
  readonly findings: readonly Finding[];
  /** Its places are on the sheet. */
  readonly netCheck: NetCheckReading;
  /** In the working frame; null in a section without a phreatic line. */
  readonly phreatic: PhreaticReading | null;
  /** True when nothing is missing or wrong, so that figures may be given. */
  readonly finished: boolean;
};

/** The reading points of a document in the order of the schedule, placed on the sheet and in the section. */
export function placedPoints(document: FlowNetDocument, map: SectionMap | null): PlacedPoint[] {
  return entitiesOf(document, 'readingPoint')
    .sort((a, b) => a.value.order - b.value.order || (a.id < b.id ? -1 : 1))
    .map(({ id, value }) => placePoint(id, value, map));
}

/**
 * Orders and counts the net of a document whose section is set out, works out its quantities and gathers every finding
 * about it. Pure and total, as `readNet`.
 */
export function prepareNet(
  document: FlowNetDocument,
  setOut: SetOut,
  sheetMap: SectionMap,
  inputs: SingleInputs,
): PreparedNet {
  const { water, permeability, count } = inputs;
  const frame = workingFrameOf(sheetMap, anisotropyOf(document, inputs, setOut.impliedRatio));
  const working = steadyTraces(tracesInWorkingFrame(document, frame), count.tracingAccuracyPx);
  const { map } = frame;
  const model = modelNet(working, map, water, count.tracingAccuracyPx);
  const accuracy = count.tracingAccuracyPx * map.elevationPerPx;
  const levelUnit = elevationUnit(document.unitSystem, document.datum);
  const heads = headsOf(model, map, water.headwater, count.drops, accuracy);
  const channels = countChannels(
    model.equipotentials,
    linesOfKind(model.lines, 'flowLine'),
    model.order,
    slackOf(inputs),
  );
  const { quantities, findings: quantityFindings } = quantitiesOf(
    { order: model.order, heads, channels },
    inputs,
    document.unitSystem,
  );
  const cells = cellsOf(model, count.tracingAccuracyPx);
  const netCheck = netCheckOf({
    model,
    cells,
    heads,
    enteredRatio: count.cellRatio,
    accuracyPx: count.tracingAccuracyPx,
    gammaW: water.gammaW,
    quantities,
    relativeK: relativeKOf(working),
    hasCommonSection: frame.kind !== 'none',
    toSheet: frame.toSheet,
  });
  const phreatic = readPhreatic(model, heads, map, count.tracingAccuracyPx, levelUnit);
  const netFindings = [
    ...model.findings,
    ...heads.findings,
    ...waterlineFindings(model, heads, map, inputs, levelUnit),
    ...phreatic.findings,
    ...questionUpstream(singleOf(document, 'setOut')?.value.upstream ?? null, model.potentials, map),
    ...questionLevels(water, model.potentials),
    ...questionHeadwater(water.headwater, extentOf(model.lines, map), document.unitSystem),
    ...questionUnitWeight(water.gammaW, document.unitSystem),
    ...questionPermeability(permeability),
    ...questionCellRatio(count.cellRatio),
    ...questionSoils(model),
    ...channels.findings,
    ...quantityFindings,
  ];
  const findings = [
    ...setOut.findings,
    ...netFindings.map((found) => findingOnSheet(found, frame)),
    ...questionNetCheck(netCheck, document.unitSystem),
  ];
  const finished = !withholdsFigures(findings) && heads.count !== null;
  return {
    frame,
    working,
    model,
    heads,
    cells,
    netCheck,
    ground: groundOf(model, heads, setOut, map, inputs, levelUnit),
    quantities,
    findings,
    phreatic: phreatic.reading,
    finished,
  };
}

/** kh/kv and dip of the soils that are said to lie somewhere in the section. */
function anisotropyOf(
  document: FlowNetDocument,
  inputs: SingleInputs,
  impliedRatio: number | null,
): CommonAnisotropy {
  const soils = entitiesOf(document, 'soil').filter(({ value }) => value.places.length > 0);
  return commonAnisotropy([inputs.permeability, ...soils.map(({ value }) => value)], impliedRatio);
}

/** One soil for all cells; where several are placed, which of them a cell lies in is not known here. */
function relativeKOf(document: FlowNetDocument): () => number | null {
  const several = entitiesOf(document, 'soil').some(({ value }) => value.places.length > 0);
  return () => (several ? null : 1);
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
  levelUnit: string,
): Finding[] {
  if (heads.headwater === null) return [];
  const { tracingAccuracyPx, knownPointAccuracyPx } = inputs.count;
  const tolerance = Math.max(
    3 * Math.hypot(tracingAccuracyPx, knownPointAccuracyPx) * map.elevationPerPx,
    WATERLINE_PART * (heads.count?.headPerDrop ?? 0),
  );
  return checkWaterline(model.lines, map, heads.headwater, tolerance, levelUnit);
}

function groundOf(
  model: NetModel,
  heads: NetHeads,
  setOut: SetOut,
  map: SectionMap,
  inputs: SingleInputs,
  levelUnit: string,
): ReadingGround {
  const { tracingAccuracyPx, knownPointAccuracyPx } = inputs.count;
  const shapes = (...kinds: Parameters<typeof linesOfKind>[1][]) =>
    linesOfKind(model.lines, ...kinds).map((line) => line.shape);
  const fieldGround = {
    map,
    heads,
    walls: model.walls.map((wall) => wall.shape),
    freeFaces: model.potentials
      .filter((potential) => potential.level === null)
      .map((potential) => potential.shape),
    soilBoundaries: shapes('soilBoundary'),
    slack: slackOf(inputs),
  };
  return {
    ...fieldGround,
    strips: model.strips,
    fieldOf: fieldsOnDemand(fieldGround),
    bodies: solidBodies(shapes('impervious'), shapes('equipotential'), model.reach),
    phreaticLines: shapes('phreaticLine'),
    faces: shapes('ground', 'submergedFace', 'outflowFace'),
    tracingAccuracyPx: inputs.count.tracingAccuracyPx,
    gammaW: inputs.water.gammaW,
    levelUnit,
    placeDoubt: placeDoubtOf(
      setOut.reading.residual,
      knownPointAccuracyPx,
      tracingAccuracyPx,
      map.elevationPerPx,
    ),
    unequal: heads.count?.unequal ?? false,
  };
}
