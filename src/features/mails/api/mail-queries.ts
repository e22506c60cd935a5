import { infiniteQueryOptions, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { getJson, send } from '#client/lib/http.ts';
import { mailDetailDto, mailListDto } from '#shared/contract/mails.ts';

export const mailKeys = {
  root: ['mails'] as const,
  list: ['mails', 'list'] as const,
  detail: (mailId: string) => ['mails', 'detail', mailId] as const,
};

/** A mail under way changes its state within seconds. */
const REFRESH_MS = 5000;

export const mailListQuery = () =>
  infiniteQueryOptions({
    queryKey: mailKeys.list,
    queryFn: ({ pageParam, signal }) =>
      getJson('/mails', mailListDto, { query: { cursor: pageParam }, signal }),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.nextCursor ?? undefined,
    refetchInterval: REFRESH_MS,
  });

export const mailQuery = (mailId: string) =>
  queryOptions({
    queryKey: mailKeys.detail(mailId),
    queryFn: ({ signal }) => getJson(`/mails/${mailId}`, mailDetailDto, { signal }),
  });

export function useSendAgain(mailId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: () => send('POST', `/mails/${mailId}/send-again`),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: mailKeys.root }),
  });
}
