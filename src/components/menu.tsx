import { type ReactNode, useEffect, useId, useRef, useState } from 'react';

interface MenuProps {
  /** Accessible name of the button. */
  label: string;
  button: ReactNode;
  buttonClassName?: string;
  children: (close: () => void) => ReactNode;
}

/** A button that opens a short list below it; Escape, leaving it or pressing elsewhere closes it. */
export function Menu({ label, button, buttonClassName, children }: MenuProps) {
  const [open, setOpen] = useState(false);
  const root = useRef<HTMLDivElement>(null);
  const trigger = useRef<HTMLButtonElement>(null);
  const listId = useId();
  useEffect(() => {
    if (!open) return;
    const onPointer = (event: PointerEvent) => {
      if (!root.current?.contains(event.target as Node)) setOpen(false);
    };
    const onKey = (event: KeyboardEvent) => {
      if (event.key !== 'Escape') return;
      setOpen(false);
      trigger.current?.focus();
    };
    const onFocus = (event: FocusEvent) => {
      if (!root.current?.contains(event.target as Node)) setOpen(false);
    };
    document.addEventListener('pointerdown', onPointer);
    document.addEventListener('focusin', onFocus);
    document.addEventListener('keydown', onKey);
    return () => {
      document.removeEventListener('pointerdown', onPointer);
      document.removeEventListener('focusin', onFocus);
      document.removeEventListener('keydown', onKey);
    };
  }, [open]);
  return (
    <div ref={root} className="relative">
      <button
        ref={trigger}
        type="button"
        aria-label={label}
        aria-expanded={open}
        aria-controls={listId}
        className={buttonClassName}
        onClick={() => setOpen(!open)}
      >
        {button}
      </button>
      {open ? (
        <div
          id={listId}
          className="absolute right-0 z-20 mt-1 w-[13.75rem] rounded-sheet border border-ink bg-film py-1"
        >
          {children(() => setOpen(false))}
        </div>
      ) : null}
    </div>
  );
}
export const menuItemClass =
  'touch flex w-full items-center px-3 py-1.5 text-left no-underline hover:bg-hover';
