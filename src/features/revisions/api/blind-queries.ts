import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type * as z from 'zod/mini';
import { getJson, sendJson } from '#client/lib/http.ts';
import { blindDto, type blindReadingInput } from '#shared/contract/review.ts';
import { revisionDto } from '#shared/contract/revisions.ts';
import { revisionKeys } from './revision-queries.ts';

const blindKey = (revisionId: string) => [...revisionKeys.root, 'blind', revisionId] as const;

/** What is shown to a reviewer who may still read blind; a null view for everybody else. */
export const blindQuery = (revisionId: string) =>
  queryOptions({
    queryKey: blindKey(revisionId),
    queryFn: ({ signal }) => getJson(`/revisions/${revisionId}/blind`, blindDto, { signal }),
  });

/** Asks where the engineer's points lie. */
export function useShowPlaces(revisionId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: () => sendJson('POST', `/revisions/${revisionId}/point-places`, blindDto, { body: {} }),
    onSuccess: (shown) => queryClient.setQueryData(blindKey(revisionId), shown),
  });
}

export const useOpenFigures = (revisionId: string) => useOpening<void>(revisionId, 'figure-openings');

export const useSealBlindReading = (revisionId: string) =>
  useOpening<z.input<typeof blindReadingInput>>(revisionId, 'blind-readings');

/** What opens the figures answers with the revision, which takes the place of the blind view. */
function useOpening<Body>(revisionId: string, records: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: Body) =>
      sendJson('POST', `/revisions/${revisionId}/${records}`, revisionDto, { body: body ?? {} }),
    onSuccess: (revision) => {
      queryClient.setQueryData(revisionKeys.detail(revisionId), revision);
      queryClient.setQueryData(blindKey(revisionId), { view: null });
      // Whatever was refused while the figures were kept back is asked for again.
      return queryClient.invalidateQueries({ queryKey: revisionKeys.root });
    },
  });
}
