import { useMutation, useQueryClient } from '@tanstack/react-query';
import { sendJson } from '#client/lib/http.ts';
import { type NoteAnchor, type NoteDto, noteDto } from '#shared/contract/notes.ts';
import { noteKeys } from './note-queries.ts';

/** A write that answers with the note as it is now, which takes its place in the list at once. */
function useNoteWrite<Input>(netId: string, write: (input: Input) => Promise<NoteDto>) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: write,
    onSuccess: (note) => {
      queryClient.setQueryData<NoteDto[]>(noteKeys.ofNet(netId), (notes = []) =>
        [...notes.filter((each) => each.id !== note.id), note].sort((a, b) => a.number - b.number),
      );
    },
  });
}

/** Ids are made before the first try, so that a repeat after a lost answer is the same note. */
export const useWriteNote = (netId: string) =>
  useNoteWrite(netId, (body: { id: string; anchor: NoteAnchor; text: string }) =>
    sendJson('POST', `/nets/${netId}/notes`, noteDto, { body }),
  );

export const useAnswerNote = (netId: string, noteId: string) =>
  useNoteWrite(netId, (body: { id: string; text: string }) =>
    sendJson('POST', `/notes/${noteId}/answers`, noteDto, { body }),
  );

export const useCloseNote = (netId: string, noteId: string) =>
  useNoteWrite(netId, (closed: boolean) =>
    sendJson('POST', `/notes/${noteId}/${closed ? 'close' : 'reopen'}`, noteDto),
  );
