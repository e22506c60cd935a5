import { keepPreviousData, useQuery, useQueryClient } from '@tanstack/react-query';
import { useMemo } from 'react';
import { netKeys, netQuery } from '#client/features/desk/api/net-queries.ts';
import { readOnce } from '#client/features/desk/model/read-once.ts';
import { revisionQuery } from '#client/features/revisions/api/revision-queries.ts';
import type { ComparedSide } from '#client/lib/paths.ts';
import { useLive } from '#client/lib/use-live.ts';
import { type ComparedNet, draftOf, frozenOf, type UnreadNet } from './compared-net.ts';

export interface LoadedSide {
  /** Whether a net was chosen for it. */
  asked: boolean;
  /** The net as soon as it is known, its reading as soon as it is worked out. */
  unread: UnreadNet | null;
  net: ComparedNet | null;
  /** What kept it from being fetched; null where nothing did. */
  error: unknown;
  /** True when the reading of a draft failed. */
  unreadable: boolean;
}

/**
 * One side of the comparison. A revision brings the reading that was frozen with it; a draft is read here, by the same
 * engine as on the desk, and again when somebody changes it.
 */
export function useComparedNet(side: ComparedSide | null): LoadedSide {
  const queryClient = useQueryClient();
  const id = side?.id ?? '';
  const detail = useQuery({ ...netQuery(id), enabled: side?.kind === 'net' });
  const revision = useQuery({ ...revisionQuery(id), enabled: side?.kind === 'revision' });
  useLive((message) => {
    if (message.type === 'net' && side?.kind === 'net' && message.netId === id)
      void queryClient.invalidateQueries({ queryKey: netKeys.detail(id) });
  });
  const draft = useMemo(
    () => (side?.kind === 'net' && detail.data ? draftOf(detail.data) : null),
    [side?.kind, detail.data],
  );
  const read = useQuery({
    queryKey: ['comparedDraft', id, detail.data?.changeNumber, draft?.document.datum, draft?.netName],
    queryFn: async ({ signal }) => ({
      ...draft!,
      reading: await readOnce(draft!.document, signal),
    }),
    enabled: draft !== null,
    staleTime: Number.POSITIVE_INFINITY,
    retry: false,
    placeholderData: keepPreviousData,
  });
  const frozen = useMemo(() => (revision.data ? frozenOf(revision.data) : null), [revision.data]);
  if (side?.kind === 'revision')
    return {
      asked: true,
      unread: frozen,
      net: frozen,
      error: frozen ? null : revision.error,
      unreadable: false,
    };
  // What is kept from before may be of another net.
  const net = draft !== null && read.data?.netId === draft.netId ? read.data : null;
  return {
    asked: side !== null,
    unread: draft,
    net,
    error: draft ? null : detail.error,
    unreadable: draft !== null && read.isError,
  };
}
