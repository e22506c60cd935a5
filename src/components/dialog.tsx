import { type ReactNode, useEffect, useId, useRef } from 'react';

interface DialogProps {
  title: ReactNode;
  /** Called by Escape and by the caller's own buttons. Without it the dialog cannot be closed by Escape. */
  onClose?: (() => void) | undefined;
  children: ReactNode;
  wide?: boolean;
  /** As wide as a page, for tables. */
  full?: boolean;
}

/** A modal dialog of the browser's own: it holds the focus, gives it back, and Escape closes it. Shown while mounted. */
export function Dialog({ title, onClose, children, wide = false, full = false }: DialogProps) {
  const ref = useRef<HTMLDialogElement>(null);
  const heading = useRef<HTMLHeadingElement>(null);
  const titleId = useId();
  useEffect(() => {
    const dialog = ref.current;
    if (dialog && !dialog.open) dialog.showModal();
    // Where the first control lies below what fits, as under a long list, reading begins at the title.
    if (dialog && heading.current && dialog.scrollTop > 0) {
      // Only now: earlier the browser would take the title for the first control of every dialog.
      heading.current.tabIndex = -1;
      heading.current.focus();
    }
    return () => dialog?.close();
  }, []);
  return (
    <dialog
      ref={ref}
      aria-labelledby={titleId}
      onCancel={(event) => {
        // The caller decides: the dialog goes when it is no longer rendered.
        event.preventDefault();
        onClose?.();
      }}
      className={`m-auto max-h-[calc(100dvh-24px)] w-[calc(100vw-24px)] overflow-auto rounded-sheet border border-ink bg-film p-0 text-ink ${
        full ? 'max-w-[77.5rem]' : wide ? 'max-w-[53.75rem]' : 'max-w-[30rem]'
      }`}
    >
      <h2 ref={heading} id={titleId} className="m-0 border-b border-rule px-4 py-2.5 text-md font-bold">
        {title}
      </h2>
      <div className="p-4">{children}</div>
    </dialog>
  );
}

/** The foot of a form or dialog: the main button first, then the way out. */
export function Actions({ children }: { children: ReactNode }) {
  return <div className="mt-4 flex flex-wrap items-center gap-2">{children}</div>;
}
