import { useQueryClient } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { onSignInMoment } from '#client/lib/sign-in-state.ts';
import { sessionKeys } from '../api/session-queries.ts';

/**
 * True from the moment an answer says that the session has ended until somebody signs in. After signing in,
 * whatever failed meanwhile is loaded again.
 */
export function useSessionEnd(): boolean {
  const [ended, setEnded] = useState(false);
  const queryClient = useQueryClient();
  useEffect(
    () =>
      onSignInMoment((moment) => {
        setEnded(moment === 'signedOut');
        if (moment === 'signedIn')
          void queryClient.invalidateQueries({
            predicate: (query) => query.queryKey[0] !== sessionKeys.root[0],
          });
      }),
    [queryClient],
  );
  return ended;
}
