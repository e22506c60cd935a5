import { useMutation, useQueryClient } from '@tanstack/react-query';
import { v7 as uuidv7 } from 'uuid';
import { sendJson } from '#client/lib/http.ts';
import { netSummary } from '#shared/contract/drawings.ts';
import { netKeys } from './net-queries.ts';

export function useRenameLoadCase(netId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (name: string) => sendJson('PATCH', `/nets/${netId}`, netSummary, { body: { name } }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: netKeys.detail(netId) }),
  });
}

export const useCopyForLoadCase = (netId: string) =>
  useMutation({
    mutationFn: (name: string) =>
      sendJson('POST', `/nets/${netId}/copy`, netSummary, { body: { id: uuidv7(), name } }),
  });
