import { useStore } from 'zustand';
import { formatTime } from '#client/lib/dates.ts';
import { shortName } from '#client/lib/initials.ts';
import { savingText as text } from '#client/text/saving.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { type SaveState, saveStateOf } from '../saving/save-state.ts';
import type { Saving } from '../saving/saving.ts';

const LINK = 'touch underline underline-offset-2';

/** The state of saving, in the top bar: what happens by itself in grey, what needs the person in colour. */
export function SavingLine({
  saving,
  store,
  onCompare,
}: {
  saving: Saving;
  store: DeskStore;
  onCompare: () => void;
}) {
  const facts = useStore(saving.state);
  const state = saveStateOf(facts);
  return (
    <div
      role="status"
      className="flex max-w-[33.75rem] flex-wrap items-center justify-end gap-x-2 text-right"
    >
      <span className={colourOf(state)}>{sentenceOf(state, store, facts.conflicts[0]?.entityId)}</span>
      {state.kind === 'conflict' ? (
        <button type="button" className={LINK} onClick={onCompare}>
          {text.compare}
        </button>
      ) : null}
      {state.kind === 'refused' ? (
        <button type="button" className={LINK} onClick={() => saving.forgetRefused()}>
          {text.forget}
        </button>
      ) : null}
      {state.kind === 'waiting' ? (
        <button type="button" className={LINK} onClick={() => void saving.flush()}>
          {text.tryAgain}
        </button>
      ) : null}
    </div>
  );
}

function colourOf(state: SaveState): string {
  if (state.kind === 'saved' || state.kind === 'saving') return 'text-ink-2';
  return state.kind === 'refused' ? 'text-wrong' : 'text-attention';
}

function sentenceOf(state: SaveState, store: DeskStore, conflictId: string | undefined): string {
  switch (state.kind) {
    case 'saved':
      return state.at === null ? text.allSaved : text.saved(formatTime(new Date(state.at).toISOString()));
    case 'saving':
      return text.saving;
    case 'refused':
      return text.refused(state.label, state.reason, state.requestId);
    case 'conflict': {
      const name = state.changedBy === null ? null : shortName(state.changedBy);
      return text.conflict(state.count, name, thingOf(store, conflictId));
    }
    case 'waiting':
      return waitingSentence(state);
  }
}

function waitingSentence({ failure, kept }: Extract<SaveState, { kind: 'waiting' }>): string {
  if (failure === 'offline') return kept ? text.offlineKept : text.offlineNotKept;
  if (failure === 'server') return kept ? text.serverKept : text.serverNotKept;
  return text[failure];
}

function thingOf(store: DeskStore, entityId: string | undefined): string {
  const { document, conflicts } = store.getState();
  const kind =
    entityId === undefined
      ? undefined
      : (document.entities[entityId]?.value.kind ?? conflicts[entityId]?.theirs?.kind);
  return text.things[kind ?? 'line'];
}
