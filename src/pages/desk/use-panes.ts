import { useState, useSyncExternalStore } from 'react';
import { useStore } from 'zustand';
import {
  foldedPane,
  type PaneSizes,
  parsePanes,
  type WindowSize,
} from '#client/features/desk/model/pane-sizes.ts';
import { keptLocally } from '#client/lib/kept-locally.ts';
import type { DeskPane } from './desk-grid.tsx';

export interface Panes {
  sizes: PaneSizes;
  window: WindowSize;
  change(to: (sizes: PaneSizes) => PaneSizes): void;
  /** Unfolds the pane that holds a part of the desk which was asked for. */
  bring(part: DeskPane): void;
}

/** The panes about the sheet as this person last had them on this browser. */
export function usePanes(personId: string): Panes {
  const [kept] = useState(() => keptLocally(`tracehead panes ${personId}`, parsePanes));
  const sizes = useStore(kept);
  const widthPx = useSyncExternalStore(onWindowSize, () => window.innerWidth);
  const heightPx = useSyncExternalStore(onWindowSize, () => window.innerHeight);
  const change = (to: (sizes: PaneSizes) => PaneSizes) => kept.setState(to, true);
  return {
    sizes,
    window: { widthPx, heightPx },
    change,
    bring(part) {
      if (part === 'sheet') return;
      const pane = part === 'schedule' ? 'figures' : 'margin';
      if (kept.getState()[pane].folded) change((now) => foldedPane(now, pane, false));
    },
  };
}

function onWindowSize(changed: () => void): () => void {
  window.addEventListener('resize', changed);
  return () => window.removeEventListener('resize', changed);
}
