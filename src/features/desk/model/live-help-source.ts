import { createStore, type StoreApi } from 'zustand/vanilla';
import { type SheetPx, sheetPx } from '#shared/compute/frames.ts';
import type { DeskStore } from './desk-state.ts';
import { lineInHand } from './line-in-hand.ts';
import { type LiveHelp, liveHelpOf } from './live-help.ts';
import type { HeadRead } from './reading-port.ts';
import type { SnapKind, ToolOverlay } from './tool-overlay.ts';

/** A head that was asked for, with the place it is of. */
export type HeadThere = HeadRead & { readonly at: SheetPx };

export type HelpShown = {
  /** The place in hand: on what it snaps to. */
  readonly at: SheetPx;
  readonly help: LiveHelp;
  readonly snap: SnapKind | null;
  /** Null until the worker has answered for a place so near that it still holds. */
  readonly head: HeadThere | null;
};

export type LiveHelpSource = {
  readonly state: StoreApi<{ readonly shown: HelpShown | null }>;
  /** Follows the pointer: to be told of every change of what the tool shows under it. `zoom`: screen px a sheet px. */
  follow(pointer: SheetPx | null, overlay: ToolOverlay, zoom: number): void;
};

/** A head is shown on while the pointer is no farther from where it was asked for, screen pixels. */
const SAME_PLACE_PX = 6;

/** What is told beside the pointer while a line is drawn or a vertex dragged; nothing while it is switched off. */
export function createLiveHelp(store: DeskStore): LiveHelpSource {
  const state = createStore<{ readonly shown: HelpShown | null }>(() => ({ shown: null }));
  let head: HeadThere | null = null;
  let asked: SheetPx | null = null;
  let before: readonly unknown[] = [];

  function ask(at: SheetPx): void {
    if (asked !== null && asked[0] === at[0] && asked[1] === at[1]) return;
    asked = at;
    void store.headAt([at[0], at[1]]).then((read) => {
      if (read === null) return;
      head = { ...read, at };
      const { shown } = state.getState();
      if (shown !== null && asked === at) state.setState({ shown: { ...shown, head } });
    });
  }

  return {
    state,
    follow(pointer, overlay, zoom) {
      const { document, draft, preview, reading, hiddenKinds, aids } = store.getState();
      // Asked for the scene and for the pointer, it answers once.
      const { snap, path } = overlay;
      const now = [document, draft, preview, reading, hiddenKinds, aids, pointer, snap?.kind, path];
      if (now.every((part, i) => part === before[i])) return;
      before = now;
      const hand =
        pointer === null || !aids.liveHelp ? null : lineInHand({ document, draft, preview }, overlay);
      if (hand === null) {
        if (state.getState().shown !== null) state.setState({ shown: null });
        return;
      }
      const at = sheetPx(...hand.points[hand.index]!);
      const holds =
        head !== null && Math.hypot(head.at[0] - at[0], head.at[1] - at[1]) * zoom <= SAME_PLACE_PX;
      const help = liveHelpOf(hand, { document, reading, hiddenKinds });
      state.setState({ shown: { at, help, snap: overlay.snap?.kind ?? null, head: holds ? head : null } });
      ask(at);
    },
  };
}
