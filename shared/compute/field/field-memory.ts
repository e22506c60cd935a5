import type { StripField } from '#shared/compute/field/strip-field.ts';
import type { FieldGround } from '#shared/compute/field/strip-fields.ts';
import { sheetPx } from '#shared/compute/frames.ts';
import { boxesMeet, type Polyline } from '#shared/compute/geometry/polyline.ts';
import type { Pair } from '#shared/compute/geometry/predicates.ts';
import type { Strip } from '#shared/compute/net/strips.ts';

/** Strips kept at most; a net has some dozens. */
const MOST_STRIPS = 400;

/**
 * Keeps the solved fields of a net from one reading to the next. A field is given again only when everything it was
 * solved from is the same to the last bit, so that a reading with memory is the reading without.
 */
export class FieldMemory {
  private readonly kept = new Map<
    string,
    { readonly from: Float64Array; readonly field: StripField | null }
  >();

  /** The field of a strip, solved by `solve` unless it was solved from the same before. */
  fieldOf(strip: Strip, ground: FieldGround, solve: () => StripField | null): StripField | null {
    // Which soil lies where is not told by numbers.
    if (ground.tensorAt !== null) return solve();
    const key = `${strip.before} ${strip.after}`;
    const from = groundsOf(strip, ground);
    const known = this.kept.get(key);
    if (known !== undefined && sameNumbers(known.from, from)) return known.field;
    if (this.kept.size >= MOST_STRIPS) this.kept.clear();
    const field = solve();
    this.kept.set(key, { from, field });
    return field;
  }
}

function sameNumbers(a: Float64Array, b: Float64Array): boolean {
  return a.length === b.length && a.every((value, i) => Object.is(value, b[i]));
}

/** Every number on which the field of a strip hangs, lists with their lengths. */
function groundsOf(strip: Strip, ground: FieldGround): Float64Array {
  const { map, heads, slack } = ground;
  const numbers: number[] = [slack, ...map.linear, ...map.toSection(sheetPx(0, 0))];
  const addHead = (id: string) =>
    numbers.push(heads.byId.get(id)?.head ?? Number.NaN, heads.byId.has(id) ? 1 : 0);
  const addFlat = (xy: ArrayLike<number>) => {
    numbers.push(xy.length);
    for (let i = 0; i < xy.length; i += 1) numbers.push(xy[i]!);
  };
  const addNear = (shapes: readonly Polyline[]) => {
    const near = shapes.filter(({ box }) => boxesMeet(box, strip.ring.box, slack));
    numbers.push(near.length);
    for (const { xy } of near) addFlat(xy);
  };
  addHead(strip.before);
  addHead(strip.after);
  addFlat(strip.beforeShape.xy);
  addFlat(strip.afterShape.xy);
  addFlat(strip.ring.xy);
  for (const { points, open } of strip.ways) {
    numbers.push(open ? 1 : 0);
    addFlat(points.flatMap((point: Pair) => [point[0], point[1]]));
  }
  numbers.push(strip.held.length);
  for (const { id, shape } of strip.held) {
    addHead(id);
    addFlat(shape.xy);
  }
  addNear(ground.walls);
  addNear(ground.freeFaces);
  addNear(ground.soilBoundaries);
  return Float64Array.from(numbers);
}
