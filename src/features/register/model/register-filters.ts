import * as z from 'zod/mini';
import { id } from '#shared/contract/common.ts';
import { MAX_SEARCH_LENGTH, registerKind, registerSort, registerState } from '#shared/contract/register.ts';

/** What each member of the address may say; anything else is as if it were not there. */
const FIELDS = {
  q: z.string().check(z.trim(), z.minLength(1), z.maxLength(MAX_SEARCH_LENGTH)),
  dam: id,
  kind: registerKind,
  state: registerState,
  whose: z.union([z.literal('me'), id]),
  archived: z.literal('yes'),
  sort: registerSort,
} as const;
export type FilterName = keyof typeof FIELDS;
export type RegisterFilters = { [Name in FilterName]?: z.output<(typeof FIELDS)[Name]> };

const NAMES = Object.keys(FIELDS) as FilterName[];

/** The filters that an address holds, so that it can be sent to a colleague or kept as a bookmark. */
export function filtersIn(address: URLSearchParams): RegisterFilters {
  const filters: Record<string, unknown> = {};
  for (const name of NAMES) {
    const parsed = z.safeParse(FIELDS[name], address.get(name));
    if (parsed.success) filters[name] = parsed.data;
  }
  return filters;
}

/** The address with one filter changed; an empty value takes it out. Whose it is depends on the dam. */
export function withFilter(address: URLSearchParams, name: FilterName, value: string): URLSearchParams {
  const changed = new URLSearchParams(address);
  if (value === '') changed.delete(name);
  else changed.set(name, value);
  if (name === 'dam' && changed.get('whose') !== 'me') changed.delete('whose');
  return changed;
}

/** Whether anything is left out by them; the order leaves nothing out. */
export const isNarrowed = ({ sort: _, ...narrowing }: RegisterFilters): boolean =>
  Object.keys(narrowing).length > 0;
