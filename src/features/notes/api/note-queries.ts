import { queryOptions } from '@tanstack/react-query';
import { apiUrl, getJson } from '#client/lib/http.ts';
import { earlierTextsDto, noteListDto } from '#shared/contract/notes.ts';

export const noteKeys = {
  root: ['notes'] as const,
  ofNet: (netId: string) => ['notes', 'net', netId] as const,
  /** `editedAt`: a text changed once more has one more that it said before. */
  earlier: (entryId: string, editedAt: string | null) => ['notes', 'earlier', entryId, editedAt] as const,
};

export const notesQuery = (netId: string) =>
  queryOptions({
    queryKey: noteKeys.ofNet(netId),
    queryFn: async ({ signal }) => (await getJson(`/nets/${netId}/notes`, noteListDto, { signal })).items,
  });

export const earlierTextsQuery = (noteId: string, entry: { id: string; editedAt: string | null }) =>
  queryOptions({
    queryKey: noteKeys.earlier(entry.id, entry.editedAt),
    queryFn: async ({ signal }) =>
      (await getJson(`/notes/${noteId}/entries/${entry.id}/earlier`, earlierTextsDto, { signal })).items,
  });

export const noteFileUrl = (netId: string, fileId: string) => apiUrl(`/nets/${netId}/note-files/${fileId}`);
