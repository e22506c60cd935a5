import { plainText } from '#client/lib/figures.ts';
import type { RegisterKind, RegisterRow, RegisterSort, RegisterState } from '#shared/contract/register.ts';
import { registerState } from '#shared/contract/register.ts';
import { inLanguage } from './language.ts';

const KINDS: Record<RegisterKind, string> = { drawing: 'Drawing', section: 'Section', net: 'Net' };
const KINDS_SHOWN: Record<RegisterKind, string> = { drawing: 'Drawings', section: 'Sections', net: 'Nets' };
const STATES: Record<RegisterState, string> = {
  preparing: 'being prepared',
  unusable: 'file cannot be used',
  bare: 'no net yet',
  draft: 'draft',
  sent: 'waiting for check',
  returned: 'returned',
  accepted: 'accepted',
};
const SORTS: Record<RegisterSort, string> = {
  number: 'Drawing number',
  newest: 'Latest work first',
  dam: 'Dam',
};
const AT: Record<RegisterKind, string> = { drawing: 'added', section: 'framed', net: 'changed' };

const en = {
  title: 'Register',
  heading: 'Register',
  lead: 'All drawings, sections and nets of your dams.',
  caption: 'Drawings, sections and nets',
  search: 'Search',
  searchHint: 'Numbers, titles, names and notes. The last word may be incomplete.',
  keysHint: 'Press / to search, ↓ and ↑ to go through the rows, Esc to clear the search.',
  clearSearch: 'Clear the search',
  dam: 'Dam',
  kind: 'Kind',
  state: 'State',
  whose: 'Whose',
  sort: 'Order',
  all: 'all',
  everybody: 'everybody’s',
  mine: 'mine',
  putAway: 'Only what was put away',
  sheet: 'Sheet',
  name: 'Drawing, section, net',
  notes: 'Notes',
  who: 'Who',
  when: 'When',
  clear: 'Clear search and filters',
  none: 'There is no drawing on your dams yet. Open a dam to add one.',
  nonePutAway: 'Nothing has been put away.',
  noMatch: 'Nothing matches the search and the filters.',
  more: 'Show more',
  putAwayMark: 'put away',
  foundIn: (note: number) => `Note ${plainText(note)}:`,
  openNotes: (count: number) => `${plainText(count)} open`,
  unreadNotes: (count: number) => `${plainText(count)} new to you`,
  count: (total: number, most: number) => (total > most ? `more than ${plainText(most)}` : plainText(total)),
  rows: (total: string) => `${total} found`,
  kindOf: (kind: RegisterKind) => KINDS[kind],
  kindsOf: (kind: RegisterKind) => KINDS_SHOWN[kind],
  stateOf: (state: RegisterState) => STATES[state],
  sortOf: (sort: RegisterSort) => SORTS[sort],
  at: (kind: RegisterKind, ago: string) => `${AT[kind]} ${ago}`,
} as const;
export const registerText = inLanguage({ en });

/** "accepted B", "draft", "draft, returned": where the work on a row stands. */
export function registerStateText({ states, revisionLabel }: RegisterRow): string {
  const words = registerState.options
    .filter((state) => states.includes(state))
    .map((state) => registerText.stateOf(state))
    .join(', ');
  return revisionLabel && !states.includes('draft') ? `${words} ${revisionLabel}` : words;
}
