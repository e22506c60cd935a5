import { queryOptions } from '@tanstack/react-query';
import { getJson } from '#client/lib/http.ts';
import { revisionDto, revisionListDto, sendingDto } from '#shared/contract/revisions.ts';

export const revisionKeys = {
  root: ['revisions'] as const,
  ofNet: (netId: string) => ['revisions', 'net', netId] as const,
  sending: (netId: string) => ['revisions', 'sending', netId] as const,
  detail: (revisionId: string) => ['revisions', 'detail', revisionId] as const,
};

export const revisionListQuery = (netId: string) =>
  queryOptions({
    queryKey: revisionKeys.ofNet(netId),
    queryFn: async ({ signal }) =>
      (await getJson(`/nets/${netId}/revisions`, revisionListDto, { signal })).items,
  });

/** What to know before sending; asked afresh each time, since others work on the same net. */
export const sendingQuery = (netId: string) =>
  queryOptions({
    queryKey: revisionKeys.sending(netId),
    queryFn: ({ signal }) => getJson(`/nets/${netId}/sending`, sendingDto, { signal }),
    staleTime: 0,
    gcTime: 0,
  });

export const revisionQuery = (revisionId: string) =>
  queryOptions({
    queryKey: revisionKeys.detail(revisionId),
    queryFn: ({ signal }) => getJson(`/revisions/${revisionId}`, revisionDto, { signal }),
  });
