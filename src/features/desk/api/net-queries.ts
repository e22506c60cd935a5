import { queryOptions } from '@tanstack/react-query';
import { getJson } from '#client/lib/http.ts';
import { type ChangesDto, changesDto, netDetailDto } from '#shared/contract/nets.ts';

export const netKeys = {
  root: ['nets'] as const,
  detail: (netId: string) => ['nets', 'detail', netId] as const,
};

/** All the desk needs to open; afterwards only what stands around the document is refreshed from it. */
export const netQuery = (netId: string) =>
  queryOptions({
    queryKey: netKeys.detail(netId),
    queryFn: ({ signal }) => getJson(`/nets/${netId}`, netDetailDto, { signal }),
    staleTime: 0,
  });

/** What changed after change number `since`. */
export const fetchChanges = (netId: string, since: number): Promise<ChangesDto> =>
  getJson(`/nets/${netId}/changes`, changesDto, { query: { since } });
