import { useState } from 'react';
import { useStore } from 'zustand';
import { AnchoredList } from '#client/components/anchored-list.tsx';
import { classNames } from '#client/components/class-names.ts';
import { historyText as text } from '#client/text/history.ts';
import type { DeskStore } from '../model/desk-state.ts';
import type { HistoryKeeping } from '../saving/keep-history.ts';

/** Longer lists are shown in parts of so many. */
const PART = 60;

interface HistoryStepsProps {
  store: DeskStore;
  from: 'done' | 'undone';
  keeping: HistoryKeeping | null;
}

/** A button that lists the steps by name, the newest first; pressing one takes it and all above it. */
export function HistorySteps({ store, from, keeping }: HistoryStepsProps) {
  const steps = useStore(store, (state) => state.steps[from]);
  const back = from === 'done';
  return (
    <AnchoredList
      label={back ? text.undoSteps : text.redoSteps}
      listLabel={back ? text.undoList : text.redoList}
      button={<Chevron />}
      buttonClassName="border-0 bg-transparent px-2 py-1.5 text-ink-2 hover:bg-hover disabled:opacity-55 touch"
      disabled={steps.length === 0}
      listClassName="w-[18.75rem]"
    >
      {(close) => (
        <>
          <StepList
            steps={steps.map(({ label }) => label || text.unnamed).reverse()}
            back={back}
            onTake={(count) => {
              close();
              if (back) store.undo(count);
              else store.redo(count);
            }}
          />
          {back && keeping ? <KeptNote keeping={keeping} /> : null}
        </>
      )}
    </AnchoredList>
  );
}

function Chevron() {
  return (
    <svg width="9" height="9" viewBox="0 0 9 9" aria-hidden="true">
      <path d="M1 6 4.5 2.5 8 6" fill="none" stroke="currentColor" strokeWidth="1.4" />
    </svg>
  );
}

function StepList({
  steps,
  back,
  onTake,
}: {
  steps: readonly string[];
  back: boolean;
  onTake: (count: number) => void;
}) {
  const [shown, setShown] = useState(PART);
  const [reach, setReach] = useState(1);
  return (
    <>
      <p
        aria-live="polite"
        className="sticky top-0 m-0 border-b border-rule bg-film px-3 py-1.5 text-sm text-ink-2"
      >
        {back ? text.undoCount(reach) : text.redoCount(reach)}
      </p>
      <ol className="m-0 list-none p-0">
        {steps.slice(0, shown).map((label, i) => {
          const count = i + 1;
          return (
            // The place from the top is what a step is here: the same words may come twice.
            // biome-ignore lint/suspicious/noArrayIndexKey: see above
            <li key={i}>
              <button
                type="button"
                aria-label={back ? text.undoTo(label, count) : text.redoTo(label, count)}
                className={classNames(
                  'block w-full border-0 px-3 py-1 text-left first-letter:uppercase touch',
                  count <= reach ? 'bg-chosen' : 'bg-transparent',
                )}
                onPointerEnter={() => setReach(count)}
                onFocus={() => setReach(count)}
                onClick={() => onTake(count)}
              >
                {label}
              </button>
            </li>
          );
        })}
      </ol>
      {steps.length > shown ? (
        <button
          type="button"
          className="block w-full border-0 border-t border-rule bg-transparent px-3 py-1.5 text-left text-sm underline touch"
          onClick={() => setShown(shown + PART)}
        >
          {text.more(Math.min(PART, steps.length - shown))}
        </button>
      ) : null}
    </>
  );
}

function KeptNote({ keeping }: { keeping: HistoryKeeping }) {
  const { kept, dropped } = useStore(keeping.facts);
  return (
    <p className="m-0 border-t border-rule px-3 py-1.5 text-sm text-ink-2">
      {kept ? text.kept : text.notKept}
      {kept && dropped > 0 ? ` ${text.dropped(dropped)}` : null}
    </p>
  );
}
