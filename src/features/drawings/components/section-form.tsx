import { type FormEvent, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { Actions } from '#client/components/dialog.tsx';
import { TextField } from '#client/components/field.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { fieldMessage } from '#client/lib/api-problem.ts';
import { commonText } from '#client/text/common.ts';
import { drawingsText as text } from '#client/text/drawings.ts';
import type { SectionDto, SheetDto } from '#shared/contract/drawings.ts';
import type { SectionFields } from '../api/drawing-mutations.ts';
import type { Frame } from './frame.ts';
import { FrameFields } from './frame-fields.tsx';

interface SectionFormProps {
  sheet: SheetDto;
  section?: SectionDto | undefined;
  frame: Frame | null;
  onFrame: (frame: Frame | null) => void;
  error: unknown;
  busy: boolean;
  onSubmit: (fields: SectionFields) => void;
  onCancel: () => void;
}

/** Names a section and sets its frame, by dragging on the sheet or by typing. */
export function SectionForm({
  sheet,
  section,
  frame,
  onFrame,
  error,
  busy,
  onSubmit,
  onCancel,
}: SectionFormProps) {
  const [name, setName] = useState(section?.name ?? '');
  const [chainage, setChainage] = useState(section?.chainage ?? '');
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (!busy) onSubmit({ name, chainage, frame });
  };
  return (
    <form onSubmit={submit} className="flex flex-col gap-3 p-3.5">
      <p className="m-0 text-ink-2">{text.newSectionLead}</p>
      <ProblemNote error={error} />
      <TextField
        label={text.sectionName}
        hint={text.sectionNameHint}
        required
        maxLength={200}
        autoFocus
        error={fieldMessage(error, 'name')}
        value={name}
        onChange={(event) => setName(event.target.value)}
      />
      <TextField
        label={text.chainage}
        hint={text.chainageHint}
        maxLength={60}
        error={fieldMessage(error, 'chainage')}
        value={chainage}
        onChange={(event) => setChainage(event.target.value)}
      />
      <FrameFields sheet={sheet} frame={frame} onFrame={onFrame} />
      <Actions>
        <Button type="submit" look="main" busy={busy} busyLabel={commonText.saving}>
          {section ? commonText.save : text.makeSection}
        </Button>
        <Button look="quiet" onClick={onCancel}>
          {commonText.cancel}
        </Button>
      </Actions>
    </form>
  );
}
