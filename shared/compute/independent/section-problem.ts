import type { Pair } from '#shared/compute/geometry/predicates.ts';

/**
 * What holds along a piece of outline or a line inside a section. `head`: held at a total head (elevation of the
 * head); `freeOutflow`: water may come out at h = z and may not enter; `closed`: nothing flows through.
 */
export type SectionCondition =
  | { readonly kind: 'head'; readonly id: string; readonly head: number }
  | { readonly kind: 'freeOutflow'; readonly id: string }
  | { readonly kind: 'closed'; readonly id: string };

/** A polyline in section coordinates: offset, elevation; any one length unit for a whole problem. */
export type SectionChain = { readonly points: readonly Pair[]; readonly condition: SectionCondition };

/**
 * A soil. `kh`, `kv`: permeability along and across the bedding, one unit for all soils, above 0; `dipDeg`: dip of the
 * bedding, degrees, positive where it falls towards growing offsets. `places`: one place in each region that
 * `soilBoundaries` part off for it.
 */
export type SectionSoil = {
  readonly id: string;
  readonly kh: number;
  readonly kv: number;
  readonly dipDeg: number;
  readonly places: readonly Pair[];
};

/**
 * Steady seepage through a plane section of a given extent (what is drawn; nothing goes on beyond it). `boundary`:
 * chains that together close the outline, in any order and direction. `inner`: walls of no thickness (`closed`) or
 * drains (`head`, `freeOutflow`) inside it. The first of `soils` fills all that no other claims. `inside`: places in
 * the faces of the outline that make up the section; left out, every face is inside that is reached across an odd
 * number of outlines. `unconfined`: a free surface is looked for, above which no water flows.
 */
export type SectionProblem = {
  readonly boundary: readonly SectionChain[];
  readonly inner: readonly SectionChain[];
  readonly soilBoundaries: readonly (readonly Pair[])[];
  readonly soils: readonly SectionSoil[];
  readonly inside?: readonly Pair[];
  readonly unconfined: boolean;
};

/** Why a section cannot be solved. `text` says what happened and what to do; `at`: offset and elevation of the place. */
export type SectionFailure = {
  readonly ok: false;
  readonly code:
    | 'nothing-drawn'
    | 'bad-figure'
    | 'outline-open'
    | 'tangled'
    | 'no-head'
    | 'contradictory-heads'
    | 'too-intricate'
    | 'dry'
    | 'no-rest';
  readonly text: string;
  readonly at: Pair | null;
};

export function failure(code: SectionFailure['code'], text: string, at: Pair | null = null): SectionFailure {
  return { ok: false, code, text, at };
}
