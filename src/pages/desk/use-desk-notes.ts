import { useQuery } from '@tanstack/react-query';
import { useEffect, useMemo, useRef, useState } from 'react';
import { useLocation } from 'react-router-dom';
import { useStore } from 'zustand';
import type { DeskStore } from '#client/features/desk/model/desk-state.ts';
import { isAnchorGone, placeOfNote } from '#client/features/desk/model/note-places.ts';
import type { NoteBalloon } from '#client/features/desk/render/build-scene.ts';
import { notesQuery } from '#client/features/notes/api/note-queries.ts';
import { nextOpenNote } from '#client/features/notes/model/note-filter.ts';
import { notesText } from '#client/text/notes.ts';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import type { NoteAnchor, NoteDto } from '#shared/contract/notes.ts';
import type { NetReading } from '#shared/contract/reading.ts';

const NONE: readonly NoteDto[] = [];

/** The notes of the net as the list and the sheet show them. A balloon follows what it is anchored to. */
export function useDeskNotes(netId: string, store: DeskStore) {
  const { data, error } = useQuery(notesQuery(netId));
  const notes = data ?? NONE;
  const [chosenId, setChosenId] = useState<string | null>(null);
  const [writingAt, setWritingAt] = useState<NoteAnchor | null>(null);
  const document = useStore(store, (state) => state.document);
  const reading = useStore(store, (state) => state.reading);
  const balloons = useMemo(
    () => balloonsOf(notes, document, reading, chosenId),
    [notes, document, reading, chosenId],
  );
  const choose = (note: NoteDto) => {
    setChosenId(note.id);
    const place = placeOfNote(note.anchor, document, reading);
    if (place) store.lookAt(place);
  };
  const nextOpen = () => {
    const next = nextOpenNote(notes, chosenId);
    if (!next) return;
    choose(next);
    // Brings the notes to the front, whatever stands in their place.
    store.emitIntent({ type: 'openNote', noteId: next.id });
  };
  useNextOpenKey(store, nextOpen);
  useNoteOfAddress(data, choose);
  return {
    notes,
    // What was loaded before stays good enough to show while a later question fails.
    error: data ? null : error,
    balloons,
    chosenId,
    writingAt,
    setWritingAt,
    setChosenId,
    targetOf: (anchor: NoteAnchor) => targetOf(anchor, document),
    choose,
    nextOpen,
  };
}

/** The key of the desk asks for the next open note. */
function useNextOpenKey(store: DeskStore, nextOpen: () => void): void {
  const newest = useRef(nextOpen);
  useEffect(() => {
    newest.current = nextOpen;
  });
  useEffect(
    () =>
      store.onIntent((intent) => {
        if (intent.type === 'nextOpenNote') newest.current();
      }),
    [store],
  );
}

/** Chooses the note that the address names, as the link in a mail does, once the notes are there. */
function useNoteOfAddress(notes: readonly NoteDto[] | undefined, choose: (note: NoteDto) => void): void {
  const { hash } = useLocation();
  const [done, setDone] = useState('');
  useEffect(() => {
    if (!notes || hash === done) return;
    setDone(hash);
    const named = notes.find((note) => hash === `#note-${note.id}`);
    if (named) choose(named);
  });
}

/** Closed notes leave the sheet, unless one is being looked at. */
function balloonsOf(
  notes: readonly NoteDto[],
  document: FlowNetDocument,
  reading: NetReading | null,
  chosenId: string | null,
): NoteBalloon[] {
  return notes.flatMap((note): NoteBalloon[] => {
    if (note.state === 'closed' && note.id !== chosenId) return [];
    const at = placeOfNote(note.anchor, document, reading);
    if (!at) return [];
    const line = note.anchor.on === 'line' ? { lineId: note.anchor.entityId } : {};
    return [{ id: note.id, number: note.number, at, chosen: note.id === chosenId, ...line }];
  });
}

/** "at P3" for a note on a reading point; what is no longer there is said to be gone. */
export function targetOf(anchor: NoteAnchor, document: FlowNetDocument): string {
  const { at } = notesText;
  if (isAnchorGone(anchor, document)) return notesText.gone;
  switch (anchor.on) {
    case 'place':
    case 'drawing':
    case 'cell':
      return at[anchor.on];
    case 'titleBlock':
      return at.titleBlock(notesText.cells[anchor.cell]);
    default:
      return targetOfEntity(anchor.entityId, document);
  }
}

function targetOfEntity(entityId: string, document: FlowNetDocument): string {
  const { at } = notesText;
  const value = document.entities[entityId]?.value;
  if (value?.kind === 'readingPoint') return at.readingPoint(value.name);
  if (value?.kind === 'profile') return at.profile(value.name);
  return value?.kind === 'line' && value.name ? at.readingPoint(value.name) : at.line;
}
