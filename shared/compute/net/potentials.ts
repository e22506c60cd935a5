import { makeFinding } from '#shared/compute/findings.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { lengthOf, type Polyline, vertexOf } from '#shared/compute/geometry/polyline.ts';
import { clipAtLevel } from '#shared/compute/net/clip-at-level.ts';
import { linesOfKind, type NetLine } from '#shared/compute/net/net-lines.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';
import type { EntityOf } from '#shared/contract/document.ts';
import type { Finding } from '#shared/contract/reading.ts';

type WaterLevels = EntityOf<'waterLevels'>;

/** A boundary that carries a head of its own: where water enters the section or leaves it. */
export type Potential = {
  readonly id: string;
  /** Ids of all the lines of which it is made, its own first. */
  readonly members: readonly string[];
  readonly line: NetLine;
  readonly role: 'headwater' | 'outlet';
  /** Wetted part in base-raster pixels. */
  readonly shape: Polyline;
  /** The one head along it; null where the head is the elevation and varies along the boundary. */
  readonly level: number | null;
  /** Head that the water has when it has left here: the level, or the lowest elevation of a face of free outflow. */
  readonly outHead: number;
  /** Words for it inside a sentence. */
  readonly label: string;
};

export type Potentials = { readonly all: Potential[]; readonly findings: Finding[] };

/** A free face or drain counts as level when its elevations differ by less than this part of the head above it. */
const LEVEL_PART = 0.02;

/**
 * The potential boundaries among the traced lines, each with its own head: a submerged face the level of the water
 * on it (clipped at the waterline where it sticks out), the typed one where it has a water of its own, an empty drain
 * and a face of free outflow the elevation along them, a drain under pressure its entered head. The highest of the
 * headwater's faces and of those with a water of their own gives the water; every other boundary takes part as an
 * outlet, which may give water to a lower one. Heads and elevations are in the document's length unit;
 * `accuracyPx` is the tracing accuracy in pixels, below which a difference of elevation means nothing.
 */
export function potentialsOf(
  lines: readonly NetLine[],
  map: SectionMap,
  water: WaterLevels,
  accuracyPx: number,
): Potentials {
  const all: Potential[] = [];
  const findings: Finding[] = [];
  const marked = linesOfKind(lines, 'submergedFace', 'drain', 'outflowFace');
  for (const line of marked) {
    const found =
      line.kind === 'submergedFace'
        ? submerged(line, map, water, accuracyPx)
        : freeOrHeld(line, map, water.headwater, accuracyPx);
    if ('id' in found) all.push(found);
    else findings.push(found.finding);
  }
  return { all: withRoles(all), findings: [...onceEach(findings), ...missingSides(marked, water)] };
}

/** The highest level of a face that gives water is the headwater of the net; lower ones are met along the flow. */
function withRoles(all: readonly Potential[]): Potential[] {
  const givers = all.filter(({ line }) => line.kind === 'submergedFace' && mayGive(line));
  const top = Math.max(...givers.map(({ level }) => level ?? Number.NEGATIVE_INFINITY));
  return all.map((potential) => ({
    ...potential,
    role: givers.includes(potential) && potential.level === top ? 'headwater' : 'outlet',
  }));
}

function mayGive({ value }: NetLine): boolean {
  return value.water === 'headwater' || value.head !== null;
}

/** A level that is missing is asked for once, however many faces want it. */
function onceEach(findings: readonly Finding[]): Finding[] {
  return findings.filter(
    (found, i) => found.weight !== 'missing' || findings.findIndex((each) => each.code === found.code) === i,
  );
}

/** Elevation of a place on the sheet, base-raster pixels to document length unit. */
export function elevationAt(map: SectionMap, x: number, y: number): number {
  return map.toSection(sheetPx(x, y))[1];
}

function submerged(
  line: NetLine,
  map: SectionMap,
  water: WaterLevels,
  accuracyPx: number,
): Potential | { finding: Finding } {
  const level = levelOn(line, water);
  if (typeof level !== 'number') return level;
  const slack = 2 * accuracyPx * map.elevationPerPx;
  const shape = clipAtLevel(line.shape, (x, y) => elevationAt(map, x, y), level + slack);
  if (shape === null) {
    return problem(
      line,
      'wrong',
      'faceAboveWater',
      `The face marked as submerged lies wholly above ${waterOn(line)}. Check the level and the known points.`,
    );
  }
  return {
    id: line.id,
    members: [line.id],
    line,
    role: 'outlet',
    shape,
    level,
    outHead: level,
    label:
      nameOf(line) ??
      (line.value.head === null ? `the ${line.value.water} boundary` : 'the boundary of a water of its own'),
  };
}

/** Level of the water on a submerged face, or what has to be said first. */
function levelOn(line: NetLine, water: WaterLevels): number | { finding: Finding } {
  if (line.value.head !== null) return line.value.head;
  if (line.value.water === null) {
    return problem(
      line,
      'missing',
      'faceWithoutWater',
      'Say whether the submerged face carries the headwater or the tailwater, or type the level of its own water.',
    );
  }
  return (
    water[line.value.water] ??
    problem(
      line,
      'missing',
      `${line.value.water}Missing`,
      `Type the ${line.value.water} level of this load case.`,
    )
  );
}

function waterOn({ value }: NetLine): string {
  return value.head === null ? `the ${value.water}` : 'the level typed for its water';
}

function nameOf(line: NetLine): string | null {
  const name = line.value.name.trim();
  return name === '' ? null : name;
}

function freeOrHeld(
  line: NetLine,
  map: SectionMap,
  headwater: number | null,
  accuracyPx: number,
): Potential | { finding: Finding } {
  const base = {
    id: line.id,
    members: [line.id],
    line,
    role: 'outlet' as const,
    shape: line.shape,
    label: labelOf(line),
  };
  const held = line.kind === 'drain' ? line.value.head : null;
  const { low, high, mean } = elevationsAlong(line.shape, map);
  if (![low, high, mean].every(Number.isFinite)) {
    return problem(
      line,
      'wrong',
      'outletNotFinite',
      'The outlet has no usable elevation. Check the known points.',
    );
  }
  if (held !== null) {
    return held < low - 6 * accuracyPx * map.elevationPerPx
      ? problem(
          line,
          'wrong',
          'drainHeadBelowDrain',
          `The head typed for ${labelOf(line)} lies below the drain itself. Type the elevation to which its water rises, not a depth, or say that the drain is empty.`,
        )
      : { ...base, level: held, outHead: held };
  }
  const allowed = Math.max(
    LEVEL_PART * Math.abs((headwater ?? high) - mean),
    6 * accuracyPx * map.elevationPerPx,
  );
  return high - low <= allowed
    ? { ...base, level: mean, outHead: mean }
    : { ...base, level: null, outHead: low };
}

function labelOf(line: NetLine): string {
  return nameOf(line) ?? (line.kind === 'drain' ? 'the drain' : 'the outflow face');
}

function elevationsAlong(shape: Polyline, map: SectionMap): { low: number; high: number; mean: number } {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  let moment = 0;
  let before = 0;
  for (let i = 0; i < shape.cum.length; i += 1) {
    const z = elevationAt(map, ...vertexOf(shape, i));
    low = Math.min(low, z);
    high = Math.max(high, z);
    if (i > 0) moment += ((z + before) / 2) * (shape.cum[i]! - shape.cum[i - 1]!);
    before = z;
  }
  return { low, high, mean: moment / lengthOf(shape) };
}

function missingSides(marked: readonly NetLine[], water: WaterLevels): Finding[] {
  const findings: Finding[] = [];
  const faces = marked.filter((line) => line.kind === 'submergedFace');
  const ownWaters = faces.filter(({ value }) => value.head !== null).length;
  const carries = (which: 'headwater' | 'tailwater') => faces.some(({ value }) => value.water === which);
  const givesWater = carries('headwater') || ownWaters > 0;
  const takesWater = carries('tailwater') || marked.length > faces.length || ownWaters > 1;
  if (!givesWater) {
    findings.push(
      makeFinding(
        'missing',
        'headwaterBoundaryMissing',
        'Mark the face or bed on which the headwater stands.',
        {
          cell: 'headwater',
        },
      ),
    );
  }
  if (!takesWater && !(carries('headwater') && ownWaters > 0)) {
    findings.push(
      makeFinding(
        'missing',
        'outletMissing',
        'Mark where the water leaves: the tailwater bed, a drain or a face of free outflow.',
        {
          cell: 'outlet',
        },
      ),
    );
  }
  if (water.headwater === null && !givesWater) {
    findings.push(
      makeFinding('missing', 'headwaterMissing', 'Type the headwater level of this load case.', {
        cell: 'headwater',
      }),
    );
  }
  return findings;
}

function problem(line: NetLine, weight: Finding['weight'], code: string, text: string): { finding: Finding } {
  const cell = line.kind === 'submergedFace' && line.value.water !== 'tailwater' ? 'headwater' : 'outlet';
  return {
    finding: makeFinding(weight, code, text, { cell, entityIds: [line.id], at: vertexOf(line.shape, 0) }),
  };
}
