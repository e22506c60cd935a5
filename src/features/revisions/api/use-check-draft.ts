import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useCallback, useState } from 'react';
import type * as z from 'zod/mini';
import { sendJson } from '#client/lib/http.ts';
import { type CheckDraft, checkDraftDto, type checkDraftPatch } from '#shared/contract/review.ts';
import type { RevisionDto } from '#shared/contract/revisions.ts';
import { revisionKeys } from './revision-queries.ts';

export type DraftChange = z.input<typeof checkDraftPatch>;

/**
 * Ticks and answers of the reader, null for who does not check: shown at once, sent one after another, shown as the server
 * has them if that fails.
 */
export function useCheckDraft({ summary, checking }: RevisionDto) {
  const revisionId = summary.id;
  const queryClient = useQueryClient();
  // The query tells of a change only later, by when the browser has put a box back as it was.
  const [shown, setShown] = useState({ of: checking, draft: checking?.draft ?? null });
  if (shown.of !== checking) setShown({ of: checking, draft: checking?.draft ?? null });
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
      setShown(({ of, draft }) => ({ of, draft: draft && changedDraft(draft, body) }));
      queryClient.setQueryData<RevisionDto>(queryKey, (held) => withChange(held, body));
      mutate(body);
    },
    [queryClient, revisionId, mutate],
  );
  return { draft: shown.draft, change, error };
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
