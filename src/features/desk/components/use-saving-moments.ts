import { useEffect } from 'react';
import { onSignInMoment } from '#client/lib/sign-in-state.ts';
import { couldLoseWork } from '../saving/save-state.ts';
import type { Saving } from '../saving/saving.ts';

/** Sends at once when waiting makes no sense any more, and warns before leaving only what nothing has kept. */
export function useSavingMoments(saving: Saving | null): void {
  useEffect(() => {
    if (!saving) return;
    const flush = () => void saving.flush();
    const warn = (event: BeforeUnloadEvent) => {
      if (couldLoseWork(saving.state.getState())) event.preventDefault();
    };
    const endMoments = onSignInMoment((moment) => moment === 'signedIn' && flush());
    window.addEventListener('online', flush);
    window.addEventListener('beforeunload', warn);
    // Hidden is the last moment a page is sure to be told of on a phone.
    document.addEventListener('visibilitychange', flush);
    return () => {
      endMoments();
      window.removeEventListener('online', flush);
      window.removeEventListener('beforeunload', warn);
      document.removeEventListener('visibilitychange', flush);
    };
  }, [saving]);
}
