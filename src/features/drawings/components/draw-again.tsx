import { useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { SelectField } from '#client/components/field.tsx';
import { useNotice } from '#client/components/notice.tsx';
import { ProblemNote } from '#client/components/problem-note.tsx';
import { plainText } from '#client/lib/figures.ts';
import { drawAgainText as text } from '#client/text/draw-again.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';
import { DEFAULT_DPI, MAX_DPI, MIN_DPI } from '#shared/contract/limits.ts';
import { mostDpi } from '#shared/contract/page-dpi.ts';
import { useDrawAgain } from '../api/drawing-mutations.ts';

const CHOICES = [MIN_DPI, 200, DEFAULT_DPI, 400, MAX_DPI];

/** Resolutions a page of this size can be drawn at; the finest possible one stands for those beyond it. */
export function choicesFor(widthIn: number, heightIn: number): number[] {
  const most = mostDpi(widthIn, heightIn);
  const within = CHOICES.filter((dpi) => dpi <= most);
  return most >= MIN_DPI && most < MAX_DPI && !within.includes(most) ? [...within, most] : within;
}

/** Lets an engineer choose how finely a page of vectors is drawn, before anything is placed on its sheet. */
export function DrawAgain({ sheet, drawnDpi }: { sheet: SheetDto; drawnDpi: number }) {
  const [chosen, setChosen] = useState(drawnDpi);
  const draw = useDrawAgain(sheet.id);
  const notice = useNotice();
  const [widthIn, heightIn] = [sheet.widthPx / drawnDpi, sheet.heightPx / drawnDpi];
  const choices = [...new Set([...choicesFor(widthIn, heightIn), drawnDpi])].sort((a, b) => a - b);
  const sizeOf = (lengthIn: number, dpi: number) => plainText(Math.round(lengthIn * dpi));
  return (
    <form
      className="border-b border-rule bg-film px-3.5 py-2"
      onSubmit={(event) => {
        event.preventDefault();
        draw.mutate(chosen, { onSuccess: () => notice(text.drawing) });
      }}
    >
      <ProblemNote error={draw.error} />
      <div className="flex flex-wrap items-end gap-x-3 gap-y-1.5">
        <SelectField
          label={text.label}
          hint={text.hint(Math.max(...choices))}
          value={chosen}
          onChange={(event) => setChosen(Number(event.target.value))}
        >
          {choices.map((dpi) => (
            <option key={dpi} value={dpi}>
              {text.choice(dpi, sizeOf(widthIn, dpi), sizeOf(heightIn, dpi))}
            </option>
          ))}
        </SelectField>
        <Button look="quiet" type="submit" busy={draw.isPending} disabled={chosen === drawnDpi}>
          {text.drawAgain}
        </Button>
      </div>
    </form>
  );
}
