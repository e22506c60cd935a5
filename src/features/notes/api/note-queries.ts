import { queryOptions } from '@tanstack/react-query';
import { getJson } from '#client/lib/http.ts';
import { noteListDto } from '#shared/contract/notes.ts';

export const noteKeys = {
  root: ['notes'] as const,
  ofNet: (netId: string) => ['notes', 'net', netId] as const,
};

export const notesQuery = (netId: string) =>
  queryOptions({
    queryKey: noteKeys.ofNet(netId),
    queryFn: async ({ signal }) => (await getJson(`/nets/${netId}/notes`, noteListDto, { signal })).items,
  });
