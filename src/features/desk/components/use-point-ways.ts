import { useEffect, useState } from 'react';
import type { FlowNetDocument } from '#shared/contract/document.ts';
import { type AskedWorker, createAsked } from '../model/asked-worker.ts';
import { explanationGuides } from '../model/check-guides.ts';
import type { DeskStore } from '../model/desk-state.ts';
import type { WaysAnswer, WaysQuestion } from '../model/ways-worker.ts';

type WaysWorker = AskedWorker<WaysQuestion, WaysAnswer>;
export type WaysState = 'working' | 'shown' | 'none' | 'failed';

function startWorker(): WaysWorker {
  return new Worker(new URL('../model/ways-worker.ts', import.meta.url), { type: 'module' }) as WaysWorker;
}

/**
 * Draws over the sheet how a point is read by hand, as long as the component that uses this is there. `document` is the
 * one that the reading shown is of; null while there is no reading to explain.
 */
export function usePointWays(
  store: DeskStore,
  document: FlowNetDocument | null,
  pointId: string,
  start: () => WaysWorker = startWorker,
): WaysState {
  const [state, setState] = useState<WaysState>('none');
  useEffect(() => {
    if (document === null) {
      setState('none');
      return;
    }
    setState('working');
    const asked = createAsked<WaysQuestion, WaysAnswer>({
      start,
      onAnswer(ways) {
        store.setGuides('explanation', ways === null ? null : explanationGuides(ways));
        setState(ways === null ? 'none' : 'shown');
      },
      onFailure: () => setState('failed'),
    });
    asked.ask({ document, pointId });
    return () => {
      asked.cancel();
      store.setGuides('explanation', null);
    };
  }, [store, document, pointId, start]);
  return state;
}
