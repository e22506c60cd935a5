import type { EventAbout, EventFilter } from '#shared/contract/events.ts';

/** First words of the types of events that are about something. */
const TYPES: Record<EventAbout, readonly string[]> = {
  drawings: ['drawing', 'rendition'],
  nets: ['section', 'net'],
  notes: ['note'],
  checking: ['revision'],
  dam: ['dam', 'member', 'person'],
};

/** SQL that leaves those events `e` which a filter asks for; its values are added to `values`, whose places it takes. */
export function eventCondition(filter: EventFilter, values: unknown[]): string {
  const value = (each: unknown) => `$${values.push(each)}`;
  const parts = ['true'];
  if (filter.person) parts.push(`e.person_id = ${value(filter.person)}::uuid`);
  if (filter.about) parts.push(`split_part(e.type, '.', 1) = ANY (${value(TYPES[filter.about])}::text[])`);
  if (filter.from) parts.push(`e.at >= ${value(filter.from)}::timestamptz`);
  if (filter.until) parts.push(`e.at < ${value(filter.until)}::timestamptz`);
  return parts.join(' AND ');
}
