import { useEffect, useId, useRef, useState } from 'react';
import { useStore } from 'zustand';
import { classNames } from '#client/components/class-names.ts';
import { sheetAidsText as text } from '#client/text/tracing-aids.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { SHEET_KINDS } from '../model/sheet-kinds.ts';
import { LinesList } from './lines-list.tsx';
import { SnapSwitches } from './snap-switches.tsx';
import { ViewLook } from './view-look.tsx';

type Aid = 'lines' | 'snap' | 'view';

/** The buttons over the sheet that open what is on it, what is snapped to and how it looks. */
export function SheetAids({ store, noteCount }: { store: DeskStore; noteCount: number }) {
  const [open, setOpen] = useState<Aid | null>(null);
  const readOnly = useStore(store, (state) => state.readOnly);
  const opened = useRef<HTMLElement>(null);
  const buttons = useRef<Partial<Record<Aid, HTMLButtonElement | null>>>({});
  const panelId = useId();
  const toggle = (aid: Aid) => setOpen((now) => (now === aid ? null : aid));
  const close = () => {
    if (open !== null) buttons.current[open]?.focus();
    setOpen(null);
  };

  useEffect(
    () =>
      store.onIntent((intent) => {
        if (intent.type === 'showLines') setOpen((now) => (now === 'lines' ? null : 'lines'));
      }),
    [store],
  );
  useEffect(() => {
    const panel = opened.current;
    if (open === null || panel === null) return;
    panel.focus();
    // Over the panel the wheel scrolls the panel; let through, it would zoom the sheet beneath.
    const keep = (event: WheelEvent) => event.stopPropagation();
    panel.addEventListener('wheel', keep);
    const unfollow = keepRoomBelow(panel);
    return () => {
      panel.removeEventListener('wheel', keep);
      unfollow();
    };
  }, [open]);

  const aids: readonly Aid[] = readOnly ? ['lines', 'view'] : ['lines', 'snap', 'view'];
  return (
    <>
      <fieldset data-over-sheet className="m-0 flex rounded-sheet border border-rule bg-film p-0">
        <legend className="sr-only">{text.title}</legend>
        {aids.map((aid, i) => (
          <button
            key={aid}
            ref={(button) => {
              buttons.current[aid] = button;
            }}
            type="button"
            aria-expanded={aid === open}
            aria-controls={aid === open ? panelId : undefined}
            aria-keyshortcuts={aid === 'lines' ? 'H' : undefined}
            className={classNames(
              'touch border-0 px-2.5 py-1 leading-[1.4] whitespace-nowrap hover:bg-hover',
              i > 0 && 'border-l border-rule',
              aid === open ? 'bg-chosen font-semibold' : 'bg-transparent',
            )}
            onClick={() => toggle(aid)}
          >
            {text[aid]}
          </button>
        ))}
      </fieldset>
      {open === null ? null : (
        <section
          ref={opened}
          id={panelId}
          tabIndex={-1}
          data-over-sheet
          aria-label={text[open]}
          className="absolute top-full right-0 z-10 mt-2 max-h-[min(56dvh,27rem,var(--room-below))] w-[min(20rem,100%)] touch-pan-y overflow-y-auto rounded-sheet border border-ink bg-film px-3 py-2.5"
          onKeyDown={(event) => {
            if (event.key !== 'Escape') return;
            event.stopPropagation();
            event.preventDefault();
            close();
          }}
        >
          {open === 'lines' ? <LinesList store={store} noteCount={noteCount} /> : null}
          {open === 'snap' ? <SnapSwitches store={store} /> : null}
          {open === 'view' ? <ViewLook store={store} /> : null}
        </section>
      )}
    </>
  );
}

const EDGE_PX = 8;

/** Keeps a panel above the foot of the sheet, however many rows of buttons stand over it. */
function keepRoomBelow(panel: HTMLElement): () => void {
  const sheet = panel.closest('[data-sheet]');
  const buttons = panel.offsetParent;
  if (sheet === null || buttons === null) return () => {};
  const fit = () => {
    const room = sheet.getBoundingClientRect().bottom - panel.getBoundingClientRect().top - EDGE_PX;
    panel.style.setProperty('--room-below', `${room}px`);
  };
  const observer = new ResizeObserver(fit);
  observer.observe(sheet);
  observer.observe(buttons);
  return () => observer.disconnect();
}

/** Says on the sheet which kinds are hidden: what is not seen is easily taken for what is not there. */
export function HiddenHint({ store }: { store: DeskStore }) {
  const hidden = useStore(store, (state) => state.hiddenKinds);
  if (hidden.length === 0) return null;
  const listed = SHEET_KINDS.filter((kind) => hidden.includes(kind));
  return (
    <p className="m-0 flex max-w-96 items-center gap-3 rounded-sheet border border-attention bg-doubt px-2.5 py-1 text-sm">
      <span className="min-w-0">{text.hidden(listed)}</span>
      <button
        type="button"
        data-over-sheet
        className="touch shrink-0 underline"
        onClick={() => store.setHidden([])}
      >
        {text.showAll}
      </button>
    </p>
  );
}
