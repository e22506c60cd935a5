import { createStore } from 'zustand/vanilla';
import type { DecimalMark } from '#shared/text/number-text.ts';

/** Kept in the browser: whoever works at several desks may be used to different signs at each. */
const KEPT_UNDER = 'tracehead numbers and dates';
/** Days before months, and the point: for browsers that do not say what their person is used to. */
const WITHOUT_ANY = 'en-GB';

type LocaleState = {
  /** What the person has chosen; null = as the browser says. */
  readonly chosen: string | null;
  /** The locale in use, as a BCP 47 tag. */
  readonly tag: string;
  readonly mark: DecimalMark;
};

/** How numbers and dates are written for the person at this screen. */
export const localeStore = createStore<LocaleState>(() => stateOf(keptChoice()));

/** Takes another locale, or with null the browser's own; kept for the next visit. */
export function chooseLocale(chosen: string | null): void {
  try {
    if (chosen === null) globalThis.localStorage?.removeItem(KEPT_UNDER);
    else globalThis.localStorage?.setItem(KEPT_UNDER, chosen);
  } catch {
    // A browser that keeps nothing still shows it in this visit.
  }
  localeStore.setState(stateOf(chosen));
}

/** The browser's own locale, or the one taken where it says none. */
export function browserLocale(): string {
  const said = globalThis.navigator?.languages?.[0] ?? globalThis.navigator?.language;
  return said && isLocale(said) ? said : WITHOUT_ANY;
}

/** The decimal mark of a locale; of marks that are neither, as in Arabic script, the point. */
export function markOf(tag: string): DecimalMark {
  const parts = new Intl.NumberFormat(tag, { numberingSystem: 'latn' }).formatToParts(1.5);
  return parts.find((part) => part.type === 'decimal')?.value === ',' ? ',' : '.';
}

function stateOf(chosen: string | null): LocaleState {
  const tag = chosen ?? browserLocale();
  return { chosen, tag, mark: markOf(tag) };
}

function keptChoice(): string | null {
  try {
    const kept = globalThis.localStorage?.getItem(KEPT_UNDER) ?? null;
    return kept !== null && isLocale(kept) ? kept : null;
  } catch {
    return null;
  }
}

function isLocale(tag: string): boolean {
  try {
    return Intl.NumberFormat.supportedLocalesOf([tag]).length > 0;
  } catch {
    return false;
  }
}
