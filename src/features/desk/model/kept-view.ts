import { keptLocally } from '#client/lib/kept-locally.ts';
import type { DeskStore, HideableKind } from './desk-state.ts';
import { SHEET_KINDS } from './sheet-kinds.ts';
import { SNAP_KINDS } from './tool-overlay.ts';
import { FIRST_AIDS, LINE_WEIGHTS, MOST_FADE_PCT, type ViewAids } from './view-aids.ts';

/** What a person has chosen to see and to be helped by. */
export type KeptView = {
  readonly hidden: readonly HideableKind[];
  readonly locked: readonly HideableKind[];
  readonly aids: ViewAids;
};

/** What was kept, each part as chosen first where it is missing or no longer understood. */
export function parseKeptView(kept: string | null): KeptView {
  const said = objectOf(kept);
  const aids = (said.aids ?? {}) as Partial<Record<keyof ViewAids, unknown>>;
  const { snapKinds, fadePct, lineWeight } = aids;
  return {
    hidden: listed(SHEET_KINDS, said.hidden) ?? [],
    locked: listed(SHEET_KINDS, said.locked) ?? [],
    aids: {
      snapKinds: listed(SNAP_KINDS, snapKinds) ?? FIRST_AIDS.snapKinds,
      liveHelp: isSwitch(aids.liveHelp) ? aids.liveHelp : FIRST_AIDS.liveHelp,
      lineWeight: LINE_WEIGHTS.find((weight) => weight === lineWeight) ?? FIRST_AIDS.lineWeight,
      fadePct:
        typeof fadePct === 'number' && fadePct >= 0 && fadePct <= MOST_FADE_PCT
          ? fadePct
          : FIRST_AIDS.fadePct,
      inverted: isSwitch(aids.inverted) ? aids.inverted : FIRST_AIDS.inverted,
    },
  };
}

/** Gives a desk what its person chose before, and keeps what is chosen from now on; gives a function that ends it. */
export function keepView(store: DeskStore, personId: string): () => void {
  const kept = keptLocally(`tracehead view ${personId}`, parseKeptView);
  const { hidden, locked, aids } = kept.getState();
  store.setHidden(hidden);
  store.setLocked(locked);
  store.setAids(aids);
  return store.subscribe((state, before) => {
    const { hiddenKinds, lockedKinds } = state;
    const same =
      hiddenKinds === before.hiddenKinds && lockedKinds === before.lockedKinds && state.aids === before.aids;
    if (!same) kept.setState({ hidden: hiddenKinds, locked: lockedKinds, aids: state.aids }, true);
  });
}

function objectOf(kept: string | null): Partial<Record<keyof KeptView, unknown>> {
  try {
    const said: unknown = JSON.parse(kept ?? '{}');
    return typeof said === 'object' && said !== null ? said : {};
  } catch {
    return {};
  }
}

function listed<T extends string>(known: readonly T[], said: unknown): T[] | null {
  return Array.isArray(said) ? known.filter((each) => said.includes(each)) : null;
}

function isSwitch(said: unknown): said is boolean {
  return typeof said === 'boolean';
}
