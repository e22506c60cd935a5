import { infiniteQueryOptions, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { getJson, send } from '#client/lib/http.ts';
import { type MailState, mailDetailDto, mailListDto, mailTemplateListDto } from '#shared/contract/mails.ts';

export const mailKeys = {
  root: ['mails'] as const,
  list: (state: MailState | null) => ['mails', 'list', state] as const,
  detail: (mailId: string) => ['mails', 'detail', mailId] as const,
  failed: ['mails', 'failed'] as const,
  templates: ['mail-templates'] as const,
};

/** A mail under way changes its state within seconds. */
const REFRESH_MS = 5000;
/** Mails that were given up do not come and go by the second. */
const FAILED_REFRESH_MS = 60_000;

export const mailListQuery = (state: MailState | null) =>
  infiniteQueryOptions({
    queryKey: mailKeys.list(state),
    queryFn: ({ pageParam, signal }) =>
      getJson('/mails', mailListDto, { query: { cursor: pageParam, state: state ?? undefined }, signal }),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.nextCursor ?? undefined,
    refetchInterval: REFRESH_MS,
  });

/** How many mails could not be delivered, for administrators on every page. */
export const failedMailsQuery = () =>
  queryOptions({
    queryKey: mailKeys.failed,
    queryFn: async ({ signal }) =>
      (await getJson('/mails', mailListDto, { query: { state: 'failed' }, signal, unasked: true })).failed,
    refetchInterval: FAILED_REFRESH_MS,
  });

export const mailQuery = (mailId: string) =>
  queryOptions({
    queryKey: mailKeys.detail(mailId),
    queryFn: ({ signal }) => getJson(`/mails/${mailId}`, mailDetailDto, { signal }),
  });

export const mailTemplatesQuery = () =>
  queryOptions({
    queryKey: mailKeys.templates,
    queryFn: async ({ signal }) => (await getJson('/mail-templates', mailTemplateListDto, { signal })).items,
    staleTime: Number.POSITIVE_INFINITY,
  });

export function useSendAgain(mailId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: () => send('POST', `/mails/${mailId}/send-again`),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: mailKeys.root }),
  });
}
