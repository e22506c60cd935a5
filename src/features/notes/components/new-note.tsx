import { useEffect, useRef, useState } from 'react';
import { SelectField } from '#client/components/field.tsx';
import { notesText as text } from '#client/text/notes.ts';
import type { NoteAnchor } from '#shared/contract/notes.ts';
import { useWriteNote } from '../api/note-mutations.ts';
import { NoteWriter } from './note-writer.tsx';
import type { NotesListProps } from './notes-list.tsx';

type NewNoteProps = Pick<NotesListProps, 'netId' | 'reader' | 'targetOf' | 'onWritten'> & {
  anchor: NoteAnchor;
};

/** The note being written, with the choice of what it is about where a press says more than one thing. */
export function NewNote({ netId, reader, anchor: begunOn, targetOf, onWritten }: NewNoteProps) {
  const write = useWriteNote(netId);
  const choices = choicesFor(begunOn);
  const [chosen, setChosen] = useState({ begunOn, at: 0 });
  // Another press on the sheet begins anew what the note is about; the text stays.
  const at = chosen.begunOn === begunOn ? chosen.at : 0;
  const anchor = choices[at]?.anchor ?? begunOn;
  const root = useRef<HTMLDivElement>(null);
  useEffect(() => {
    root.current?.scrollIntoView({ block: 'nearest' });
  }, []);
  return (
    <div ref={root} className="border-y border-rule-2 px-3 py-2">
      <NoteWriter
        netId={netId}
        people={reader.people}
        label={text.writeAt(targetOf(anchor))}
        sendLabel={text.send}
        error={write.error}
        busy={write.isPending}
        onSend={(input) => write.mutate({ ...input, anchor }, { onSuccess: onWritten })}
        onCancel={() => onWritten(null)}
      >
        {choices.length > 1 ? (
          <SelectField
            label={text.about}
            value={at}
            onChange={(event) => setChosen({ begunOn, at: Number(event.target.value) })}
          >
            {choices.map((choice, index) => (
              <option key={choice.label} value={index}>
                {choice.label}
              </option>
            ))}
          </SelectField>
        ) : null}
      </NoteWriter>
    </div>
  );
}

interface Choice {
  label: string;
  anchor: NoteAnchor;
}

const CELLS = Object.keys(text.cells) as Array<keyof typeof text.cells>;

/**
 * What a note begun so may be about, what it was begun on first: a cell or the place in it; the drawing or any figure
 * of the title block.
 */
function choicesFor(anchor: NoteAnchor): Choice[] {
  if (anchor.on === 'cell')
    return [
      { label: text.aboutCell, anchor },
      { label: text.aboutPlace, anchor: { on: 'place', at: anchor.at } },
    ];
  if (anchor.on !== 'drawing' && anchor.on !== 'titleBlock') return [];
  const figures = CELLS.map(
    (cell): Choice => ({
      label: text.cells[cell],
      anchor: { on: 'titleBlock', cell },
    }),
  );
  const drawing: Choice = { label: text.aboutDrawing, anchor: { on: 'drawing' } };
  if (anchor.on === 'drawing') return [drawing, ...figures];
  const own = figures.filter((choice) => 'cell' in choice.anchor && choice.anchor.cell === anchor.cell);
  return [...own, drawing, ...figures.filter((choice) => !own.includes(choice))];
}
