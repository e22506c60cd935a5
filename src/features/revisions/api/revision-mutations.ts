import { useMutation, useQueryClient } from '@tanstack/react-query';
import type * as z from 'zod/mini';
import { sendJson } from '#client/lib/http.ts';
import {
  type acceptanceWithdrawalInput,
  type decisionInput,
  revisionDto,
  revisionSummary,
  type sendInput,
  type sendingWithdrawalInput,
} from '#shared/contract/revisions.ts';
import { revisionKeys } from './revision-queries.ts';

export function useSendForChecking(netId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: z.input<typeof sendInput>) =>
      sendJson('POST', `/nets/${netId}/revisions`, revisionSummary, { body }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: revisionKeys.root }),
  });
}

export const useDecide = (revisionId: string) =>
  useRecord<z.input<typeof decisionInput>>(revisionId, 'decision');

export const useWithdrawAcceptance = (revisionId: string) =>
  useRecord<z.input<typeof acceptanceWithdrawalInput>>(revisionId, 'acceptance-withdrawals');

export const useWithdrawSending = (revisionId: string) =>
  useRecord<z.input<typeof sendingWithdrawalInput>>(revisionId, 'sending-withdrawals');

/** Adds a record to a revision, which comes back as it then stands. */
function useRecord<Body extends object>(revisionId: string, records: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: Body) =>
      sendJson('POST', `/revisions/${revisionId}/${records}`, revisionDto, { body }),
    onSuccess: (revision) => {
      queryClient.setQueryData(revisionKeys.detail(revisionId), revision);
      return queryClient.invalidateQueries({ queryKey: revisionKeys.root });
    },
  });
}
