import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { getJson, send, sendJson } from '#client/lib/http.ts';
import { type MailTiming, mailChoiceDto } from '#shared/contract/mails.ts';

const KEY = ['mail-choice'] as const;

export const mailChoiceQuery = () =>
  queryOptions({
    queryKey: KEY,
    queryFn: ({ signal }) => getJson('/me/mail-choice', mailChoiceDto, { signal }),
  });

export function useChooseMail() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: { timing: MailTiming; timeZone: string }) =>
      sendJson('PUT', '/me/mail-choice', mailChoiceDto, { body }),
    onSuccess: (choice) => queryClient.setQueryData(KEY, choice),
  });
}

/** Stops the digests of whoever the link was signed for, signed in or not. */
export const useStopDigest = (token: string) =>
  useMutation({ mutationFn: () => send('POST', '/digest-stops', { query: { token } }) });
