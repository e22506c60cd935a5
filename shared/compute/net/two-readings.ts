import type { SheetPx } from '#shared/compute/frames.ts';
import { type HandReading, readByHand } from '#shared/compute/net/hand-rule.ts';
import { CUT_OFF, type LieOfPlace, type Withheld } from '#shared/compute/net/lie-of-place.ts';
import { headWhere } from '#shared/compute/net/net-heads.ts';
import type { ReadingGround } from '#shared/compute/net/reading-ground.ts';
import type { SectionMap } from '#shared/compute/section-map.ts';

type InStrip = Extract<LieOfPlace, { in: 'strip' }>;

/** Head and drops lost at a place by one rule; `dropsLost` counts from the headwater. */
export type RuleReading = { readonly totalHead: number; readonly dropsLost: number };

/** What the field says at a place; `gradient` is (∂h/∂offset, ∂h/∂elevation) in the natural section. */
export type FieldAt = RuleReading & { readonly gradient: readonly [number, number] };

/** A place between two lines, read by hand's rule. Heads where the shortest ways arrive, document length unit. */
export type HandAt = RuleReading & {
  readonly way: HandReading;
  readonly headBefore: number;
  readonly headAfter: number;
  /** Drops lost at the lines before and after. */
  readonly drops: { readonly before: number; readonly after: number };
};

/**
 * Reads a place by hand's rule: h = hᵇ + f·(hᵃ − hᵇ), drops = dᵇ + f·(dᵃ − dᵇ), with f the ratio of the shortest ways
 * to the line before and to both lines; beside a face along which the head varies the drops follow from the head. Withheld when a wall cuts the place off. `at` in working pixels.
 */
export function handAt(at: SheetPx, lie: InStrip, ground: ReadingGround): HandAt | Withheld {
  const way = readByHand(lie.strip, at, ground.walls, ground.slack);
  if (way === null) return CUT_OFF;
  const { before, after } = lie;
  const headBefore = headWhere(ground.heads, before, way.strip.beforeShape, way.beforeS);
  const headAfter = headWhere(ground.heads, after, way.strip.afterShape, way.afterS);
  const totalHead = headBefore + way.fraction * (headAfter - headBefore);
  const varies = before.head === null || after.head === null;
  const dropsLost = varies
    ? dropsAt(totalHead, lie, ground)
    : before.drops + way.fraction * (after.drops - before.drops);
  const drops = { before: before.drops, after: after.drops };
  return { way, headBefore, headAfter, drops, totalHead, dropsLost };
}

/**
 * Reads a place by the field between the two lines: the head that satisfies Laplace's equation there. On a face of free
 * outflow h = z. `at` in working pixels. Null when the strip could not be solved, withheld where walls part the place
 * from both lines.
 */
export function fieldAt(at: SheetPx, lie: InStrip, ground: ReadingGround): FieldAt | Withheld | null {
  const field = ground.fieldOf(lie.strip);
  if (field === null) return null;
  const found = field.at(at[0], at[1], ground.slack);
  if (found === null) return CUT_OFF;
  const totalHead = lie.onFreeFace ? ground.map.toSection(at)[1] : found.head;
  return {
    totalHead,
    dropsLost: dropsAt(totalHead, lie, ground),
    gradient: naturalGradient(found.gradient, ground.map),
  };
}

/**
 * Drops lost at a head between two lines: by the heads of both, or, beside a face along which the head varies, from the
 * line that has one head at the head per drop of the net.
 */
function dropsAt(head: number, { before, after }: InStrip, { heads }: ReadingGround): number {
  if (before.head !== null && after.head !== null && before.head !== after.head) {
    return before.drops + ((before.head - head) / (before.head - after.head)) * (after.drops - before.drops);
  }
  const { drops, head: from } = before.head === null ? after : before;
  return drops + ((from ?? head) - head) / (heads.count?.headPerDrop ?? Number.NaN);
}

/** A gradient by pixels as one by offset and elevation: the inverse transpose of the map's linear part. */
export function naturalGradient([gx, gy]: readonly [number, number], map: SectionMap): [number, number] {
  const [a, b, c, d] = map.linear;
  const determinant = a * d - b * c;
  return [(d * gx - c * gy) / determinant, (a * gy - b * gx) / determinant];
}
