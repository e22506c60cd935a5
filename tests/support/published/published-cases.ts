import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import cases from './cases.json' with { type: 'json' };

/** An outside value with the tolerance that it bears: a part of it, or an amount. */
export type Expected = { readonly value: number; readonly rel?: number; readonly abs?: number };

/** A check value from outside the project. */
export type PublishedCase = {
  readonly id: string;
  readonly source: string;
  readonly how: 'read' | 'computed' | 'fromMemory' | 'practice';
  readonly inputs: Readonly<Record<string, number | readonly number[] | ReadonlyArray<readonly number[]>>>;
  readonly expected: Readonly<Record<string, Expected>>;
};

/** The project's own copy of the published check values. */
export const PUBLISHED_CASES = cases as unknown as readonly PublishedCase[];

/** The published case of an id, which must be there. */
export function publishedCase(id: string): PublishedCase {
  const found = PUBLISHED_CASES.find((each) => each.id === id);
  if (found === undefined) throw new Error(`There is no published case ${id}.`);
  return found;
}

/** An input that is one number. */
export function inputOf({ id, inputs }: PublishedCase, name: string): number {
  const value = inputs[name];
  if (typeof value !== 'number') throw new Error(`Case ${id} has no number ${name}.`);
  return value;
}

/** Expected values are listed with so many figures. */
const LISTED_FIGURES = 9;

/**
 * How far a value may lie from the expected one: its tolerance, and besides half a unit of the last figure with which it
 * is listed. Case 7-04 needs the latter: Tx is 1050003.7145 by exact fractions and 1050003.72 in nine figures.
 */
export function allowance({ value, rel, abs }: Expected): number {
  const tolerance = Math.max(abs ?? 0, Math.abs(value) * (rel ?? 0));
  const last = value === 0 ? 0 : 10 ** (Math.floor(Math.log10(Math.abs(value))) - (LISTED_FIGURES - 1));
  return tolerance + last / 2;
}

type ListedCase = {
  readonly id: string;
  readonly expected: Readonly<
    Record<string, { readonly value: number; readonly tol_rel?: number; readonly tol_abs?: number }>
  >;
};

/** The list of published checks beside the checkout, or null where it is absent. */
export function listedCases(): readonly ListedCase[] | null {
  const file = path.resolve(
    import.meta.dirname,
    '..',
    '..',
    '..',
    '..',
    'shared',
    'checks',
    'published.json',
  );
  if (!existsSync(file)) return null;
  return (JSON.parse(readFileSync(file, 'utf8')) as { cases: ListedCase[] }).cases;
}
