import { useEffect, useRef, useState } from 'react';
import { v7 as uuidv7 } from 'uuid';
import { notesText as text } from '#client/text/notes.ts';
import { MAX_NOTE_FILE_BYTES, MAX_NOTE_FILES } from '#shared/contract/limits.ts';
import { sendNoteFile } from '../api/note-mutations.ts';

/** A file of the text being written. */
export interface FileToAttach {
  id: string;
  file: File;
  state: 'sending' | 'sent' | 'failed';
  error: unknown;
}

const MEGABYTE = 1024 * 1024;

/** Files of a text that is being written: each is sent as soon as it is chosen, and can be sent again or left out. */
export function useNoteFiles(netId: string) {
  const [files, setFiles] = useState<FileToAttach[]>([]);
  const [fault, setFault] = useState<string | null>(null);
  const underWay = useRef(new Map<string, AbortController>());
  useEffect(() => {
    const all = underWay.current;
    return () => {
      for (const leave of all.values()) leave.abort();
    };
  }, []);

  const change = (id: string, state: FileToAttach['state'], error: unknown = null) =>
    setFiles((held) => held.map((each) => (each.id === id ? { ...each, state, error } : each)));

  function send(id: string, file: File): void {
    const leave = new AbortController();
    underWay.current.set(id, leave);
    change(id, 'sending');
    sendNoteFile(netId, id, file, leave.signal).then(
      () => change(id, 'sent'),
      (error: unknown) => {
        if (!leave.signal.aborted) change(id, 'failed', error);
      },
    );
  }

  function add(chosen: readonly File[]): void {
    const large = chosen.find((file) => file.size > MAX_NOTE_FILE_BYTES);
    const tooMany = files.length + chosen.length > MAX_NOTE_FILES;
    setFault(
      large
        ? text.fileTooLarge(large.name, MAX_NOTE_FILE_BYTES / MEGABYTE)
        : tooMany
          ? text.tooManyFiles(MAX_NOTE_FILES)
          : null,
    );
    if (large || tooMany) return;
    const added = chosen.map((file): FileToAttach => ({ id: uuidv7(), file, state: 'sending', error: null }));
    setFiles((held) => [...held, ...added]);
    for (const { id, file } of added) send(id, file);
  }

  return {
    files,
    fault,
    add,
    again: ({ id, file }: FileToAttach) => send(id, file),
    leaveOut(id: string): void {
      underWay.current.get(id)?.abort();
      setFiles((held) => held.filter((each) => each.id !== id));
    },
  };
}
