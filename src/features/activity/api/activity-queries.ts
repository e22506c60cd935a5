import { infiniteQueryOptions } from '@tanstack/react-query';
import { getJson } from '#client/lib/http.ts';
import { pageOf } from '#shared/contract/common.ts';
import { eventDto } from '#shared/contract/dams.ts';

const eventPage = pageOf(eventDto);

export const activityKeys = {
  root: ['activity'] as const,
  dam: (damId: string) => ['activity', 'dam', damId] as const,
};

/** What happened on a dam, newest first, page by page. */
export const damActivityQuery = (damId: string) =>
  infiniteQueryOptions({
    queryKey: activityKeys.dam(damId),
    queryFn: ({ pageParam, signal }) =>
      getJson(`/dams/${damId}/events`, eventPage, { query: { cursor: pageParam }, signal }),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.nextCursor ?? undefined,
  });
