import { isSameFigure } from '#shared/compute/same-figure.ts';
import type { UnitSystem } from '#shared/contract/document.ts';
import { figureStyle, writtenText } from '#shared/text/figure-style.ts';
import type { Figure, FigureGroup, FigureName, Quantity } from './figure-types.ts';

/** A figure as one of two readings gives it. */
export type Given = { readonly value: number | null; readonly plusMinus: number | null };

/**
 * How two figures stand to one another. `same`: but for the last bits. `shown`: to the last digit shown. `differ`: not
 * even that, or only one has a figure. `none`: neither has.
 */
export type Likeness = 'same' | 'shown' | 'differ' | 'none';

export type FigureBeside = {
  readonly what: FigureName;
  readonly quantity: Quantity;
  readonly digits: number | null;
  readonly one: Given;
  readonly other: Given;
  /** `other` less `one`; null where either has none, or where the two may not be subtracted. */
  readonly difference: number | null;
  readonly values: Likeness;
  readonly plusMinuses: Likeness;
};

export type GroupBeside = {
  readonly kind: FigureGroup['kind'];
  readonly name: string;
  readonly one: FigureGroup | null;
  readonly other: FigureGroup | null;
  readonly figures: readonly FigureBeside[];
};

/** Both lists in the same units, which the figures are written in. */
export type BesideOptions = {
  readonly unitSystem: UnitSystem;
  /** False where the two lists measure levels from different datums. */
  readonly sameDatum: boolean;
};

const NONE: Given = { value: null, plusMinus: null };
const ABOVE_DATUM: readonly Quantity[] = ['elevation', 'totalHead'];

/**
 * The figures of two readings side by side, in the order of the first and then of what only the second has. Groups of
 * one kind belong together when they have the same id, else when they alone have the same name in their reading; those
 * known by no name are matched by id only. Levels above different datums are not subtracted. Pure and total.
 */
export function figuresBeside(
  one: readonly FigureGroup[],
  other: readonly FigureGroup[],
  options: BesideOptions,
): GroupBeside[] {
  const partners = matched(one, other);
  const taken = new Set(partners.values());
  return [
    ...one.map((group) => groupBeside(group, partners.get(group) ?? null, options)),
    ...other.filter((group) => !taken.has(group)).map((group) => groupBeside(null, group, options)),
  ];
}

/** By name only where a person has given it. */
const NAMED: readonly FigureGroup['kind'][] = ['point', 'profile', 'outlet'];

function matched(one: readonly FigureGroup[], other: readonly FigureGroup[]) {
  const partners = new Map<FigureGroup, FigureGroup>();
  const match = (keyOf: (group: FigureGroup) => string | null) => {
    const taken = new Set(partners.values());
    const left = uniqueBy(
      one.filter((group) => !partners.has(group)),
      keyOf,
    );
    const right = uniqueBy(
      other.filter((group) => !taken.has(group)),
      keyOf,
    );
    for (const [key, group] of left) {
      const found = right.get(key);
      if (found) partners.set(group, found);
    }
  };
  match(({ kind, id }) => `${kind} ${id}`);
  match(({ kind, name }) =>
    NAMED.includes(kind) && name.trim() !== '' ? `${kind} ${name.trim().toLowerCase()}` : null,
  );
  return partners;
}

/** What has a key of its own; what shares one, or has none, is left out. */
function uniqueBy(groups: readonly FigureGroup[], keyOf: (group: FigureGroup) => string | null) {
  const found = new Map<string, FigureGroup[]>();
  for (const group of groups) {
    const key = keyOf(group);
    if (key !== null) found.set(key, [...(found.get(key) ?? []), group]);
  }
  return new Map(
    [...found].flatMap(([key, sharing]) => (sharing.length === 1 ? [[key, sharing[0]!] as const] : [])),
  );
}

function groupBeside(
  one: FigureGroup | null,
  other: FigureGroup | null,
  options: BesideOptions,
): GroupBeside {
  const own = new Map((one?.figures ?? []).map((figure) => [figure.what, figure]));
  const theirs = new Map((other?.figures ?? []).map((figure) => [figure.what, figure]));
  const names = [...new Set([...own.keys(), ...theirs.keys()])];
  const shown = (one ?? other)!;
  return {
    kind: shown.kind,
    name: shown.name,
    one,
    other,
    figures: names.map((name) => figureBeside(own.get(name), theirs.get(name), options)),
  };
}

function figureBeside(
  one: Figure | undefined,
  other: Figure | undefined,
  { unitSystem, sameDatum }: BesideOptions,
): FigureBeside {
  const { what, quantity } = (one ?? other)!;
  const [here, there] = [one ?? NONE, other ?? NONE];
  // The finer of the two: a difference must not be hidden by the reading that deserves less.
  const asked = [one?.digits, other?.digits].filter((digits) => typeof digits === 'number');
  const digits = asked.length === 0 ? null : Math.max(...asked);
  const style = figureStyle(quantity, unitSystem, digits);
  const likeness = (a: number | null, b: number | null): Likeness => {
    if (a === null && b === null) return 'none';
    if (a === null || b === null) return 'differ';
    if (isSameFigure(a, b)) return 'same';
    return writtenText(a, style) === writtenText(b, style) ? 'shown' : 'differ';
  };
  const comparable = sameDatum || !ABOVE_DATUM.includes(quantity);
  return {
    what,
    quantity,
    digits,
    one: { value: here.value, plusMinus: here.plusMinus },
    other: { value: there.value, plusMinus: there.plusMinus },
    difference: comparable && here.value !== null && there.value !== null ? there.value - here.value : null,
    values: likeness(here.value, there.value),
    plusMinuses: likeness(here.plusMinus, there.plusMinus),
  };
}

/** Whether anything of a figure differs in what is shown of it. */
export const differs = ({ values, plusMinuses }: Pick<FigureBeside, 'values' | 'plusMinuses'>): boolean =>
  values === 'differ' || plusMinuses === 'differ';
