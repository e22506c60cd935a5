import { useEffect, useRef } from 'react';

const isField = (target: EventTarget | null) =>
  target instanceof HTMLElement &&
  (target.isContentEditable || /^(input|textarea|select)$/i.test(target.tagName));

/** Calls `goOn` at the key "." anywhere on the page but in a field or a dialog. */
export function useNextOpenKey(goOn: () => void): void {
  const newest = useRef(goOn);
  useEffect(() => {
    newest.current = goOn;
  });
  useEffect(() => {
    const onKey = (event: KeyboardEvent) => {
      if (event.key !== '.' || event.ctrlKey || event.metaKey || event.altKey) return;
      if (event.defaultPrevented || isField(event.target) || document.querySelector('dialog[open]')) return;
      event.preventDefault();
      newest.current();
    };
    window.addEventListener('keydown', onKey);
    return () => window.removeEventListener('keydown', onKey);
  }, []);
}
