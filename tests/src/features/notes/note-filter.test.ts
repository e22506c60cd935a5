import { describe, expect, it } from 'vitest';
import { nameBeingTyped, peopleMeant, withName } from '#client/features/notes/model/name-completion.ts';
import { filterNotes, NO_FILTER, nextOpenNote, writersOf } from '#client/features/notes/model/note-filter.ts';
import type { NoteDto } from '#shared/contract/notes.ts';

const iris = { id: 'iris', name: 'Iris Marsh' };
const remi = { id: 'remi', name: 'Remi Okafor' };
const at = '2026-12-01T10:00:00.000Z';

function note(
  number: number,
  change: Partial<NoteDto> = {},
  entry: Partial<NoteDto['entries'][0]> = {},
): NoteDto {
  return {
    id: `n${number}`,
    netId: 'net',
    number,
    anchor: { on: 'drawing' },
    state: 'open',
    createdAt: at,
    answered: null,
    closedBy: null,
    closedAt: null,
    mustAnswer: null,
    unread: 0,
    entries: [
      { id: `e${number}`, author: iris, text: '', at, editedAt: null, named: [], files: [], ...entry },
    ],
    ...change,
  };
}
const numbers = (notes: readonly NoteDto[]) => notes.map((each) => each.number);

describe('the filter of notes', () => {
  const notes = [
    note(1, { state: 'closed' }, { text: 'Drain cleaned in 2019' }),
    note(2, { unread: 1 }, { author: remi, named: [iris], text: 'Is the drain open?' }),
    note(3, { state: 'answered', mustAnswer: { by: remi, at }, anchor: { on: 'place', at: [1, 1] } }),
  ];
  const through = (change: Partial<typeof NO_FILTER>, ownId: string | null = 'iris') =>
    numbers(filterNotes(notes, { ...NO_FILTER, ...change }, ownId));

  it('lets nothing of nobody through and leaves closed notes out at first', () => {
    expect(through({ shown: 'mine' }, null)).toEqual([]);
    expect(through({})).toEqual([2, 3]);
  });

  it('chooses by state, by what is new, by who wrote and who is named, by must be answered', () => {
    expect(through({ shown: 'all' })).toEqual([1, 2, 3]);
    expect(through({ shown: 'open' })).toEqual([2]);
    expect(through({ shown: 'closed' })).toEqual([1]);
    expect(through({ shown: 'unread' })).toEqual([2]);
    expect(through({ shown: 'mine' })).toEqual([1, 3]);
    expect(through({ shown: 'namingMe' })).toEqual([2]);
    expect(through({ shown: 'mustAnswer' })).toEqual([3]);
    expect(through({ shown: 'all', personId: 'remi' })).toEqual([2]);
    expect(through({ shown: 'all', anchor: 'place' })).toEqual([3]);
  });

  it('finds all words searched for, whatever their order and case', () => {
    expect(through({ shown: 'all', search: 'open DRAIN' })).toEqual([2]);
    expect(through({ shown: 'all', search: ' 2019 ' })).toEqual([1]);
    expect(through({ shown: 'all', search: 'drain weir' })).toEqual([]);
  });

  it('knows who wrote', () => {
    expect(writersOf(notes)).toEqual([iris, remi]);
  });
});

describe('the next open note', () => {
  it('is none when none is open, else the next by number and round again', () => {
    expect(nextOpenNote([note(1, { state: 'answered' })], null)).toBeNull();
    const notes = [note(1), note(2, { state: 'closed' }), note(3)];
    expect(nextOpenNote(notes, null)?.number).toBe(1);
    expect(nextOpenNote(notes, 'n1')?.number).toBe(3);
    expect(nextOpenNote(notes, 'n2')?.number).toBe(3);
    expect(nextOpenNote(notes, 'n3')?.number).toBe(1);
  });
});

describe('a name typed after @', () => {
  it('is none in an address, over a line or without @', () => {
    expect(nameBeingTyped('no', 2)).toBeNull();
    expect(nameBeingTyped('remi@har', 8)).toBeNull();
    expect(nameBeingTyped('@Re\nmi', 6)).toBeNull();
  });

  it('is completed from the people whose name or a part of it begins so', () => {
    const typed = nameBeingTyped('Ask @oka please', 8);
    expect(typed).toEqual({ start: 4, typed: 'oka' });
    expect(peopleMeant([iris, remi], 'oka')).toEqual([remi]);
    expect(peopleMeant([iris, remi], '')).toEqual([iris, remi]);
    expect(peopleMeant([iris, remi], 'remi okafor')).toEqual([]);
    expect(withName('Ask @oka please', typed!, remi.name)).toEqual({
      text: 'Ask @Remi Okafor please',
      caret: 16,
    });
    expect(withName('@', { start: 0, typed: '' }, iris.name)).toEqual({ text: '@Iris Marsh ', caret: 12 });
  });
});
