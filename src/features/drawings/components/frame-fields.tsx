import { Button } from '#client/components/button.tsx';
import { NumberField } from '#client/components/field.tsx';
import { parseTypedNumber } from '#client/lib/parse-number.ts';
import { drawingsText as text } from '#client/text/drawings.ts';
import type { SheetDto } from '#shared/contract/drawings.ts';
import { type Frame, frameOnSheet } from './frame.ts';

interface FrameFieldsProps {
  sheet: SheetDto;
  frame: Frame | null;
  onFrame: (frame: Frame | null) => void;
}

const PARTS = [text.left, text.top, text.width, text.height] as const;

/** The frame in words, and as numbers for those who do not drag. */
export function FrameFields({ sheet, frame, onFrame }: FrameFieldsProps) {
  const shown: Frame = frame ?? [0, 0, sheet.widthPx, sheet.heightPx];
  const change = (index: number, typed: string) => {
    const value = parseTypedNumber(typed);
    if (value === null) return;
    const next = shown.map((part, at) => (at === index ? value : part)) as Frame;
    const onSheet = frameOnSheet(next, sheet);
    if (onSheet) onFrame(onSheet);
  };
  return (
    <fieldset className="flex flex-col gap-2">
      <legend className="mb-1 text-sm font-semibold">{text.frame}</legend>
      <p role="status" className="m-0">
        {frame ? text.frameSize(frame[2], frame[3]) : text.wholeSheetChosen}
      </p>
      <details>
        <summary className="touch cursor-pointer text-sm">{text.frameTyped}</summary>
        <div className="mt-2 grid grid-cols-2 gap-2">
          {PARTS.map((label, index) => (
            <NumberField
              // Typed text stays until the frame itself changes.
              key={`${label} ${shown[index]}`}
              label={label}
              defaultValue={shown[index]}
              onBlur={(event) => change(index, event.target.value)}
            />
          ))}
        </div>
      </details>
      {frame ? (
        <div>
          <Button look="quiet" onClick={() => onFrame(null)}>
            {text.wholeSheet}
          </Button>
        </div>
      ) : null}
    </fieldset>
  );
}
