import { apiUrl } from './http.ts';
import { localeStore } from './locale.ts';

/** The address of a table, with the decimal mark that the person is used to. `query`: what it is to hold. */
export function csvUrl(path: string, query: Record<string, string | undefined> = {}): string {
  return apiUrl(path, localeStore.getState().mark === ',' ? { ...query, decimal: 'comma' } : query);
}
