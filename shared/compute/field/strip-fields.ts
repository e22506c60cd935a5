import type { FieldMemory } from '#shared/compute/field/field-memory.ts';
import { type StripField, solveStrip } from '#shared/compute/field/strip-field.ts';
import { distanceToPolyline } from '#shared/compute/geometry/polyline.ts';
import type { HeadOfLine } from '#shared/compute/net/net-heads.ts';
import { elevationAt } from '#shared/compute/net/potentials.ts';
import type { ReadingGround } from '#shared/compute/net/reading-ground.ts';
import type { Strip } from '#shared/compute/net/strips.ts';

/** The solved field of a strip; null where it cannot be meshed or solved. */
export type FieldOfStrip = (strip: Strip) => StripField | null;

/** What the fields of the strips are solved from. */
export type FieldGround = Pick<
  ReadingGround,
  'map' | 'heads' | 'walls' | 'freeFaces' | 'soilBoundaries' | 'tensorAt' | 'slack'
>;

/** Solves a strip the first time it is asked for, and keeps it; what `memory` has of earlier readings is not solved. */
export function fieldsOnDemand(ground: FieldGround, memory: FieldMemory | null): FieldOfStrip {
  const solved = new Map<Strip, StripField | null>();
  return (strip) => {
    const known = solved.get(strip);
    if (known !== undefined) return known;
    const solve = () => solveOn(strip, ground);
    const field = memory === null ? solve() : memory.fieldOf(strip, ground, solve);
    solved.set(strip, field);
    return field;
  };
}

function solveOn(strip: Strip, ground: FieldGround): StripField | null {
  const before = ground.heads.byId.get(strip.before);
  const after = ground.heads.byId.get(strip.after);
  if (before === undefined || after === undefined) return null;
  const elevation = (x: number, y: number) => elevationAt(ground.map, x, y);
  const headOn = (line: HeadOfLine) => (x: number, y: number) => line.head ?? elevation(x, y);
  // A boundary with a head of its own that the flow passes is held as a free face is, only at another head.
  const beside = (x: number, y: number) =>
    strip.held.find(({ shape }) => distanceToPolyline(shape, x, y) <= ground.slack);
  const headBeside = (x: number, y: number) =>
    ground.heads.byId.get(beside(x, y)?.id ?? '')?.head ?? elevation(x, y);
  const around = { ...ground, freeFaces: [...ground.freeFaces, ...strip.held.map(({ shape }) => shape)] };
  return solveStrip(
    strip,
    { before: headOn(before), after: headOn(after), free: headBeside },
    around,
    ground.tensorAt,
  );
}
