import type { NoteAnchor, NoteDto } from '#shared/contract/notes.ts';

export const SHOWN = [
  'current',
  'open',
  'unread',
  'mine',
  'namingMe',
  'mustAnswer',
  'closed',
  'all',
] as const;
export type Shown = (typeof SHOWN)[number];
export const ANCHORS = ['readingPoint', 'line', 'cell', 'profile', 'place', 'titleBlock', 'drawing'] as const;

export interface NoteFilter {
  shown: Shown;
  /** Somebody who wrote the note or in it; null for anybody. */
  personId: string | null;
  anchor: NoteAnchor['on'] | null;
  /** Words that all occur, each anywhere in the note. */
  search: string;
}

export const NO_FILTER: NoteFilter = { shown: 'current', personId: null, anchor: null, search: '' };

const isWrittenBy = (note: NoteDto, personId: string | null) =>
  note.entries.some((entry) => entry.author.id === personId);

/** Whether a note belongs to a choice, as seen by the person with `ownId`. */
function isShown(note: NoteDto, shown: Shown, ownId: string | null): boolean {
  switch (shown) {
    case 'all':
      return true;
    case 'current':
      return note.state !== 'closed';
    case 'open':
    case 'closed':
      return note.state === shown;
    case 'unread':
      return note.unread > 0;
    case 'mine':
      return isWrittenBy(note, ownId);
    case 'namingMe':
      return note.entries.some((entry) => entry.named.some((person) => person.id === ownId));
    case 'mustAnswer':
      return note.mustAnswer !== null;
  }
}

function contains(note: NoteDto, search: string): boolean {
  const said = note.entries.flatMap((entry) => [
    entry.text,
    entry.author.name,
    ...entry.files.map((file) => file.fileName),
  ]);
  const all = `${note.number} ${said.join(' ')}`.toLowerCase();
  return search
    .toLowerCase()
    .split(/\s+/)
    .every((word) => all.includes(word));
}

/** The notes that a filter lets through, in their order. */
export function filterNotes(notes: readonly NoteDto[], filter: NoteFilter, ownId: string | null): NoteDto[] {
  return notes.filter(
    (note) =>
      isShown(note, filter.shown, ownId) &&
      (filter.personId === null || isWrittenBy(note, filter.personId)) &&
      (filter.anchor === null || note.anchor.on === filter.anchor) &&
      contains(note, filter.search.trim()),
  );
}

/** The open note after the one chosen, by number and round again; null when none is open. */
export function nextOpenNote(notes: readonly NoteDto[], chosenId: string | null): NoteDto | null {
  const open = notes.filter((note) => note.state === 'open');
  const from = notes.find((note) => note.id === chosenId)?.number ?? 0;
  return open.find((note) => note.number > from) ?? open[0] ?? null;
}

/** Everybody who wrote in the notes, by name. */
export function writersOf(notes: readonly NoteDto[]) {
  const people = new Map(notes.flatMap((note) => note.entries.map(({ author }) => [author.id, author])));
  return [...people.values()].sort((a, b) => a.name.localeCompare(b.name));
}
