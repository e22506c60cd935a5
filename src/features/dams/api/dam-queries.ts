import { queryOptions } from '@tanstack/react-query';
import { getJson } from '#client/lib/http.ts';
import { damDto, damListDto, memberListDto, waitingDto } from '#shared/contract/dams.ts';

export const damKeys = {
  root: ['dams'] as const,
  list: (archived: boolean) => ['dams', 'list', archived] as const,
  detail: (damId: string) => ['dams', 'detail', damId] as const,
  members: (damId: string) => ['dams', 'members', damId] as const,
  waiting: ['dams', 'waiting'] as const,
};

export const damListQuery = (archived: boolean) =>
  queryOptions({
    queryKey: damKeys.list(archived),
    queryFn: async ({ signal }) => {
      const query = { archived: archived ? 'yes' : 'no' };
      return (await getJson('/dams', damListDto, { query, signal })).items;
    },
  });

export const damQuery = (damId: string) =>
  queryOptions({
    queryKey: damKeys.detail(damId),
    queryFn: ({ signal }) => getJson(`/dams/${damId}`, damDto, { signal }),
  });

export const memberListQuery = (damId: string) =>
  queryOptions({
    queryKey: damKeys.members(damId),
    queryFn: async ({ signal }) => (await getJson(`/dams/${damId}/members`, memberListDto, { signal })).items,
  });

/** What waits for the reader, over all dams. */
export const waitingQuery = () =>
  queryOptions({
    queryKey: damKeys.waiting,
    queryFn: async ({ signal }) => (await getJson('/waiting', waitingDto, { signal })).items,
  });
