import { sheetPx } from '#shared/compute/frames.ts';
import { polylineOf, verticesOf } from '#shared/compute/geometry/polyline.ts';
import { thinned } from '#shared/compute/geometry/thin.ts';
import { type OutlineFace, outlineFaces } from '#shared/compute/independent/section-outline.ts';
import {
  failure,
  type SectionChain,
  type SectionCondition,
  type SectionFailure,
  type SectionProblem,
  type SectionSoil,
} from '#shared/compute/independent/section-problem.ts';
import { chainsOfTraces, type TracedChain } from '#shared/compute/independent/traced-chains.ts';
import { linesOfKind, type NetLine, netLinesOf } from '#shared/compute/net/net-lines.ts';
import { type Potential, potentialsOf } from '#shared/compute/net/potentials.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import { readSetOut } from '#shared/compute/set-out.ts';
import { type SingleInputs, singleInputs } from '#shared/compute/single-inputs.ts';
import { ratioOf } from '#shared/compute/soils/anisotropy.ts';
import { steadyTraces } from '#shared/compute/steady-traces.ts';
import { permeabilityPerSecond } from '#shared/compute/units.ts';
import { type EntityOf, entitiesOf, type FlowNetDocument } from '#shared/contract/document.ts';

/**
 * The section of a document as a problem of its own. `hasPermeability`: false where no permeability is given; then it is
 * 1, heads are right, and flows are to be multiplied by it. `usesPhreaticLine`: true where only the traced phreatic line
 * closes the outline; then it is taken as it is drawn, and no free surface is looked for.
 */
export type SectionOfDocument = {
  readonly ok: true;
  readonly problem: SectionProblem;
  readonly hasPermeability: boolean;
  readonly usesPhreaticLine: boolean;
};

/** Pixels, and tracing accuracies, by which traced lines may miss one another. */
const REACH_PX = 6;
const REACH_ACCURACIES = 5;

/**
 * The seepage problem that a document's boundaries, water levels and permeabilities pose; equipotentials, flow lines and
 * typed counts are not looked at. Its outline is made of the submerged faces, faces of outflow, drains, ground and
 * impervious lines; of the faces of the plane that they enclose those are the section that touch the water that enters
 * and a place where it leaves. Lengths in the document's unit, permeability in that unit per second; pieces have the
 * ids of their lines. Where the outline is open the failure says where: the engineer closes it with an impervious line.
 */
export function sectionOfDocument(document: FlowNetDocument): SectionOfDocument | SectionFailure {
  const { map, findings, impliedRatio } = readSetOut(document);
  if (map === null) return failure('nothing-drawn', findings[0]?.text ?? 'Set out the section first.');
  const inputs = singleInputs(document);
  const { tracingAccuracyPx } = inputs.count;
  const lines = netLinesOf(steadyTraces(document, tracingAccuracyPx));
  const { all: potentials, findings: wanting } = potentialsOf(lines, map, inputs.water, tracingAccuracyPx);
  const [first] = wanting.filter(({ weight }) => weight === 'missing' || weight === 'wrong');
  if (first !== undefined)
    return failure('no-head', first.text, first.at === null ? null : placeOf(map, first.at));
  const soils = soilsOf(document, inputs, map, impliedRatio);
  if (soils === null)
    return failure('bad-figure', 'A soil has no permeability. Enter it for every soil of the section.');
  const base: Base = {
    soils: soils.list,
    soilBoundaries: linesOfKind(lines, 'soilBoundary').map((line) =>
      line.value.points.map((at) => placeOf(map, at)),
    ),
    inner: [],
    unconfined: isUnconfined(lines, potentials),
  };
  const traces = tracesOf(lines, potentials).map((trace) => simplified(trace, tracingAccuracyPx));
  const reach = Math.max(REACH_PX, REACH_ACCURACIES * tracingAccuracyPx);
  const without = closedProblem(base, chainsOfTraces(traces, map, reach), potentials, reach * map.unitsPerPx);
  if (!('ok' in without)) return whole(without, soils.given, false);
  const phreatic = linesOfKind(lines, 'phreaticLine').map((line) =>
    simplified(closedTrace(line), tracingAccuracyPx),
  );
  if (phreatic.length === 0) return without;
  const confined = { ...base, unconfined: false };
  const withLine = closedProblem(
    confined,
    chainsOfTraces([...traces, ...phreatic], map, reach),
    potentials,
    reach * map.unitsPerPx,
  );
  return 'ok' in withLine ? without : whole(withLine, soils.given, true);
}

type Base = Omit<SectionProblem, 'boundary' | 'inside'>;

function whole(
  problem: SectionProblem,
  hasPermeability: boolean,
  usesPhreaticLine: boolean,
): SectionOfDocument {
  return { ok: true, problem, hasPermeability, usesPhreaticLine };
}

function placeOf(map: SectionMap, at: readonly [number, number]): [number, number] {
  const [offset, elevation] = map.toSection(sheetPx(at[0], at[1]));
  return [offset, elevation];
}

/** A section with a traced phreatic line, or from which water comes out freely, has a free surface. */
function isUnconfined(lines: readonly NetLine[], potentials: readonly Potential[]): boolean {
  return (
    linesOfKind(lines, 'phreaticLine').length > 0 ||
    potentials.some((each) => conditionOf(each).kind === 'freeOutflow')
  );
}

function conditionOf({ line, level }: Potential): SectionCondition {
  const isFree = line.kind === 'outflowFace' || (line.kind === 'drain' && line.value.head === null);
  return isFree || level === null
    ? { kind: 'freeOutflow', id: line.id }
    : { kind: 'head', id: line.id, head: level };
}

/**
 * Boundaries with their heads on their wetted part, and all lines of the outline closed: what sticks out of the water
 * bounds the section too.
 */
function tracesOf(lines: readonly NetLine[], potentials: readonly Potential[]): TracedChain[] {
  const held = potentials.map((each) => ({ shape: each.shape, condition: conditionOf(each) }));
  const dry = linesOfKind(lines, 'submergedFace').filter((line) =>
    potentials.some((each) => each.line === line && each.shape !== line.shape),
  );
  return [...held, ...[...linesOfKind(lines, 'impervious', 'ground'), ...dry].map(closedTrace)];
}

function closedTrace({ id, shape }: NetLine): TracedChain {
  return { shape, condition: { kind: 'closed', id } };
}

/** A trace without the vertices that say no more than the tracing accuracy allows: each would be a corner of the mesh. */
function simplified({ shape, condition }: TracedChain, accuracyPx: number): TracedChain {
  return { shape: polylineOf(thinned(verticesOf(shape), accuracyPx / 2)) ?? shape, condition };
}

/**
 * Length of a boundary that a face must have, so that chinks between ends that nearly meet do not pass for the section:
 * three times the reach in which ends are joined, or half of a shorter boundary.
 */
function leastContact(boundary: readonly SectionChain[], id: string, reach: number): number {
  const own = boundary.filter(({ condition }) => condition.kind !== 'closed' && condition.id === id);
  let length = 0;
  for (const { points } of own)
    points.forEach(([x, z], i) => {
      if (i > 0) length += Math.hypot(x - points[i - 1]![0], z - points[i - 1]![1]);
    });
  return Math.min(3 * reach, length / 2);
}

/** The problem with the faces that make up the section; a failure with the place when the outline is open. */
function closedProblem(
  base: Base,
  boundary: readonly SectionChain[],
  potentials: readonly Potential[],
  reach: number,
): SectionProblem | SectionFailure {
  const found = outlineFaces({ ...base, boundary });
  if ('ok' in found) return found;
  const touches = ({ lengths }: OutlineFace, role: Potential['role']) =>
    [...lengths].some(([{ kind, id }, length]) => {
      const potential = potentials.find(({ line }) => line.id === id);
      return kind !== 'closed' && potential?.role === role && length >= leastContact(boundary, id, reach);
    });
  const inside = found.faces.filter((face) => touches(face, 'headwater') && touches(face, 'outlet'));
  if (inside.length > 0) return { ...base, boundary, inside: inside.map(({ place }) => place) };
  // Walls may end inside the section; a boundary that carries water, or the ground, may not.
  const [loose] = [...found.looseEnds].sort((a, b) => rankOf(a.condition) - rankOf(b.condition));
  return failure(
    'outline-open',
    'The outline of the section is not closed from the headwater to the outlet. Draw what is missing of it as impervious line, at a distance where it hardly matters if the ground goes on.',
    loose?.at ?? null,
  );
}

function rankOf({ kind }: SectionCondition): number {
  return kind === 'closed' ? 1 : 0;
}

/** The soils of the section, that of all the rest first; null when one of several has no permeability. */
function soilsOf(
  document: FlowNetDocument,
  { permeability }: SingleInputs,
  map: SectionMap,
  implied: number | null,
): { list: SectionSoil[]; given: boolean } | null {
  const placed = entitiesOf(document, 'soil').filter(({ value }) => value.places.length > 0);
  const perSecond = (soil: EntityOf<'permeability'> | EntityOf<'soil'>, k: number) =>
    permeabilityPerSecond(k, soil.unit, document.unitSystem);
  if (permeability.k === null && placed.length > 0) return null;
  const list: SectionSoil[] = [];
  const add = (
    id: string,
    soil: EntityOf<'permeability'> | EntityOf<'soil'>,
    places: SectionSoil['places'],
  ) => {
    const kh = soil.k === null ? 1 : perSecond(soil, soil.k);
    const ratio = implied ?? ratioOf(soil, null);
    list.push({ id, kh, kv: kh / ratio, dipDeg: implied === null ? soil.dipDeg : 0, places });
  };
  add('permeability', permeability, []);
  for (const { id, value } of placed) {
    if (value.k === null) return null;
    add(
      id,
      value,
      value.places.map((at) => placeOf(map, at)),
    );
  }
  return { list, given: permeability.k !== null };
}
