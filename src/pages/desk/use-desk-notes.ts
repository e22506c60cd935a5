import { useQuery } from '@tanstack/react-query';
import { useMemo, useState } from 'react';
import { useStore } from 'zustand';
import type { DeskStore } from '#client/features/desk/model/desk-state.ts';
import type { NoteBalloon } from '#client/features/desk/render/build-scene.ts';
import { notesQuery } from '#client/features/notes/api/note-queries.ts';
import { notesText } from '#client/text/notes.ts';
import type { FlowNetDocument, SheetPoint } from '#shared/contract/document.ts';
import type { NoteAnchor, NoteDto } from '#shared/contract/notes.ts';
import type { NetReading } from '#shared/contract/reading.ts';

const NONE: readonly NoteDto[] = [];

/** The notes of the net as the list and the sheet show them. A balloon follows the point it is anchored to. */
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
    choose: (note: NoteDto) => {
      setChosenId(note.id);
      store.lookAt(placeOf(note.anchor, document, reading));
    },
  };
}

/** Closed notes leave the sheet, unless one is being looked at. */
function balloonsOf(
  notes: readonly NoteDto[],
  document: FlowNetDocument,
  reading: NetReading | null,
  chosenId: string | null,
): NoteBalloon[] {
  return notes
    .filter((note) => note.state !== 'closed' || note.id === chosenId)
    .map((note) => ({
      id: note.id,
      number: note.number,
      at: placeOf(note.anchor, document, reading),
      chosen: note.id === chosenId,
      ...(note.anchor.on === 'line' ? { lineId: note.anchor.entityId } : {}),
    }));
}

function placeOf(anchor: NoteAnchor, document: FlowNetDocument, reading: NetReading | null): SheetPoint {
  if (anchor.on !== 'readingPoint' || !document.entities[anchor.entityId]) return anchor.at;
  return reading?.points.find((point) => point.id === anchor.entityId)?.sheetAt ?? anchor.at;
}

/** "at P3" for a note on a reading point; what is no longer there is said to be gone. */
export function targetOf(anchor: NoteAnchor, document: FlowNetDocument): string {
  if (anchor.on === 'place') return notesText.at.place;
  const value = document.entities[anchor.entityId]?.value;
  if (!value) return notesText.gone;
  if (value.kind === 'readingPoint') return notesText.at.readingPoint(value.name);
  return value.kind === 'line' && value.name ? notesText.at.readingPoint(value.name) : notesText.at.line;
}
