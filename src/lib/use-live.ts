import { useEffect, useRef } from 'react';
import { type LiveListener, listenLive } from './live.ts';

/** Calls the newest `listener` for each thing others change while the component is shown. */
export function useLive(listener: LiveListener): void {
  const newest = useRef(listener);
  useEffect(() => {
    newest.current = listener;
  });
  useEffect(() => listenLive((message) => newest.current(message)), []);
}
