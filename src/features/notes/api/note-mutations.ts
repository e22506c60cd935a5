import { useMutation, useQueryClient } from '@tanstack/react-query';
import { sendJson } from '#client/lib/http.ts';
import { type NoteAnchor, type NoteDto, noteDto, noteFileDto } from '#shared/contract/notes.ts';
import { noteKeys } from './note-queries.ts';

/** A text with the files sent for it before. */
export interface WrittenText {
  id: string;
  text: string;
  fileIds: string[];
}

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
  useNoteWrite(netId, (body: WrittenText & { anchor: NoteAnchor }) =>
    sendJson('POST', `/nets/${netId}/notes`, noteDto, { body }),
  );

export const useAnswerNote = (netId: string, noteId: string) =>
  useNoteWrite(netId, (body: WrittenText) => sendJson('POST', `/notes/${noteId}/answers`, noteDto, { body }));

export const useChangeEntry = (netId: string, noteId: string, entryId: string) =>
  useNoteWrite(netId, (body: { text: string }) =>
    sendJson('PATCH', `/notes/${noteId}/entries/${entryId}`, noteDto, { body }),
  );

export const useCloseNote = (netId: string, noteId: string) =>
  useNoteWrite(netId, (closed: boolean) =>
    sendJson('POST', `/notes/${noteId}/${closed ? 'close' : 'reopen'}`, noteDto),
  );

export const useMustAnswer = (netId: string, noteId: string) =>
  useNoteWrite(netId, (wanted: boolean) =>
    sendJson(wanted ? 'PUT' : 'DELETE', `/notes/${noteId}/must-answer`, noteDto),
  );

/** Nobody waits for it; one that fails is said again when the note is next seen. */
export const useMarkRead = (netId: string) =>
  useNoteWrite(netId, ({ noteId, entries }: { noteId: string; entries: number }) =>
    sendJson('PUT', `/notes/${noteId}/read`, noteDto, { body: { entries }, unasked: true }),
  );

/** Sends a file for a text that is still being written. */
export function sendNoteFile(netId: string, id: string, file: File, signal: AbortSignal) {
  const form = new FormData();
  form.append('file', file, file.name);
  return sendJson('POST', `/nets/${netId}/note-files`, noteFileDto, { query: { id }, body: form, signal });
}
