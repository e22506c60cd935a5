import type { Pair } from '#shared/compute/geometry/predicates.ts';
import { thinned } from '#shared/compute/geometry/thin.ts';
import { contourLines } from '#shared/compute/independent/contour-lines.ts';
import { cutStiffness } from '#shared/compute/independent/cut-element.ts';
import { FieldReader } from '#shared/compute/independent/field-at.ts';
import { type HeadField, type HeadProblem, headField } from '#shared/compute/independent/head-field.ts';
import { headProblemOf } from '#shared/compute/independent/head-problem.ts';
import { shapeOf } from '#shared/compute/independent/quadratic-element.ts';
import type { QuadraticMesh } from '#shared/compute/independent/quadratic-mesh.ts';
import { OUTSIDE, type SectionOutline } from '#shared/compute/independent/section-outline.ts';
import { failure, type SectionFailure } from '#shared/compute/independent/section-problem.ts';
import { coarsestSize, fineCorners, sizeField } from '#shared/compute/independent/size-field.ts';
import { refine } from '#shared/compute/mesh/refine.ts';

/** Where pressure is zero, and a place in each body of water below; in the frame. */
export type FreeSurface = {
  readonly lines: readonly (readonly Pair[])[];
  readonly wetPlaces: readonly Pair[];
};

/** Of the mesh on which the surface is looked for; a section too intricate for it is meshed less well. */
const MOST_VERTICES = 4000;
/** Permeability above the free surface, in parts of that below. */
const DRY_PART = 1e-4;
/**
 * Part of the new pressure taken over in a round, on the first and the refined mesh: the whole makes the exit swing to
 * and fro. Where a round brings no rest, less is taken from then on, down to the least: where the surface stands
 * upright, at a level drain, a little pressure moves it far.
 */
const TAKEN = [0.6, 0.5] as const;
const LEAST_TAKEN = [0.15, 0.2] as const;
/**
 * Rounds on the first and the refined mesh. Of the pressures of the last ones the mean is taken, as the exit may go on
 * swinging by a side of the mesh.
 */
const MOST_ROUNDS = [30, 22] as const;
const MEAN_OF = 8;
/** Turns in which the faces of outflow follow the pressure within a round; the next round goes on with them. */
const MOST_TURNS = 2;
/** Change of pressure head in a round, in parts of the range of heads, at which the surface rests. */
const RESTS = [2e-3, 2e-4] as const;
/** A surface that still moves by this part of the range after the last round has not been found. */
const RESTLESS = 0.02;
/** Size of elements at the ends of the surface, in parts of those elsewhere. */
const END_SIZE = 0.04;

/**
 * The free surface of an unconfined section, on a mesh that stays while the surface moves through it: above it, where
 * the pressure is negative, next to no water passes; the pressure of one round tells where the next one's surface lies
 * (extended-pressure method, Brezis, Kinderlehrer and Stampacchia 1978; Bathe and Khoshgoftaar 1979), elements that it
 * cuts being integrated over their wet part. On faces of free outflow h = z as far as water comes out. The mesh is
 * refined once where the surface ends.
 */
export function freeSurface(outline: SectionOutline, elements: number): FreeSurface | SectionFailure {
  const size = coarsestSize(outline, elements);
  const corners = fineCorners(outline);
  const options = { wanted: (region: number) => region !== OUTSIDE, mostVertices: MOST_VERTICES };
  refine(outline.mesh, { ...options, sizeAt: sizeField(corners, size) });
  const first = headProblemOf(outline);
  const rough = settle(first, new Float64Array(first.mesh.x.length).fill(1), 0);
  if ('ok' in rough) return rough;
  const ends = contourLines(first.mesh, decidedPressure(first, rough.pressure), 0).flatMap((line) => [
    line[0]!,
    line.at(-1)!,
  ]);
  const atEnds = ends.map(([x, y]) => ({
    x,
    y,
    exponent: 1,
    reach: size,
    singular: false,
    finest: END_SIZE,
  }));
  refine(outline.mesh, { ...options, sizeAt: sizeField([...corners, ...atEnds], size) });
  const second = headProblemOf(outline);
  const reader = new FieldReader(first.mesh);
  const start = second.mesh.x.map(
    (x, node) => reader.valueAt(rough.pressure, [x, second.mesh.y[node]!]) ?? 0,
  );
  const found = settle(second, start, 1);
  return 'ok' in found ? found : surfaceOf(second, found, size);
}

type Settled = { readonly pressure: Float64Array };

/** Repeats rounds from a first pressure until it rests; `stage` 0 on the first mesh, 1 on the refined one. */
function settle(problem: HeadProblem, first: Float64Array, stage: 0 | 1): Settled | SectionFailure {
  const { mesh, elevations } = problem;
  const range = rangeOfHeads(problem);
  let pressure = first;
  let open: HeadField['open'] | undefined;
  let change = Number.POSITIVE_INFINITY;
  const last: Float64Array[] = [];
  let taken: number = TAKEN[stage];
  let best = Number.POSITIVE_INFINITY;
  for (let round = 0; round < MOST_ROUNDS[stage]; round += 1) {
    const head = headField(problem, cutElements(problem, pressure), open, MOST_TURNS);
    if (head === null)
      return failure(
        'no-head',
        'A part of the section is cut off from every water level. Check its outline.',
      );
    open = head.open;
    change = 0;
    const next = new Float64Array(mesh.x.length);
    head.values.forEach((value, node) => {
      const now = value - elevations[node]!;
      const isHeld = !Number.isNaN(head.held[node]!);
      next[node] = isHeld ? now : pressure[node]! + taken * (now - pressure[node]!);
      if (now > 0 || pressure[node]! > 0) change = Math.max(change, Math.abs(now - pressure[node]!));
    });
    pressure = next;
    if (change > 0.9 * best) taken = Math.max(LEAST_TAKEN[stage], 0.75 * taken);
    best = Math.min(best, change);
    if (change < RESTS[stage] * range) return { pressure };
    if (round >= MOST_ROUNDS[stage] - MEAN_OF) last.push(pressure);
  }
  if (change < RESTLESS * range)
    return {
      pressure: pressure.map((_, node) => last.reduce((sum, each) => sum + each[node]!, 0) / last.length),
    };
  return failure(
    'no-rest',
    'No free surface was found that stays where it is. Check levels, drains and faces of outflow.',
  );
}

/**
 * From the lowest place where water may come out, or the lowest head, to the highest head; a tenth of the section's
 * height where that is more, as in a section with one level.
 */
function rangeOfHeads({ mesh, conditions, elevations }: HeadProblem): number {
  let [low, high] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
  for (const { label, nodes } of mesh.sides) {
    const condition = conditions[label];
    if (condition?.kind === 'head') {
      low = Math.min(low, condition.head);
      high = Math.max(high, condition.head);
    }
    if (condition?.kind === 'freeOutflow') for (const node of nodes) low = Math.min(low, elevations[node]!);
  }
  const [least, most] = [Math.min, Math.max].map((of) => elevations.reduce((a, b) => of(a, b)));
  return Math.max(high - low, 0.1 * (most! - least!));
}

function cutElements({ mesh, tensorOf }: HeadProblem, pressure: Float64Array): Float64Array {
  const count = mesh.regions.length;
  const all = new Float64Array(36 * count);
  const own = new Float64Array(6);
  for (let n = 0; n < count; n += 1) {
    for (let i = 0; i < 6; i += 1) own[i] = pressure[mesh.elements[6 * n + i]!]!;
    cutStiffness(shapeOf(mesh, n), tensorOf(n), own, DRY_PART, all.subarray(36 * n, 36 * n + 36));
  }
  return all;
}

/** Lines of zero pressure, drawn to the ends of heads that they nearly meet, and a place in each supplied body of water. */
function surfaceOf(problem: HeadProblem, { pressure }: Settled, size: number): FreeSurface | SectionFailure {
  const { mesh } = problem;
  const decided = decidedPressure(problem, pressure);
  const wetPlaces = suppliedBodies(problem, pressure);
  if (wetPlaces.length === 0)
    return failure(
      'dry',
      'No water stands in the section: its levels lie below the outline. Check the levels.',
    );
  const ends = waterlines(problem, size);
  const snapped = (place: Pair): Pair =>
    ends.find(([x, y]) => Math.hypot(x - place[0], y - place[1]) < 0.1 * size) ?? place;
  const lines = contourLines(mesh, decided, 0)
    .filter((line) => lengthOf(line) > size)
    .map((line) => thinned([snapped(line[0]!), ...line.slice(1, -1), snapped(line.at(-1)!)], 1e-3 * size));
  return { lines, wetPlaces };
}

/**
 * The pressure, that on faces of outflow, where it is zero, being set to the side of the element behind: the surface
 * does not run along a drain.
 */
function decidedPressure({ mesh, conditions }: HeadProblem, pressure: Float64Array): Float64Array {
  const decided = pressure.slice();
  const tiny = 1e-9 * pressure.reduce((most: number, each) => Math.max(most, Math.abs(each)), 0);
  const wet = new Set<number>();
  for (const { element, label, nodes } of mesh.sides) {
    if (conditions[label]?.kind !== 'freeOutflow') continue;
    let behind = 0;
    for (let i = 0; i < 6; i += 1) behind += pressure[mesh.elements[6 * element + i]!]!;
    for (const node of nodes) {
      if (Math.abs(pressure[node]!) > tiny) continue;
      if (behind > 0) wet.add(node);
      decided[node] = wet.has(node) ? tiny : -tiny;
    }
  }
  return decided;
}

function lengthOf(line: readonly Pair[]): number {
  return line.slice(1).reduce((sum, [x, y], i) => sum + Math.hypot(x - line[i]![0], y - line[i]![1]), 0);
}

/** Places at which a held head equals the elevation: waterlines. */
function waterlines({ mesh, conditions, elevations }: HeadProblem, size: number): Pair[] {
  const found: Pair[] = [];
  for (const { nodes, label } of mesh.sides) {
    const condition = conditions[label];
    if (condition?.kind !== 'head') continue;
    for (const node of [nodes[0], nodes[2]])
      if (Math.abs(condition.head - elevations[node]!) < 1e-3 * size)
        found.push([mesh.x[node]!, mesh.y[node]!]);
  }
  return found;
}

/** For each body of wholly wet elements that touches a held head the middle of its deepest element. */
function suppliedBodies({ mesh, conditions }: HeadProblem, pressure: Float64Array): Pair[] {
  const isWet = (n: number) => lowest(mesh, pressure, n) > 0;
  const atNode = new Map<number, number[]>();
  for (let n = 0; n < mesh.regions.length; n += 1) {
    if (!isWet(n)) continue;
    for (let i = 0; i < 6; i += 1) {
      const node = mesh.elements[6 * n + i]!;
      atNode.set(node, [...(atNode.get(node) ?? []), n]);
    }
  }
  const seen = new Set<number>();
  const places: Pair[] = [];
  for (const { element, label } of mesh.sides) {
    if (conditions[label]?.kind !== 'head' || seen.has(element) || !isWet(element)) continue;
    const open = [element];
    seen.add(element);
    let deepest = element;
    for (let n = open.pop(); n !== undefined; n = open.pop()) {
      if (lowest(mesh, pressure, n) > lowest(mesh, pressure, deepest)) deepest = n;
      for (let i = 3; i < 6; i += 1) {
        for (const next of atNode.get(mesh.elements[6 * n + i]!)!) {
          if (seen.has(next)) continue;
          seen.add(next);
          open.push(next);
        }
      }
    }
    places.push(middleOf(mesh, deepest));
  }
  return places;
}

function lowest({ elements }: QuadraticMesh, pressure: Float64Array, n: number): number {
  let least = Number.POSITIVE_INFINITY;
  for (let i = 0; i < 6; i += 1) least = Math.min(least, pressure[elements[6 * n + i]!]!);
  return least;
}

function middleOf({ x, y, elements }: QuadraticMesh, n: number): Pair {
  const [a, b, c] = [elements[6 * n]!, elements[6 * n + 1]!, elements[6 * n + 2]!];
  return [(x[a]! + x[b]! + x[c]!) / 3, (y[a]! + y[b]! + y[c]!) / 3];
}
