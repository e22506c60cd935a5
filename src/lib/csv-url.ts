import { apiUrl } from './http.ts';
import { localeStore } from './locale.ts';

/** The address of a table, with the decimal mark that the person is used to. */
export function csvUrl(path: string): string {
  return apiUrl(path, localeStore.getState().mark === ',' ? { decimal: 'comma' } : {});
}
