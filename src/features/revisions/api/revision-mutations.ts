import { useMutation, useQueryClient } from '@tanstack/react-query';
import type * as z from 'zod/mini';
import { sendJson } from '#client/lib/http.ts';
import {
  type decisionInput,
  revisionDto,
  revisionSummary,
  type sendInput,
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

export function useDecide(revisionId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: z.input<typeof decisionInput>) =>
      sendJson('POST', `/revisions/${revisionId}/decision`, revisionDto, { body }),
    onSuccess: (revision) => {
      queryClient.setQueryData(revisionKeys.detail(revisionId), revision);
      return queryClient.invalidateQueries({ queryKey: revisionKeys.root });
    },
  });
}
