import { useQuery } from '@tanstack/react-query';
import { useEffect, useMemo, useState } from 'react';
import type { DeskStore } from '#client/features/desk/model/desk-state.ts';
import type { Guides } from '#client/features/desk/model/guides.ts';
import { revisionQuery } from '#client/features/revisions/api/revision-queries.ts';
import { compareRevisions } from '#shared/compute/compare-revisions.ts';
import type { RevisionComparison } from '#shared/contract/revision-comparison.ts';
import type { RevisionDto, RevisionSummary } from '#shared/contract/revisions.ts';

/** The revision beside the one before it, whose changed lines are drawn over the sheet when that is wanted. */
export function useRevisionBefore(
  { payload, summary }: RevisionDto,
  history: readonly RevisionSummary[],
  store: DeskStore,
) {
  const [drawnOver, setDrawnOver] = useState(true);
  const before = history.find(({ hash }) => hash === payload.previousHash);
  const query = useQuery({
    ...revisionQuery(before?.id ?? summary.id),
    enabled: before !== undefined,
  });
  const beforePayload = before === undefined ? undefined : query.data?.payload;
  const comparison = useMemo(
    () => (beforePayload ? compareRevisions(beforePayload, payload) : null),
    [beforePayload, payload],
  );
  useEffect(() => {
    store.setGuides('revisionBefore', comparison && drawnOver ? beforeGuides(comparison) : null);
  }, [store, comparison, drawnOver]);
  return { before, comparison, drawnOver, setDrawnOver, error: before ? query.error : null };
}

const beforeGuides = ({ lines }: RevisionComparison): Guides => ({
  areas: [],
  marks: [],
  lines: lines
    .filter(({ before }) => before.length > 1)
    .map(({ id, before }) => ({ id, tone: 'before', points: before })),
});
