import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { getJson, sendJson } from '#client/lib/http.ts';
import { type CheckListItem, checkListDto } from '#shared/contract/check-list.ts';
import { damKeys } from './dam-queries.ts';

const checkListKey = (damId: string) => [...damKeys.root, 'check list', damId] as const;

export const checkListQuery = (damId: string) =>
  queryOptions({
    queryKey: checkListKey(damId),
    queryFn: ({ signal }) => getJson(`/dams/${damId}/check-list`, checkListDto, { signal }),
  });

/** Keeps a list, or puts the usual one back with null. */
export function useSetCheckList(damId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (items: CheckListItem[] | null) =>
      sendJson('PUT', `/dams/${damId}/check-list`, checkListDto, { body: { items } }),
    onSuccess: (list) => queryClient.setQueryData(checkListKey(damId), list),
  });
}
