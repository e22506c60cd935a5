import { infiniteQueryOptions } from '@tanstack/react-query';
import { getJson } from '#client/lib/http.ts';
import { pageOf } from '#shared/contract/common.ts';
import { eventDto } from '#shared/contract/dams.ts';
import type { EventFilter } from '#shared/contract/events.ts';

const eventPage = pageOf(eventDto);

export const activityKeys = {
  root: ['activity'] as const,
  dam: (damId: string) => ['activity', 'dam', damId] as const,
  /** Under the people's own key, so that it is loaded again with them. */
  people: ['people', 'activity'] as const,
};

/** What happened, newest first, page by page. */
const eventsQuery = (path: string, queryKey: readonly unknown[], filter: EventFilter = {}) =>
  infiniteQueryOptions({
    queryKey: [...queryKey, filter],
    queryFn: ({ pageParam, signal }) =>
      getJson(path, eventPage, { query: { ...filter, cursor: pageParam }, signal }),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.nextCursor ?? undefined,
  });

export type ActivityQuery = ReturnType<typeof eventsQuery>;

export const damActivityQuery = (damId: string, filter: EventFilter = {}) =>
  eventsQuery(`/dams/${damId}/events`, activityKeys.dam(damId), filter);

/** What belongs to no dam: accounts, invitations, passwords. For who manages people. */
export const peopleActivityQuery = () => eventsQuery('/events', activityKeys.people);
