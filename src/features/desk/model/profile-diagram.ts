import type { SheetPoint } from '#shared/contract/document.ts';
import type { ProfileReading } from '#shared/contract/reading-quantities.ts';

/** The pore pressure along a profile, set off normal to it: places in base-raster pixels. */
export type ProfileDiagram = {
  /** Outlines between the profile and the ends of its ordinates; one for each stretch that could be read. */
  readonly outlines: readonly (readonly SheetPoint[])[];
  /** The ends of the ordinates, joined. */
  readonly curves: readonly (readonly SheetPoint[])[];
  /** The ordinates themselves, as one way out and back for each stretch. */
  readonly combs: readonly (readonly SheetPoint[])[];
  /** Figures worth a label: both ends and the greatest, each at the end of its ordinate. */
  readonly figures: readonly ProfileFigure[];
};
export type ProfileFigure = { readonly at: SheetPoint; readonly pressure: number; readonly most: boolean };

/** The longest ordinate is this part of the profile's length on the sheet. */
const LONGEST = 0.2;
/** More ordinates than this are not told apart. */
const MOST_ORDINATES = 40;

type Ordinate = { readonly at: SheetPoint; readonly tip: SheetPoint; readonly pressure: number };

/**
 * The pressure diagram of a profile. Ordinates stand on the side of the profile that faces down the sheet, of a steep
 * one to the right, and a pressure below zero on the other side. Where nothing could be read there is a gap. Null for a
 * grid, for fewer than two places, and where no pressure was read.
 */
export function profileDiagram({ samples }: Pick<ProfileReading, 'samples'>): ProfileDiagram | null {
  if (samples.length < 2 || samples.some(({ distance }) => distance === null)) return null;
  const places = samples.map(({ at }): SheetPoint => at);
  const greatest = samples.reduce((most, { porePressure }) => Math.max(most, Math.abs(porePressure ?? 0)), 0);
  const length = places.slice(1).reduce((sum, to, i) => sum + distance(places[i]!, to), 0);
  if (!(length > 0) || samples.every(({ porePressure }) => porePressure === null)) return null;
  const side = sideOf(places);
  const ordinates = samples.map(({ at, porePressure }, i): Ordinate | null => {
    if (porePressure === null) return null;
    const [nx, ny] = normalAt(places, i);
    // The part first: for a greatest pressure near nothing the pixels for a unit of it are no number.
    const reach = greatest > 0 ? side * LONGEST * length * (porePressure / greatest) : 0;
    return { at, tip: [at[0] + nx * reach, at[1] + ny * reach], pressure: porePressure };
  });
  const runs = runsOf(ordinates);
  const every = Math.ceil(samples.length / MOST_ORDINATES);
  return {
    outlines: runs.map((run) => [...run.map(({ at }) => at), ...run.map(({ tip }) => tip).reverse()]),
    curves: runs.map((run) => run.map(({ tip }) => tip)),
    combs: runs.map((run) => run.flatMap(({ at, tip }, i) => (i % every === 0 ? [at, tip, at] : [at]))),
    figures: figuresOf(ordinates.filter((ordinate) => ordinate !== null)),
  };
}

/** Stretches of two ordinates or more without a gap. */
function runsOf(ordinates: readonly (Ordinate | null)[]): Ordinate[][] {
  const runs: Ordinate[][] = [[]];
  for (const ordinate of ordinates) {
    if (ordinate === null) runs.push([]);
    else runs.at(-1)!.push(ordinate);
  }
  return runs.filter((run) => run.length > 1);
}

function figuresOf(read: readonly Ordinate[]): ProfileFigure[] {
  const first = read[0];
  const last = read.at(-1);
  if (first === undefined || last === undefined) return [];
  const most = read.reduce((held, each) => (each.pressure > held.pressure ? each : held), first);
  return [...new Set([first, most, last])].map((each) => ({
    at: each.tip,
    pressure: each.pressure,
    most: each === most,
  }));
}

/** +1 when the left-hand normals of the profile face down the sheet (right, when it is steep), else −1. */
function sideOf(places: readonly SheetPoint[]): 1 | -1 {
  const [from, to] = [places[0]!, places.at(-1)!];
  const [dx, dy] = [to[0] - from[0], to[1] - from[1]];
  const faces = Math.abs(dx) >= Math.abs(dy) ? dx : -dy;
  return faces >= 0 ? 1 : -1;
}

/** Unit normal (−dy, dx) of the profile at a place; at a bend that of the line between both directions. */
function normalAt(places: readonly SheetPoint[], index: number): readonly [number, number] {
  const before = directionFrom(places, index, -1);
  const after = directionFrom(places, index, 1);
  const [dx, dy] = [before[0] + after[0], before[1] + after[1]];
  const length = Math.hypot(dx, dy);
  if (length > 1e-9) return [-dy / length, dx / length];
  return [-after[1], after[0]];
}

/** Unit direction of the profile on one side of a place, along the profile; zero where there is nothing on that side. */
function directionFrom(
  places: readonly SheetPoint[],
  index: number,
  step: 1 | -1,
): readonly [number, number] {
  const here = places[index]!;
  for (let i = index + step; i >= 0 && i < places.length; i += step) {
    const there = places[i]!;
    const length = distance(here, there);
    if (length > 0) return [(step * (there[0] - here[0])) / length, (step * (there[1] - here[1])) / length];
  }
  return [0, 0];
}

function distance(a: SheetPoint, b: SheetPoint): number {
  return Math.hypot(b[0] - a[0], b[1] - a[1]);
}
