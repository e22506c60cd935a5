import { createStore, type StoreApi } from 'zustand/vanilla';
import {
  PRESENCE_BEAT_MS,
  PRESENCE_LEASE_MS,
  type PresenceBeat,
  type PresenceDto,
  type PresentDesk,
} from '#shared/contract/presence.ts';
import type { PresenceApi } from '../api/presence-api.ts';
import type { DeskState, DeskStore } from '../model/desk-state.ts';

export interface Presence {
  /** The other open desks on this net. */
  others: StoreApi<readonly PresentDesk[]>;
  /** To be called when the server says that somebody came, went or took up something else. */
  refresh(): void;
  /** Counts the person as gone while nobody looks, and as back at the next call. */
  setAway(away: boolean): void;
  /** Says that this desk is left. */
  stop(): void;
}

/** What is taken up and laid down again within this time is not told. */
const SETTLE_MS = 250;

/** Gives signs of life of an open desk, at once when something else is taken up, and knows the others. */
export function startPresence(
  desk: DeskStore,
  clientId: string,
  api: PresenceApi,
  now: () => number,
): Presence {
  const others = createStore<readonly PresentDesk[]>(() => []);
  let heardAt = now();
  let away = false;
  let stopped = false;
  let timer: ReturnType<typeof setTimeout> | null = null;

  function take({ desks }: PresenceDto): void {
    heardAt = now();
    if (!stopped)
      others.setState(
        desks.filter((each) => each.clientId !== clientId),
        true,
      );
  }

  /** Without an answer for so long nobody can say who is still here. */
  function missed(): void {
    if (now() - heardAt > PRESENCE_LEASE_MS) others.setState([], true);
  }

  function signIn(pauseMs: number): void {
    if (timer) clearTimeout(timer);
    timer = stopped || away ? null : setTimeout(sign, pauseMs);
  }

  function sign(): void {
    const told = inHand(desk.getState());
    api
      .beat(told)
      .then(take, missed)
      .finally(() => signIn(sameHand(told, inHand(desk.getState())) ? PRESENCE_BEAT_MS : SETTLE_MS));
  }

  function leave(): void {
    if (timer) clearTimeout(timer);
    timer = null;
    // Not heard, the lease ends it.
    api.leave().catch(() => {});
  }

  const endChanges = desk.subscribe((state, before) => {
    if (!sameHand(inHand(state), inHand(before))) signIn(SETTLE_MS);
  });
  signIn(0);

  return {
    others,
    refresh: () => void api.present().then(take, missed),
    setAway(next) {
      if (next === away || stopped) return;
      away = next;
      if (away) leave();
      else signIn(0);
    },
    stop() {
      if (stopped) return;
      stopped = true;
      endChanges();
      if (!away) leave();
    },
  };
}

/** The tool in hand, and the one line or point that is under way or chosen. */
export function inHand({ tool, draft, selection }: DeskState): PresenceBeat {
  const chosen = selection.ids.length === 1 ? (selection.ids[0] ?? null) : null;
  return { tool, entityId: draft?.lineId ?? chosen };
}

const sameHand = (a: PresenceBeat, b: PresenceBeat) => a.tool === b.tool && a.entityId === b.entityId;
