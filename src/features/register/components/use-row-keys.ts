import { type RefObject, useEffect } from 'react';

/** Marks the link of a row, among which the arrow keys go. */
export const ROW_LINK = 'data-row-link';

const isTyping = (target: EventTarget | null) =>
  target instanceof HTMLElement && target.matches('input:not([type=checkbox]), select, textarea');

/** "/" goes to the search, down and up go through the rows, and up from the first one back to the search. */
export function useRowKeys(search: RefObject<HTMLInputElement | null>): void {
  useEffect(() => {
    const onKey = (event: KeyboardEvent) => {
      if (event.defaultPrevented || event.ctrlKey || event.metaKey || event.altKey) return;
      const target = targetOf(event, search.current);
      if (!target) return;
      event.preventDefault();
      target.focus();
      if (target instanceof HTMLInputElement) target.select();
    };
    document.addEventListener('keydown', onKey);
    return () => document.removeEventListener('keydown', onKey);
  }, [search]);
}

function targetOf(event: KeyboardEvent, search: HTMLInputElement | null): HTMLElement | null {
  if (event.key === '/') return isTyping(event.target) ? null : search;
  const step = event.key === 'ArrowDown' ? 1 : event.key === 'ArrowUp' ? -1 : 0;
  if (step === 0) return null;
  const links = [...document.querySelectorAll<HTMLElement>(`[${ROW_LINK}]`)];
  if (event.target === search) return step > 0 ? (links[0] ?? null) : null;
  const at = links.indexOf(event.target as HTMLElement);
  if (at < 0) return null;
  return at + step < 0 ? search : (links[at + step] ?? null);
}
