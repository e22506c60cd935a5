import { type FormEvent, useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { SelectField, TextArea, TextField } from '#client/components/field.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { fieldMessage } from '#client/lib/api-problem.ts';
import { commonText } from '#client/text/common.ts';
import { drawingsText as text } from '#client/text/drawings.ts';
import type { DrawingDto } from '#shared/contract/drawings.ts';
import { type DrawingPatch, useEditDrawing } from '../api/drawing-mutations.ts';

type Fields = Required<DrawingPatch>;

const fieldsOf = ({ number, title, revision, drawnOn, stage, source }: DrawingDto): Fields => ({
  number,
  title,
  revision,
  drawnOn,
  stage,
  source,
});

/** What stands in the drawing's own title block. Only what was changed is sent. */
export function TitleForm({ drawing, canEdit }: { drawing: DrawingDto; canEdit: boolean }) {
  const [fields, setFields] = useState(() => fieldsOf(drawing));
  const edit = useEditDrawing(drawing.id);
  const notice = useNotice();
  const set = (part: Partial<Fields>) => setFields({ ...fields, ...part });
  const submit = (event: FormEvent) => {
    event.preventDefault();
    if (!edit.isPending) edit.mutate(fields, { onSuccess: () => notice(text.fieldsSaved) });
  };
  const textProps = (name: 'number' | 'title' | 'revision' | 'drawnOn', maxLength: number) => ({
    value: fields[name],
    maxLength,
    readOnly: !canEdit,
    error: fieldMessage(edit.error, name),
    onChange: (event: { target: { value: string } }) => set({ [name]: event.target.value }),
  });
  return (
    <form onSubmit={submit} className="grid grid-cols-2 gap-3 p-3.5">
      <div className="col-span-2 empty:hidden">
        <ProblemNote error={edit.error} />
      </div>
      <TextField label={text.number} {...textProps('number', 200)} />
      <TextField label={text.revision} {...textProps('revision', 20)} />
      <TextField label={text.drawingTitle} className="col-span-2" {...textProps('title', 200)} />
      <TextField label={text.drawnOn} hint={text.drawnOnHint} {...textProps('drawnOn', 40)} />
      <SelectField
        label={text.stage}
        disabled={!canEdit}
        value={fields.stage ?? ''}
        onChange={(event) => set({ stage: stageFrom(event.target.value) })}
      >
        <option value="">{text.stageUnknown}</option>
        <option value="asBuilt">{text.asBuilt}</option>
        <option value="design">{text.design}</option>
      </SelectField>
      <TextArea
        label={text.source}
        hint={text.sourceHint}
        className="col-span-2"
        rows={2}
        maxLength={500}
        readOnly={!canEdit}
        value={fields.source}
        onChange={(event) => set({ source: event.target.value })}
      />
      {canEdit ? (
        <div className="col-span-2">
          <Button type="submit" busy={edit.isPending} busyLabel={commonText.saving}>
            {text.saveFields}
          </Button>
        </div>
      ) : null}
    </form>
  );
}

const stageFrom = (value: string): Fields['stage'] =>
  value === 'asBuilt' || value === 'design' ? value : null;
