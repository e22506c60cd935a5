import { type ReactNode, useId, useRef, useState } from 'react';
import { classNames } from './class-names.ts';

interface AnchoredListProps {
  /** Accessible name of the button and its hint; left out where the button says it itself. */
  label?: string;
  /** Accessible name of what opens. */
  listLabel: string;
  button: ReactNode;
  buttonClassName?: string;
  disabled?: boolean;
  listClassName?: string;
  children: (close: () => void) => ReactNode;
}

/** A button that opens a list over everything else, above or below itself; Escape or a press elsewhere closes it. */
export function AnchoredList(props: AnchoredListProps) {
  const [open, setOpen] = useState(false);
  const listId = useId();
  const button = useRef<HTMLButtonElement>(null);
  const list = useRef<HTMLDivElement>(null);
  return (
    <>
      <button
        ref={button}
        type="button"
        aria-label={props.label}
        title={props.label}
        aria-expanded={open}
        disabled={props.disabled}
        popoverTarget={listId}
        className={props.buttonClassName}
      >
        {props.button}
      </button>
      <div
        ref={list}
        id={listId}
        popover="auto"
        role="dialog"
        aria-label={props.listLabel}
        className={classNames(
          'm-0 max-h-[60dvh] max-w-[calc(100vw-16px)] overflow-y-auto rounded-sheet border border-ink bg-film p-0 text-ink',
          props.listClassName,
        )}
        onToggle={(event) => {
          const shown = event.newState === 'open';
          setOpen(shown);
          if (shown && button.current) placeBeside(event.currentTarget, button.current);
        }}
      >
        {open ? props.children(() => list.current?.hidePopover()) : null}
      </div>
    </>
  );
}

const GAP_PX = 4;
const EDGE_PX = 8;

/** Above or below its button, on whichever side there is more room. */
function placeBeside(list: HTMLElement, button: HTMLElement): void {
  const { left, top, bottom } = button.getBoundingClientRect();
  const { innerWidth, innerHeight } = window;
  const above = top > innerHeight - bottom;
  Object.assign(list.style, {
    left: `${Math.max(EDGE_PX, Math.min(left, innerWidth - list.offsetWidth - EDGE_PX))}px`,
    right: 'auto',
    top: above ? 'auto' : `${bottom + GAP_PX}px`,
    bottom: above ? `${innerHeight - top + GAP_PX}px` : 'auto',
  });
}
