import { type ReactNode, useEffect, useRef } from 'react';
import { sentenceText } from '#client/lib/figures.ts';
import { formText } from '#client/text/desk-forms.ts';
import type { Finding } from '#shared/contract/reading.ts';

/** The frame of a form in the margin, in the place of the notes while it is open. */
export function FormPane({
  title,
  onClose,
  keepsFocus = false,
  children,
}: {
  title: string;
  onClose: () => void;
  /** Opens beside what has the focus and leaves it there, as when rows of a table are gone through. */
  keepsFocus?: boolean;
  children: ReactNode;
}) {
  const heading = useRef<HTMLHeadingElement>(null);
  const takesFocus = useRef(!keepsFocus);
  // A pane opened from the title block is read from its head, and the next Tab is its first field. One that the sheet
  // or a field has opened leaves the focus there: Delete must still reach the line that was just chosen.
  useEffect(() => {
    const held = document.activeElement;
    const elsewhere = held?.closest('[role="application"], input, select, textarea');
    if (!elsewhere && takesFocus.current) heading.current?.focus({ preventScroll: true });
  }, []);
  return (
    <section aria-label={title} className="flex min-h-0 flex-1 flex-col">
      <div className="flex items-baseline gap-3 border-b border-rule px-3 py-2">
        <h2 ref={heading} tabIndex={-1} className="m-0 text-base font-bold outline-none">
          {title}
        </h2>
        <button type="button" className="touch ml-auto text-ink-2 underline" onClick={onClose}>
          {formText.close}
        </button>
      </div>
      <div className="flex min-h-0 flex-1 flex-col gap-3 overflow-y-auto px-3 py-3">{children}</div>
    </section>
  );
}

const COLOURS = {
  wrong: 'text-wrong',
  missing: 'text-attention',
  question: 'text-attention',
  note: 'text-ink-2',
};

/** What was found about the matter of this form, in whole sentences. */
export function FormFindings({ findings }: { findings: readonly Finding[] }) {
  if (findings.length === 0) return null;
  return (
    <ul className="m-0 flex list-none flex-col gap-1 bg-doubt p-2">
      {findings.map((found) => (
        <li
          key={`${found.code} ${found.entityIds.join(' ')} ${found.text}`}
          className={COLOURS[found.weight]}
        >
          {sentenceText(found.text)}
        </li>
      ))}
    </ul>
  );
}

/** Findings of certain cells of the title block. */
export function findingsFor(
  findings: readonly Finding[] | undefined,
  ...cells: Finding['cell'][]
): Finding[] {
  return (findings ?? []).filter((found) => cells.includes(found.cell));
}
