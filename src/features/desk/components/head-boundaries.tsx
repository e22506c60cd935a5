import { Button } from '#client/components/button.tsx';
import type { BoundaryKind } from '#client/features/desk/model/tool-choice.ts';
import { fixedText } from '#client/lib/figures.ts';
import { formText, lineText, waterText as text } from '#client/text/desk-forms.ts';
import type { TracedLine } from '#shared/contract/document.ts';

type Line = { id: string; value: TracedLine };
type TraceChoice = keyof typeof text.trace;
const CARRIERS: readonly TracedLine['line'][] = ['submergedFace', 'outflowFace', 'drain'];

/** The traced boundaries that carry a head of their own, each with what it carries and the way to change it. */
export function HeadBoundaries({
  lines,
  unit,
  disabled,
  onTrace,
  onOpenLine,
}: {
  lines: readonly Line[];
  /** Unit of a level with its datum. */
  unit: string;
  disabled: boolean;
  onTrace: (boundary: BoundaryKind) => void;
  onOpenLine: (id: string) => void;
}) {
  const carriers = lines.filter(({ value }) => CARRIERS.includes(value.line));
  return (
    <section className="border-y border-rule py-2">
      <h3 className="m-0 text-sm font-semibold">{text.boundaries}</h3>
      {carriers.length === 0 ? <p className="my-1 text-ink-2">{text.noBoundaries}</p> : null}
      <ul className="m-0 list-none p-0">
        {carriers.map(({ id, value }) => (
          <li key={id} className="flex items-baseline gap-2 py-1">
            <span className="min-w-0 break-words">
              <b className="font-semibold">{value.name || lineText.kinds[value.line]}</b>{' '}
              <span className="text-ink-2">{carried(value, unit)}</span>
            </span>
            <button type="button" className="touch ml-auto text-sm underline" onClick={() => onOpenLine(id)}>
              {formText.show}
            </button>
          </li>
        ))}
      </ul>
      {disabled ? null : (
        <div className="mt-1 flex flex-wrap gap-2">
          {(Object.keys(text.trace) as TraceChoice[]).map((boundary) => (
            <Button key={boundary} look="quiet" onClick={() => onTrace(boundary)}>
              {text.trace[boundary]}
            </Button>
          ))}
        </div>
      )}
    </section>
  );
}

function carried(line: TracedLine, unit: string): string {
  if (line.line === 'outflowFace') return text.carries.own;
  if (line.line === 'submergedFace') return line.water ? text.carries[line.water] : text.carries.unsaid;
  if (line.head === null) return text.drainStates.empty;
  return `${text.drainStates.pressure}, ${fixedText(line.head, 2)} ${unit}`;
}
