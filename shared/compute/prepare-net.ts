import { cellsOf, type NetCells } from '#shared/compute/cells/cells.ts';
import { NO_QUANTITY_DOUBT, netDoubtOf, quantityDoubtOf } from '#shared/compute/doubt/net-doubt.ts';
import type { NetDoubt } from '#shared/compute/doubt/point-doubt.ts';
import type { FieldMemory } from '#shared/compute/field/field-memory.ts';
import { fieldsOnDemand } from '#shared/compute/field/strip-fields.ts';
import { withholdsFigures } from '#shared/compute/findings.ts';
import { boundaryEdges } from '#shared/compute/net/boundary-edges.ts';
import { countChannels } from '#shared/compute/net/channels.ts';
import {
  extentOf,
  questionCellRatio,
  questionHeadwater,
  questionLevels,
  questionPermeability,
  questionUnitWeight,
} from '#shared/compute/net/input-questions.ts';
import { type IntervalQuestions, questionIntervals } from '#shared/compute/net/interval-questions.ts';
import { headsOf, type NetHeads } from '#shared/compute/net/net-heads.ts';
import { linesOfKind } from '#shared/compute/net/net-lines.ts';
import { modelNet, type NetModel } from '#shared/compute/net/net-model.ts';
import { quantitiesOf } from '#shared/compute/net/quantities.ts';
import { type PlacedPoint, placePoint } from '#shared/compute/net/read-point.ts';
import type { ReadingGround } from '#shared/compute/net/reading-ground.ts';
import { solidBodies } from '#shared/compute/net/solid-bodies.ts';
import { questionUpstream } from '#shared/compute/net/upstream-side.ts';
import { checkWaterline } from '#shared/compute/net/waterline.ts';
import { netCheckOf } from '#shared/compute/net-check/net-check.ts';
import { questionNetCheck } from '#shared/compute/net-check/net-check-findings.ts';
import { readPhreatic } from '#shared/compute/phreatic/read-phreatic.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { SetOut } from '#shared/compute/set-out.ts';
import type { SingleInputs } from '#shared/compute/single-inputs.ts';
import { anisotropyOf } from '#shared/compute/soils/anisotropy.ts';
import { type SoilGround, soilGroundOf } from '#shared/compute/soils/soil-ground.ts';
import { steadyTraces } from '#shared/compute/steady-traces.ts';
import {
  findingOnSheet,
  tracesInWorkingFrame,
  type WorkingFrame,
  workingFrameOf,
} from '#shared/compute/working-frame.ts';
import { entitiesOf, type FlowNetDocument, singleOf } from '#shared/contract/document.ts';
import type { Finding, NetReading } from '#shared/contract/reading.ts';
import type { QuantityDoubt } from '#shared/contract/reading-doubt.ts';
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
  readonly soils: SoilGround;
  readonly ground: ReadingGround;
  readonly quantities: NetReading['quantities'];
  readonly findings: readonly Finding[];
  /** Its places are on the sheet. */
  readonly netCheck: NetCheckReading;
  /** In the working frame; null in a section without a phreatic line. */
  readonly phreatic: PhreaticReading | null;
  readonly doubt: QuantityDoubt;
  /** Pairs of head lines between which one seems to be missing. */
  readonly wide: IntervalQuestions['wide'];
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
  memory: FieldMemory | null = null,
): PreparedNet {
  const { water, count } = inputs;
  const frame = workingFrameOf(sheetMap, anisotropyOf(document, inputs.permeability, setOut.impliedRatio));
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
  const soils = soilGroundOf(working, frame, model, inputs, setOut.impliedRatio);
  const counted = { ...inputs, permeability: soils.permeability };
  const { quantities, findings: quantityFindings } = quantitiesOf(
    { order: model.order, heads, channels },
    counted,
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
    relativeK: soils.relativeK,
    hasCommonSection: frame.kind !== 'none',
    toSheet: frame.toSheet,
  });
  const phreatic = readPhreatic(model, heads, map, count.tracingAccuracyPx, levelUnit);
  const intervals = questionIntervals({
    model,
    cells,
    heads,
    enteredRatio: count.cellRatio,
    statedChannels: count.channels,
    accuracyPx: count.tracingAccuracyPx,
    relativeK: soils.relativeK,
  });
  const netFindings = [
    ...model.findings,
    ...heads.findings,
    ...waterlineFindings(model, heads, map, inputs, levelUnit),
    ...phreatic.findings,
    ...questionUpstream(singleOf(document, 'setOut')?.value.upstream ?? null, model.potentials, map),
    ...questionLevels(water, model.potentials),
    ...questionHeadwater(water.headwater, extentOf(model.lines, map), document.unitSystem),
    ...questionUnitWeight(water.gammaW, document.unitSystem),
    ...questionPermeability(soils.permeability),
    ...questionCellRatio(count.cellRatio),
    ...soils.findings,
    ...channels.findings,
    ...quantityFindings,
    ...intervals.findings,
  ];
  const findings = [
    ...setOut.findings,
    ...netFindings.map((found) => findingOnSheet(found, frame)),
    ...questionNetCheck(netCheck, document.unitSystem),
  ];
  const doubt = netDoubtOf(document, setOut, frame, model, heads, inputs);
  const finished = !withholdsFigures(findings) && heads.count !== null;
  return {
    frame,
    working,
    model,
    heads,
    cells,
    netCheck,
    soils,
    ground: {
      ...groundOf(model, heads, frame, soils, doubt, inputs, levelUnit, memory),
      lacksLine: intervals.wide.length > 0,
    },
    doubt: finished ? quantityDoubtOf(doubt, quantities, netCheck.cells, counted) : NO_QUANTITY_DOUBT,
    quantities,
    findings,
    phreatic: phreatic.reading,
    wide: intervals.wide,
    finished,
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
  frame: WorkingFrame,
  soils: SoilGround,
  doubt: NetDoubt,
  inputs: SingleInputs,
  levelUnit: string,
  memory: FieldMemory | null,
): Omit<ReadingGround, 'lacksLine'> {
  const shapes = (...kinds: Parameters<typeof linesOfKind>[1][]) =>
    linesOfKind(model.lines, ...kinds).map((line) => line.shape);
  const fieldGround = {
    map: frame.map,
    heads,
    walls: model.walls.map((wall) => wall.shape),
    freeFaces: model.potentials
      .filter((potential) => potential.level === null)
      .map((potential) => potential.shape),
    soilBoundaries: soils.boundaries,
    tensorAt: soils.tensorAt,
    slack: slackOf(inputs),
  };
  return {
    ...fieldGround,
    strips: model.strips,
    edges: boundaryEdges(model),
    fieldOf: fieldsOnDemand(fieldGround, memory),
    bodies: solidBodies(shapes('impervious'), shapes('equipotential'), model.reach),
    phreaticLines: shapes('phreaticLine'),
    faces: shapes('ground', 'submergedFace', 'outflowFace'),
    tracingAccuracyPx: inputs.count.tracingAccuracyPx,
    gammaW: inputs.water.gammaW,
    levelUnit,
    doubt,
    toSheet: (place) => frame.toSheet(place),
    unequal: heads.count?.unequal ?? false,
  };
}
