import type { ReactNode } from 'react';
import { SelectField, TextField } from '#client/components/field.tsx';
import { notesText as text } from '#client/text/notes.ts';
import type { NoteDto } from '#shared/contract/notes.ts';
import { ANCHORS, type NoteFilter, SHOWN, writersOf } from '../model/note-filter.ts';

interface NotesFilterProps {
  filter: NoteFilter;
  notes: readonly NoteDto[];
  onChange: (filter: NoteFilter) => void;
}

/** Which notes are shown: by state and what they are to the reader, by who wrote, by what they are about, by words. */
export function NotesFilter({ filter, notes, onChange }: NotesFilterProps) {
  const change = (part: Partial<NoteFilter>) => onChange({ ...filter, ...part });
  return (
    <div className="grid grid-cols-2 gap-2 border-b border-rule-2 px-3 pt-1 pb-2">
      <Choice
        label={text.filter}
        value={filter.shown}
        onChange={(value) => change({ shown: value as NoteFilter['shown'] })}
      >
        {SHOWN.map((shown) => (
          <option key={shown} value={shown}>
            {text.filters[shown]}
          </option>
        ))}
      </Choice>
      <TextField
        label={text.search}
        type="search"
        value={filter.search}
        onChange={(event) => change({ search: event.target.value })}
      />
      <Choice
        label={text.byPerson}
        value={filter.personId ?? ''}
        onChange={(value) => change({ personId: value || null })}
      >
        <option value="">{text.anybody}</option>
        {writersOf(notes).map((person) => (
          <option key={person.id} value={person.id}>
            {person.name}
          </option>
        ))}
      </Choice>
      <Choice
        label={text.byAnchor}
        value={filter.anchor ?? ''}
        onChange={(value) => change({ anchor: (value || null) as NoteFilter['anchor'] })}
      >
        <option value="">{text.anything}</option>
        {ANCHORS.map((anchor) => (
          <option key={anchor} value={anchor}>
            {text.anchors[anchor]}
          </option>
        ))}
      </Choice>
    </div>
  );
}

function Choice(props: {
  label: string;
  value: string;
  onChange: (value: string) => void;
  children: ReactNode;
}) {
  return (
    <SelectField
      label={props.label}
      value={props.value}
      onChange={(event) => props.onChange(event.target.value)}
    >
      {props.children}
    </SelectField>
  );
}
