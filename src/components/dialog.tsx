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
  const titleId = useId();
  useEffect(() => {
    const dialog = ref.current;
    if (dialog && !dialog.open) dialog.showModal();
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
        full ? 'max-w-[1240px]' : wide ? 'max-w-[860px]' : 'max-w-[480px]'
      }`}
    >
      <h2 id={titleId} className="m-0 border-b border-rule px-4 py-2.5 text-md font-bold">
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
