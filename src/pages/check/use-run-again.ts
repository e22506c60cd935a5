import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useMemo, useState } from 'react';
import { readOnce } from '#client/features/desk/model/read-once.ts';
import { besideFrozen, type RunAgain } from '#shared/compute/compare-figures/run-again.ts';
import { ENGINE_VERSION } from '#shared/compute/engine-version.ts';
import type { RevisionPayload } from '#shared/contract/revisions.ts';

export interface RunAgainState {
  state: 'none' | 'working' | 'failed' | 'done';
  result: RunAgain | null;
  run: () => void;
  cancel: () => void;
}

/**
 * The frozen document read by the present engine, as the desk reads a net: in a worker of this browser. Nothing is sent
 * and nothing kept, so that the record cannot be touched by it.
 */
export function useRunAgain({ revisionId, document, reading }: RevisionPayload): RunAgainState {
  const queryClient = useQueryClient();
  const queryKey = useMemo(() => ['runAgain', revisionId, ENGINE_VERSION], [revisionId]);
  const [asked, setAsked] = useState(false);
  const query = useQuery({
    queryKey,
    queryFn: ({ signal }) => readOnce(document, signal),
    enabled: asked,
    staleTime: Number.POSITIVE_INFINITY,
    retry: false,
  });
  const now = asked ? query.data : undefined;
  const result = useMemo(() => (now ? besideFrozen(document, reading, now) : null), [document, reading, now]);
  return {
    state: query.isFetching ? 'working' : result ? 'done' : asked && query.isError ? 'failed' : 'none',
    result,
    run() {
      if (asked) void query.refetch();
      setAsked(true);
    },
    cancel() {
      setAsked(false);
      void queryClient.cancelQueries({ queryKey });
    },
  };
}
