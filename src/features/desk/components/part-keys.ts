import { useEffect } from 'react';
import { type KeyBinding, runKey } from './key-binding.ts';

/** By these the parts of the desk are marked between which F6 goes. */
const PART = '[data-desk-part]';
const TAKES_FOCUS =
  '[role="application"][tabindex="0"], a[href], button:not(:disabled), input:not(:disabled), select:not(:disabled), textarea:not(:disabled), [tabindex="0"]';

/** Work in fields too: they are the way from a form back to the sheet. */
export const PART_KEYS: readonly KeyBinding<Document>[] = [
  {
    id: 'nextPart',
    group: 'about',
    presses: [{ key: 'F6' }],
    run: (document) => goToPart(document, 1),
  },
  {
    id: 'previousPart',
    group: 'about',
    presses: [{ key: 'F6', shift: true }],
    run: (document) => goToPart(document, -1),
  },
];

export function usePartKeys(): void {
  useEffect(() => {
    const key = (event: KeyboardEvent) => {
      const inDialog = event.target instanceof Element && event.target.closest('dialog') !== null;
      if (!inDialog && runKey(PART_KEYS, event, document)) event.preventDefault();
    };
    document.addEventListener('keydown', key);
    return () => document.removeEventListener('keydown', key);
  }, []);
}

/** Gives the focus to the first thing that takes it in the next part that is shown. */
function goToPart(document: Document, step: 1 | -1): boolean {
  const parts = [...document.querySelectorAll<HTMLElement>(PART)].flatMap((part) => {
    const first = firstIn(part);
    return first === null ? [] : [{ part, first }];
  });
  if (parts.length === 0) return false;
  // A part may hold another, as the margin holds the title block.
  const here = parts.findLastIndex(({ part }) => part.contains(document.activeElement));
  const next = here === -1 && step === -1 ? parts.length - 1 : (here + step + parts.length) % parts.length;
  parts[next]?.first.focus();
  return true;
}

function firstIn(part: HTMLElement): HTMLElement | null {
  const takers = [...part.querySelectorAll<HTMLElement>(TAKES_FOCUS)].filter((each) =>
    each.checkVisibility({ visibilityProperty: true }),
  );
  // The sheet itself comes before the buttons that lie over it.
  return takers.find((each) => each.matches('[data-sheet]')) ?? takers[0] ?? null;
}

/** Gives the keys to the sheet. */
export function focusSheet(): void {
  document.querySelector<HTMLElement>('[data-sheet]')?.focus();
}
