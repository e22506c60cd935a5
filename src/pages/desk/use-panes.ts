import { useState, useSyncExternalStore } from 'react';
import { useStore } from 'zustand';
import {
  foldedPane,
  type PaneSizes,
  parsePanes,
  type WindowSize,
} from '#client/features/desk/model/pane-sizes.ts';
import { keptLocally } from '#client/lib/kept-locally.ts';
import { useLetterScale } from '#client/lib/letter-scale.ts';
import type { DeskPane } from './desk-grid.tsx';

export interface Panes {
  sizes: PaneSizes;
  /** In pixels at the usual size of letters, as the sizes are. */
  window: WindowSize;
  /** Pixels of the screen to one of those. */
  letterScale: number;
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
  const letterScale = useLetterScale();
  const change = (to: (sizes: PaneSizes) => PaneSizes) => kept.setState(to, true);
  return {
    sizes,
    window: { widthPx: widthPx / letterScale, heightPx: heightPx / letterScale },
    letterScale,
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
