import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useCallback } from 'react';
import type * as z from 'zod/mini';
import { sendJson } from '#client/lib/http.ts';
import { type CheckDraft, checkDraftDto, type checkDraftPatch } from '#shared/contract/review.ts';
import type { RevisionDto } from '#shared/contract/revisions.ts';
import { revisionKeys } from './revision-queries.ts';

export type DraftChange = z.input<typeof checkDraftPatch>;

/** Ticks and answers of the reader: shown at once, sent one after another, shown as the server has them if that fails. */
export function useCheckDraft(revisionId: string) {
  const queryClient = useQueryClient();
  const { mutate, error } = useMutation({
    scope: { id: `check-draft ${revisionId}` },
    mutationFn: (body: DraftChange) =>
      sendJson('PATCH', `/revisions/${revisionId}/check-draft`, checkDraftDto, { body }),
    onError: () => queryClient.invalidateQueries({ queryKey: revisionKeys.detail(revisionId) }),
  });
  const change = useCallback(
    (body: DraftChange) => {
      const queryKey = revisionKeys.detail(revisionId);
      // An answer under way to an earlier question must not take the tick back.
      void queryClient.cancelQueries({ queryKey });
      queryClient.setQueryData<RevisionDto>(queryKey, (held) => withChange(held, body));
      mutate(body);
    },
    [queryClient, revisionId, mutate],
  );
  return { change, error };
}

function withChange(held: RevisionDto | undefined, body: DraftChange): RevisionDto | undefined {
  if (!held?.checking) return held;
  const { checking } = held;
  return { ...held, checking: { ...checking, draft: changedDraft(checking.draft, body) } };
}

/** The draft after a change, as the server makes it. */
export function changedDraft(draft: CheckDraft, { ticked, unticked, answers }: DraftChange): CheckDraft {
  const off = new Set(unticked);
  const answered = new Map(draft.answers.map((each) => [each.itemId, each]));
  for (const each of answers ?? []) answered.set(each.itemId, each);
  return {
    ticks: [...new Set([...draft.ticks, ...(ticked ?? [])])].filter((key) => !off.has(key)),
    answers: [...answered.values()],
  };
}
