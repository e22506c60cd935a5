import * as z from 'zod/mini';
import { id } from '#shared/contract/common.ts';
import { type EventFilter, eventAbout } from '#shared/contract/events.ts';

const DAY_MS = 24 * 60 * 60 * 1000;
const FIELDS = { person: id, about: eventAbout, from: z.iso.date(), to: z.iso.date() } as const;
export type ActivityFilterName = keyof typeof FIELDS;
/** As the address holds them: days of the reader's calendar, both included. */
export type ActivityFilters = { [Name in ActivityFilterName]?: z.output<(typeof FIELDS)[Name]> };

/** The filters that an address holds; what cannot be is as if it were not there. */
export function activityFiltersIn(address: URLSearchParams): ActivityFilters {
  const filters: Record<string, unknown> = {};
  for (const name of Object.keys(FIELDS) as ActivityFilterName[]) {
    const parsed = z.safeParse(FIELDS[name], address.get(name));
    if (parsed.success) filters[name] = parsed.data;
  }
  return filters;
}

/** What the server is asked for: moments instead of the reader's days. */
export function eventFilterOf({ from, to, ...same }: ActivityFilters): EventFilter {
  return {
    ...same,
    ...(from ? { from: new Date(`${from}T00:00:00`).toISOString() } : {}),
    ...(to ? { until: startOfNextDay(to) } : {}),
  };
}

/** Noon of the next day lies in it whether that day has 23 hours or 25. */
function startOfNextDay(day: string): string {
  const next = new Date(new Date(`${day}T12:00:00`).getTime() + DAY_MS);
  next.setHours(0, 0, 0, 0);
  return next.toISOString();
}
